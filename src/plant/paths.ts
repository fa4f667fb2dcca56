/** `hp.power` to `['hp', 'power']`; no dot, no parts. */
export function splitPath(path: string): readonly [id: string, name: string] | undefined {
  const dot = path.indexOf('.')
  return dot < 0 ? undefined : [path.slice(0, dot), path.slice(dot + 1)]
}
