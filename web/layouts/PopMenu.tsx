import { type KeyboardEvent, type ReactNode, useEffect, useRef, useState } from 'react'

export interface MenuAction {
  readonly name: string
  /** Why it cannot be done now, shown in its place. */
  readonly why?: string | undefined
  run(): void
}

interface PopProps {
  /** What the button says to those who do not see it, and its title. */
  readonly label: string
  readonly className?: string
  readonly button: ReactNode
  /** Menus are left by choosing; panels hold fields. */
  readonly role: 'menu' | 'dialog'
  readonly children: (close: () => void) => ReactNode
}

/** A button with something that opens under it: closed by Escape, by a press outside, by choosing. */
export function Pop({ label, className = 'icon-button', button, role, children }: PopProps) {
  const [open, setOpen] = useState(false)
  const place = useRef<HTMLSpanElement>(null)
  const opener = useRef<HTMLButtonElement>(null)
  const body = useRef<HTMLDivElement>(null)
  const close = () => {
    setOpen(false)
    opener.current?.focus()
  }

  useEffect(() => {
    if (!open) return
    const first = body.current?.querySelector<HTMLElement>(
      '[role="menuitem"]:not([aria-disabled="true"]), input, button, select',
    )
    first?.focus()
    const leave = (event: PointerEvent) => {
      if (!place.current?.contains(event.target as Node)) setOpen(false)
    }
    window.addEventListener('pointerdown', leave, true)
    return () => window.removeEventListener('pointerdown', leave, true)
  }, [open])

  const onKeyDown = (event: KeyboardEvent) => {
    if (!open) return
    if (event.key === 'Escape') close()
    else if (role === 'menu' && (event.key === 'ArrowDown' || event.key === 'ArrowUp')) {
      const items = Array.from(
        body.current?.querySelectorAll<HTMLElement>('[role="menuitem"]') ?? [],
      )
      const at = items.indexOf(document.activeElement as HTMLElement)
      const step = event.key === 'ArrowDown' ? 1 : -1
      items[(at + step + items.length) % items.length]?.focus()
    } else if (role === 'menu' && event.key === 'Tab') {
      setOpen(false)
      return
    } else return
    event.preventDefault()
    event.stopPropagation()
  }

  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: keys bubble up here from what is open.
    <span ref={place} className="pop-place" onKeyDown={onKeyDown}>
      <button
        ref={opener}
        type="button"
        className={className}
        aria-haspopup={role}
        aria-expanded={open}
        aria-label={label}
        title={label}
        onClick={() => setOpen(!open)}
      >
        {button}
      </button>
      {open && (
        // biome-ignore lint/a11y/useAriaPropsSupportedByRole: both roles that it takes have a name.
        <div ref={body} className={`pop pop-${role}`} role={role} aria-label={label}>
          {children(close)}
        </div>
      )}
    </span>
  )
}

/** A menu of actions under a button. */
export function PopMenu({
  label,
  button,
  actions,
}: {
  readonly label: string
  readonly button: ReactNode
  readonly actions: readonly MenuAction[]
}) {
  return (
    <Pop label={label} button={button} role="menu" className="tab-more">
      {(close) =>
        actions.map((action) => (
          <button
            key={action.name}
            type="button"
            role="menuitem"
            className="menu-item"
            aria-disabled={action.why !== undefined}
            title={action.why}
            tabIndex={-1}
            onClick={() => {
              if (action.why !== undefined) return
              close()
              action.run()
            }}
          >
            {action.name}
          </button>
        ))
      }
    </Pop>
  )
}
