import { useState } from 'react'
import { useReactFlow } from 'reactflow'
import { useCanvasStore } from './canvas-store.ts'
import { motion } from './motion.ts'
import { type TagsShown, tagQuantities, useTagStore } from './tag-store.ts'

const which: readonly { readonly value: TagsShown; readonly label: string }[] = [
  { value: 'none', label: 'No tags' },
  { value: 'given', label: 'Where something is given' },
  { value: 'chief', label: 'Chief streams' },
  { value: 'all', label: 'Every stream with room' },
]

const names = { p: 'Pressure', T: 'Temperature or dryness', h: 'Enthalpy', m: 'Mass flow' } as const

/** Zoom, fit, and what the tags say, at the canvas' foot. */
export function CanvasControls({ onFit }: { readonly onFit: () => void }) {
  const flow = useReactFlow()
  const zoom = useCanvasStore((state) => state.zoom)
  const [open, setOpen] = useState(false)
  return (
    <div className="canvas-controls">
      <TagMenu open={open} onToggle={setOpen} />
      <button
        type="button"
        aria-label="Zoom out"
        title="Zoom out"
        onClick={() => void flow.zoomOut({ duration: motion() })}
      >
        −
      </button>
      <button
        type="button"
        className="canvas-zoom"
        aria-label={`Zoom ${Math.round(zoom * 100)} %, back to 100 %`}
        title="Back to 100 %"
        onClick={() => void flow.zoomTo(1, { duration: motion() })}
      >
        {Math.round(zoom * 100)} %
      </button>
      <button
        type="button"
        aria-label="Zoom in"
        title="Zoom in"
        onClick={() => void flow.zoomIn({ duration: motion() })}
      >
        +
      </button>
      <button type="button" onClick={onFit} title="Show the whole plant">
        Fit
      </button>
    </div>
  )
}

function TagMenu(props: { readonly open: boolean; readonly onToggle: (open: boolean) => void }) {
  const { open, onToggle } = props
  const tags = useTagStore()
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: closes what its button opened
    <div
      className="tag-menu"
      onBlur={(event) => {
        if (!event.currentTarget.contains(event.relatedTarget)) onToggle(false)
      }}
      onKeyDown={(event) => {
        if (event.key !== 'Escape') return
        event.stopPropagation()
        onToggle(false)
      }}
    >
      <button type="button" aria-expanded={open} onClick={() => onToggle(!open)}>
        Tags
      </button>
      {open && (
        <fieldset className="tag-menu-list" tabIndex={-1}>
          <legend className="visually-hidden">Tags of streams</legend>
          {which.map(({ value, label }) => (
            <label key={value}>
              <input
                type="radio"
                name="tags-which"
                checked={tags.which === value}
                onChange={() => tags.show(value)}
              />
              {label}
            </label>
          ))}
          <hr />
          {tagQuantities.map((name) => (
            <label key={name}>
              <input
                type="checkbox"
                checked={tags.quantities.includes(name)}
                onChange={() => tags.toggle(name)}
              />
              {names[name]}
            </label>
          ))}
        </fieldset>
      )}
    </div>
  )
}
