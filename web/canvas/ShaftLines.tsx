import { useSelected, useSelectionStore } from '../store/selection-store.ts'
import { useCanvasStore } from './canvas-store.ts'
import { generatorRadius, type PlacedShaft } from './sheet.ts'
import { ShaftName, shaftNameId } from './spoken-names.tsx'

/** Shafts as chain lines, each with its generator. */
export function ShaftLines() {
  const shafts = useCanvasStore((state) => state.sheet.shafts)
  return (
    // biome-ignore lint/a11y/noSvgWithoutTitle: each shaft has a name of its own
    <svg className="shafts">
      {[...shafts.values()].map((shaft) => (
        <Shaft key={shaft.id} shaft={shaft} />
      ))}
    </svg>
  )
}

function Shaft({ shaft }: { readonly shaft: PlacedShaft }) {
  const selected = useSelected(shaft.id)
  const hovered = useSelectionStore((state) => state.hovered === shaft.id)
  const line = shaft.lines.map(([a, b]) => `M${a.join(' ')}L${b.join(' ')}`).join('')
  const { select, hover } = useSelectionStore.getState()
  return (
    // biome-ignore lint/a11y/useSemanticElements: a button has no place in a drawing
    <g
      className="shaft nopan"
      role="button"
      tabIndex={0}
      aria-labelledby={shaftNameId(shaft.id)}
      aria-pressed={selected}
      aria-roledescription="shaft"
      onKeyDown={(event) => {
        if (event.key !== 'Enter' && event.key !== ' ') return
        event.preventDefault()
        event.stopPropagation()
        select([shaft.id], event.shiftKey || event.key === ' ' ? 'toggle' : 'replace')
      }}
      data-shaft={shaft.id}
      onPointerEnter={() => hover(shaft.id)}
      onPointerLeave={() => hover(null)}
      onClick={(event) => select([shaft.id], event.shiftKey ? 'toggle' : 'replace')}
    >
      <ShaftName id={shaft.id} />
      {(selected || hovered) && <path className="shaft-halo" d={line} />}
      <path className="shaft-grip" d={line} />
      <path className="shaft-line" d={line} />
      {shaft.generator && (
        <g transform={`translate(${shaft.generator.join(' ')})`}>
          {(selected || hovered) && (
            <circle className="shaft-frame" r={generatorRadius + 4} data-selected={selected} />
          )}
          <g className="symbol">
            <circle r={generatorRadius} />
            <path className="detail open" d="M-7 6.5C-4 0.5 -2.5 1.5 0 5.5S4 10.5 7 4.5" />
          </g>
          <text className="generator-letter" y={-1.5}>
            G
          </text>
        </g>
      )}
    </g>
  )
}
