import { useSelected, useSelectionStore } from '../store/selection-store.ts'
import { useCanvasStore } from './canvas-store.ts'
import { generatorRadius, type PlacedShaft } from './sheet.ts'

/** Shafts as chain lines, each with its generator. */
export function ShaftLines() {
  const shafts = useCanvasStore((state) => state.sheet.shafts)
  return (
    <svg className="shafts" aria-hidden="true">
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
    // Shafts are reached by keys through the tables and the command box.
    // biome-ignore lint/a11y/noStaticElementInteractions: see above
    // biome-ignore lint/a11y/useKeyWithClickEvents: see above
    <g
      className="shaft nopan"
      data-shaft={shaft.id}
      onPointerEnter={() => hover(shaft.id)}
      onPointerLeave={() => hover(null)}
      onClick={(event) => select([shaft.id], event.shiftKey ? 'toggle' : 'replace')}
    >
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
