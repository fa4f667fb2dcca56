/** SHA-256 of a text as it is saved (UTF-8), in hexadecimal; null where the browser keeps it back. */
export async function checksumOf(text: string): Promise<string | null> {
  const { subtle } = globalThis.crypto ?? {}
  if (!subtle) return null
  const digest = await subtle.digest('SHA-256', new TextEncoder().encode(text))
  return Array.from(new Uint8Array(digest), (byte) => byte.toString(16).padStart(2, '0')).join('')
}
