import { useDeferredValue, useEffect, useId, useMemo, useRef, useState } from 'react'
import { focusNumber } from '../number/focus.ts'
import { useLayout } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { Icon } from '../strip/Icon.tsx'
import { useCommandStore } from './command-store.ts'
import { type Found, find } from './find.ts'
import { keysText } from './shortcuts.ts'

function follow(found: Found): void {
  const { select } = useSelectionStore.getState()
  switch (found.type) {
    case 'command':
      found.command.run()
      break
    case 'item':
      select([found.id])
      break
    case 'quantity':
      select([found.id])
      focusNumber(found.path)
      break
  }
}

const words = { command: 'Command', item: '', quantity: 'Quantity' }

/** Finds units, streams, quantities and commands by name. */
export function CommandBox() {
  const [text, setText] = useState('')
  const [open, setOpen] = useState(false)
  const [at, setAt] = useState(0)
  const listId = useId()
  const input = useRef<HTMLInputElement>(null)
  const list = useRef<HTMLDivElement>(null)
  const layout = useLayout()
  const commands = useCommandStore((state) => state.commands)
  const wanted = useDeferredValue(text)
  const results = useMemo(
    () => (open ? find(wanted, layout, commands) : []),
    [open, wanted, layout, commands],
  )
  const current = Math.min(at, results.length - 1)

  useEffect(() => {
    list.current?.children[current]?.scrollIntoView({ block: 'nearest' })
  }, [current])

  const take = (found: Found | undefined) => {
    if (!found) return
    setOpen(false)
    setText('')
    input.current?.blur()
    follow(found)
  }

  return (
    <search className="command-box">
      <Icon name="search" />
      <input
        ref={input}
        id="command-box"
        type="text"
        role="combobox"
        aria-label="Find a unit, a quantity, a command"
        aria-expanded={open}
        aria-controls={listId}
        aria-autocomplete="list"
        aria-activedescendant={open && current >= 0 ? `${listId}-${current}` : undefined}
        placeholder="Find a unit, a quantity, a command"
        autoComplete="off"
        spellCheck={false}
        value={text}
        onFocus={() => {
          setOpen(true)
          setAt(0)
        }}
        onBlur={() => setOpen(false)}
        onChange={(event) => {
          setText(event.target.value)
          setOpen(true)
          setAt(0)
        }}
        onKeyDown={(event) => {
          if (event.key === 'ArrowDown') setAt(Math.min(current + 1, results.length - 1))
          else if (event.key === 'ArrowUp') setAt(Math.max(current - 1, 0))
          else if (event.key === 'Enter') {
            // Who types fast and presses Enter means what is typed, not the list that still hangs behind.
            take(wanted === text ? results[current] : find(text, layout, commands)[0])
          } else if (event.key === 'Escape') {
            if (text === '') input.current?.blur()
            setText('')
          } else return
          event.preventDefault()
          event.stopPropagation()
        }}
      />
      {!open && <kbd>{keysText('Mod+K')}</kbd>}
      {open && (
        <div ref={list} id={listId} role="listbox" aria-label="Found" className="command-list">
          {results.map((found, i) => (
            // biome-ignore lint/a11y/useKeyWithClickEvents: the keys are the input's.
            <div
              key={`${found.type}/${found.key}`}
              id={`${listId}-${i}`}
              tabIndex={-1}
              role="option"
              aria-selected={i === current}
              onPointerDown={(event) => event.preventDefault()}
              onPointerMove={() => setAt(i)}
              onClick={() => take(found)}
            >
              <span className="command-name">{found.name}</span>
              <span className="muted">
                {found.type === 'command'
                  ? found.command.keys
                    ? keysText(found.command.keys)
                    : words.command
                  : found.detail}
              </span>
            </div>
          ))}
          {results.length === 0 && (
            <div className="muted" role="option" tabIndex={-1} aria-selected={false} aria-disabled>
              Nothing of that name. Units, streams, quantities and commands are looked through.
            </div>
          )}
        </div>
      )}
    </search>
  )
}
