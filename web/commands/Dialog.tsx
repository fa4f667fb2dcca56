import { type ReactNode, useEffect, useId, useRef } from 'react'
import { Icon } from '../strip/Icon.tsx'
import './dialogs.css'

interface Props {
  readonly title: string
  readonly children: ReactNode
  onClose(): void
}

/** A dialog over the window; Escape, the cross and a click beside it close it. */
export function Dialog({ title, children, onClose }: Props) {
  const place = useRef<HTMLDialogElement>(null)
  const titleId = useId()
  useEffect(() => {
    place.current?.showModal()
  }, [])
  return (
    // biome-ignore lint/a11y/useKeyWithClickEvents: Escape closes a dialog by itself.
    <dialog
      ref={place}
      className="dialog"
      aria-labelledby={titleId}
      onClose={onClose}
      onClick={(event) => {
        if (event.target === place.current) place.current?.close()
      }}
    >
      <header>
        <h2 id={titleId}>{title}</h2>
        <button
          type="button"
          className="icon-button"
          aria-label="Close"
          onClick={() => place.current?.close()}
        >
          <Icon name="close" size={12} />
        </button>
      </header>
      <div className="dialog-body">{children}</div>
    </dialog>
  )
}
