import { useRef, useState } from 'react'

interface Props {
  readonly orientation: 'vertical' | 'horizontal'
  readonly label: string
  /** Size of the part it belongs to, px. */
  readonly size: number
  readonly least: number
  readonly most: number
  /** The part lies behind the divider (right of it, below it), so that moving forward makes it smaller. */
  readonly behind?: boolean
  onSize(size: number): void
}

const nudge = 16

/** A divider that is dragged, or moved by the arrow keys. */
export function Divider({ orientation, label, size, least, most, behind = false, onSize }: Props) {
  const grip = useRef<{ at: number; size: number } | null>(null)
  const [dragged, setDragged] = useState(false)
  const upright = orientation === 'vertical'
  const sense = behind ? -1 : 1
  const set = (wanted: number) => onSize(Math.round(Math.min(most, Math.max(least, wanted))))

  const end = () => {
    grip.current = null
    setDragged(false)
  }

  return (
    // biome-ignore lint/a11y/useSemanticElements: an <hr> cannot be taken hold of.
    <div
      className="divider"
      role="separator"
      tabIndex={0}
      aria-label={label}
      aria-orientation={orientation}
      aria-valuenow={Math.round(size)}
      aria-valuemin={Math.round(least)}
      aria-valuemax={Math.round(most)}
      data-dragged={dragged || undefined}
      onPointerDown={(event) => {
        if (event.button !== 0) return
        event.preventDefault()
        event.currentTarget.setPointerCapture(event.pointerId)
        grip.current = { at: upright ? event.clientX : event.clientY, size }
        setDragged(true)
      }}
      onPointerMove={(event) => {
        if (!grip.current) return
        const moved = (upright ? event.clientX : event.clientY) - grip.current.at
        set(grip.current.size + sense * moved)
      }}
      onPointerUp={end}
      onPointerCancel={end}
      onKeyDown={(event) => {
        const forward = upright ? 'ArrowRight' : 'ArrowDown'
        const back = upright ? 'ArrowLeft' : 'ArrowUp'
        if (event.key === forward) set(size + sense * nudge)
        else if (event.key === back) set(size - sense * nudge)
        else if (event.key === 'Home') set(least)
        else if (event.key === 'End') set(most)
        else return
        event.preventDefault()
      }}
    />
  )
}
