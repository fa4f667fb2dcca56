import { useEffect, useRef, useState } from 'react'
import { Icon } from '../strip/Icon.tsx'
import {
  type Command,
  type CommandGroup,
  commandName,
  isEnabled,
  useCommandStore,
} from './command-store.ts'
import { keysText } from './shortcuts.ts'

const groups: readonly CommandGroup[] = ['Plant', 'Edit', 'View', 'Help']

function MenuItem({ command, onRun }: { command: Command; onRun(): void }) {
  const checked = command.checked?.()
  return (
    <button
      type="button"
      {...(checked === undefined
        ? { role: 'menuitem' }
        : { role: 'menuitemcheckbox', 'aria-checked': checked })}
      aria-disabled={!isEnabled(command)}
      className="menu-item"
      tabIndex={-1}
      onClick={() => {
        if (!isEnabled(command)) return
        onRun()
        command.run()
      }}
    >
      <span className="menu-check">{checked && <Icon name="check" size={12} />}</span>
      <span className="menu-name">{commandName(command)}</span>
      {command.keys && <kbd className="menu-keys">{keysText(command.keys)}</kbd>}
    </button>
  )
}

/** The menu of all commands, at the strip's left end. */
export function Menu() {
  const [open, setOpen] = useState(false)
  const commands = useCommandStore((state) => state.commands)
  const place = useRef<HTMLDivElement>(null)
  const button = useRef<HTMLButtonElement>(null)

  const items = () =>
    Array.from(place.current?.querySelectorAll<HTMLElement>('[role^="menuitem"]') ?? [])

  useEffect(() => {
    if (!open) return
    items()[0]?.focus()
    const leave = (event: PointerEvent) => {
      if (!place.current?.contains(event.target as Node)) setOpen(false)
    }
    window.addEventListener('pointerdown', leave, true)
    return () => window.removeEventListener('pointerdown', leave, true)
  })

  const close = () => {
    setOpen(false)
    button.current?.focus()
  }

  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: keys bubble up here from the menu's items.
    <div
      ref={place}
      className="menu-place"
      onKeyDown={(event) => {
        if (!open) return
        const all = items()
        const at = all.indexOf(document.activeElement as HTMLElement)
        const step = { ArrowDown: 1, ArrowUp: -1 }[event.key]
        if (step) all[(at + step + all.length) % all.length]?.focus()
        else if (event.key === 'Home') all[0]?.focus()
        else if (event.key === 'End') all.at(-1)?.focus()
        else if (event.key === 'Escape') close()
        else if (event.key === 'Tab') setOpen(false)
        else if (/^\p{L}$/u.test(event.key) && !event.ctrlKey && !event.metaKey) {
          const letter = event.key.toLowerCase()
          const next = [...all.slice(at + 1), ...all].find((item) =>
            item.textContent?.trim().toLowerCase().startsWith(letter),
          )
          next?.focus()
        } else return
        if (event.key !== 'Tab') event.preventDefault()
        event.stopPropagation()
      }}
    >
      <button
        ref={button}
        type="button"
        className="icon-button"
        aria-haspopup="menu"
        aria-expanded={open}
        aria-label="Menu"
        title="Menu"
        onClick={() => setOpen(!open)}
      >
        <Icon name="menu" />
      </button>
      {open && (
        <div className="menu" role="menu" aria-label="Menu">
          {groups.map((group) => {
            const its = commands.filter((one) => one.group === group && !one.hidden)
            return (
              its.length > 0 && (
                // biome-ignore lint/a11y/useSemanticElements: a fieldset has no place in a menu.
                <div key={group} role="group" aria-label={group} className="menu-group">
                  {its.map((command) => (
                    <MenuItem key={command.id} command={command} onRun={close} />
                  ))}
                </div>
              )
            )
          })}
        </div>
      )}
    </div>
  )
}
