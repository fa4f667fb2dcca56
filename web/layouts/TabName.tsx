import { useEffect, useRef, useState } from 'react'

/** A tab's name being typed anew: Enter or leaving takes it, Escape does not. */
export function TabName({
  name,
  label,
  onName,
  onEnd,
}: {
  readonly name: string
  readonly label: string
  onName(name: string): void
  onEnd(): void
}) {
  const [text, setText] = useState(name)
  const input = useRef<HTMLInputElement>(null)
  useEffect(() => input.current?.select(), [])
  const take = () => {
    const wanted = text.trim()
    if (wanted && wanted !== name) onName(wanted)
    onEnd()
  }
  return (
    <input
      ref={input}
      className="tab-name"
      aria-label={label}
      value={text}
      size={Math.max(6, text.length)}
      spellCheck={false}
      onChange={(event) => setText(event.target.value)}
      onBlur={take}
      onKeyDown={(event) => {
        if (event.key === 'Enter') take()
        else if (event.key === 'Escape') onEnd()
        event.stopPropagation()
      }}
    />
  )
}
