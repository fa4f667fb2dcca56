import { memo } from 'react'
import {
  type Dimension,
  describeQuantity,
  givenOf,
  kindOf,
  type Layout,
} from '../../src/document.ts'
import { Quantity } from '../number/Quantity.tsx'
import { useNumber } from '../number/use-number.ts'
import { readValue, useBalanceStore, usePhase } from '../store/balance-store.ts'
import { readLayout, useLayout } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { figuresFrom, useCanvasStore } from './canvas-store.ts'
import type { Point } from './geometry.ts'
import { middleOf, type PlacedLabel, type PlacedTag } from './labelling.ts'
import { startRenaming, useRenameStore } from './rename-store.ts'
import { putTag } from './tag-places.ts'
import { type TagQuantity, useTagStore } from './tag-store.ts'
import { toSheet } from './view.ts'

/** Labels of units with their chief figures, and the tags of streams. */
export function Texts() {
  const labels = useCanvasStore((state) => state.labels)
  const tags = useCanvasStore((state) => state.tags)
  const scale = useCanvasStore((state) => state.textScale)
  return (
    <div className="texts" style={{ '--text-scale': scale } as React.CSSProperties}>
      {[...labels.values()].map((label) => (
        <UnitLabel key={label.id} label={label} />
      ))}
      {[...tags.values()].map((tag) => (
        <Tag key={tag.id} tag={tag} />
      ))}
    </div>
  )
}

const place = (box: PlacedLabel | PlacedTag): React.CSSProperties => ({
  transform: `translate(${box.x}px, ${box.y}px)`,
  width: box.width,
  height: box.height,
  textAlign: box.align === 'centre' ? 'center' : box.align,
})

const UnitLabel = memo(function UnitLabel({ label }: { readonly label: PlacedLabel }) {
  const text = useCanvasStore((state) => state.sheet.units.get(label.id)?.label)
  const kind = useCanvasStore((state) => state.sheet.units.get(label.id)?.kind)
  const top = useCanvasStore((state) => state.sheet.units.get(label.id)?.body.y)
  const layout = readLayout()
  const isShaft = kind === undefined && layout.shafts.some((shaft) => shaft.id === label.id)
  const chief = isShaft ? 'generatorPower' : kind && kindOf(kind)?.chief
  const path = chief && `${label.id}.${chief}`
  // A kind may name a quantity that this unit has not got.
  const described = path ? describeQuantity(layout, path) : undefined
  const renaming = useRenameStore((state) => state.id === label.id)
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: a larger target for the pointer; the unit itself is reached by keys
    // biome-ignore lint/a11y/useKeyWithClickEvents: as above
    <div
      hidden={renaming}
      onClick={(event) => {
        useSelectionStore.getState().select([label.id], event.shiftKey ? 'toggle' : 'replace')
      }}
      onDoubleClick={() => startRenaming(label.id)}
      className="unit-label nopan"
      data-arrangement={label.arrangement}
      data-inside={label.inside === true}
      data-above={top !== undefined && label.y + label.height <= top}
      style={place(label)}
    >
      {!isShaft && <span className="unit-label-name">{text}</span>}
      {path && described && <Figure path={path} dimension={described.dimension} />}
    </div>
  )
})

/** The chief figure, once there is one: what is open is for the card and the ledger. */
function Figure({ path, dimension }: { readonly path: string; readonly dimension: Dimension }) {
  const { state } = useNumber(path)
  const shown = useCanvasStore((canvas) => canvas.zoom >= figuresFrom)
  if (state === 'open' || !shown) return null
  return (
    <span className="unit-label-figure">
      <Quantity path={path} dimension={dimension} />
    </span>
  )
}

function Leader({ leader }: { readonly leader: PlacedTag['leader'] }) {
  const [start] = leader
  if (!start) return null
  return (
    <svg className="leader" aria-hidden="true">
      <path d={`M${leader.map((point) => point.join(' ')).join('L')}`} />
      <circle cx={start[0]} cy={start[1]} r={1.5} />
    </svg>
  )
}

const Tag = memo(function Tag({ tag }: { readonly tag: PlacedTag }) {
  const quantities = useTagStore((state) => state.quantities)
  const phase = usePhase(tag.id)
  const layout = useLayout()
  // A tag without a single number says nothing.
  const says = useBalanceStore(() => quantities.some((name) => hasNumber(layout, tag.id, name)))
  if (!says) return null
  const perLine = Math.ceil(quantities.length / tag.lines)
  const lines = Array.from({ length: tag.lines }, (_, i) =>
    quantities.slice(i * perLine, (i + 1) * perLine),
  )
  return (
    <>
      <Leader leader={tag.leader} />
      {/* biome-ignore lint/a11y/noStaticElementInteractions: a larger target for the pointer; the stream itself is reached by keys */}
      {/* biome-ignore lint/a11y/useKeyWithClickEvents: as above */}
      <div
        className="stream-tag nopan"
        style={place(tag)}
        onPointerEnter={() => useSelectionStore.getState().hover(tag.id)}
        onPointerLeave={() => useSelectionStore.getState().hover(null)}
        onClick={(event) => {
          useSelectionStore.getState().select([tag.id], event.shiftKey ? 'toggle' : 'replace')
        }}
        onPointerDown={(event) => {
          if (event.button === 0) dragTag(tag, [event.clientX, event.clientY])
        }}
        onDoubleClick={() => putTag(tag.id, null)}
        title="Drag to move it, double click to set it free"
      >
        {lines.map((line) => (
          <div key={line.join()} className="stream-tag-line">
            {line.map((name) => (
              <Part key={name} id={tag.id} name={name} wet={phase === 'wet'} />
            ))}
          </div>
        ))}
      </div>
    </>
  )
})

/** A tag goes with the pointer; a press that does not move is a click. */
function dragTag(tag: PlacedTag, start: Point): void {
  let moved = false
  const from = toSheet(start)
  const move = (event: PointerEvent) => {
    const { clientX, clientY } = event
    moved ||= Math.abs(clientX - start[0]) + Math.abs(clientY - start[1]) > 4
    const route = useCanvasStore.getState().sheet.streams.get(tag.id)?.route
    if (!moved || !route) return
    const [x, y] = toSheet([clientX, clientY])
    const [mx, my] = middleOf(route)
    putTag(tag.id, [tag.x + x - from[0] - mx, tag.y + y - from[1] - my])
  }
  const end = () => {
    window.removeEventListener('pointermove', move)
    window.removeEventListener('pointerup', end)
    window.removeEventListener('pointercancel', end)
  }
  window.addEventListener('pointermove', move)
  window.addEventListener('pointerup', end)
  window.addEventListener('pointercancel', end)
}

const hasNumber = (layout: Layout, id: string, name: string): boolean =>
  readValue(`${id}.${name}`) !== null || givenOf(layout, `${id}.${name}`) !== undefined

const dimensions: Readonly<Record<TagQuantity | 'x', Dimension>> = {
  p: 'pressure',
  T: 'temperature',
  h: 'specificEnthalpy',
  m: 'massFlow',
  x: 'dryness',
}

/** Of wet steam the dryness says what the temperature cannot. */
function Part(props: { readonly id: string; readonly name: TagQuantity; readonly wet: boolean }) {
  const name = props.wet && props.name === 'T' ? 'x' : props.name
  return (
    <span className="stream-tag-part">
      <Quantity path={`${props.id}.${name}`} dimension={dimensions[name]} />
      {name === 'x' && <span className="quantity-unit">{'\u2009'}dry</span>}
    </span>
  )
}
