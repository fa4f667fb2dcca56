import {
  type Dimension,
  describeQuantity,
  formatQuantity,
  kindOf,
  type Layout,
  type UnitChoice,
} from '../../src/document.ts'
import { flowMarks } from '../canvas/flow-marks.ts'
import { around, type Box, grown } from '../canvas/geometry.ts'
import type { PlacedLabel, PlacedTag } from '../canvas/labelling.ts'
import { arrowOf, pathOf } from '../canvas/path.ts'
import { generatorRadius, type Sheet } from '../canvas/sheet.ts'
import {
  arrowSize,
  hollowWidth,
  patternOf,
  type StreamPattern,
  streamWidth,
  wall,
} from '../canvas/stream-style.ts'
import type { TagQuantity } from '../canvas/tag-store.ts'
import { UnitSymbol } from '../canvas/UnitSymbol.tsx'
import { textWidth } from '../chart/measure-text.ts'
import type { Phase } from '../store/balance-store.ts'
import { rampAt, rampColour } from '../styles/ramp.ts'
import './drawing.css'

/** Everything that the drawing of a plant depends on. */
export interface DrawingSource {
  readonly layout: Layout
  readonly sheet: Sheet
  readonly labels: ReadonlyMap<string, PlacedLabel>
  readonly tags: ReadonlyMap<string, PlacedTag>
  readonly tagQuantities: readonly TagQuantity[]
  readonly units: UnitChoice
  readonly coldest: number
  readonly hottest: number
  readonly largestFlow: number
  value(path: string): number | null
  phase(stream: string): Phase
  isGiven(path: string): boolean
}

export interface DrawingOptions {
  /** A border with a title block. */
  readonly frame?: { readonly title: string; readonly lines: readonly string[] }
  readonly legend?: boolean
}

const line = 15
const baseline = 11.5
const legendHeight = 44
const titleBlock = { least: 220, line: 15 }

/** A plant as a drawing, streams and texts where the canvas has them at 100 %. */
export function PlantDrawing({
  source,
  options,
}: {
  readonly source: DrawingSource
  readonly options: DrawingOptions
}) {
  const { layout, sheet, labels, tags } = source
  const { frame, legend } = options
  const whole = around([
    ...(sheet.extent ? [sheet.extent] : []),
    ...labels.values(),
    ...tags.values(),
  ])
  const inner = grown(whole ?? { x: 0, y: 0, width: 320, height: 160 }, 20)
  const blockWidth = frame
    ? Math.max(
        titleBlock.least,
        textWidth(frame.title, 14, 600) + 24,
        ...frame.lines.map((words) => textWidth(words, 11) + 24),
      )
    : 0
  const blockHeight = frame ? titleBlock.line * (frame.lines.length + 1) + 14 : 0
  const foot = Math.max(legend ? legendHeight : 0, blockHeight)
  const wide = Math.max(inner.width, (legend ? 560 : 0) + blockWidth)
  const box: Box = { x: inner.x, y: inner.y, width: wide, height: inner.height + foot }
  const view = frame ? grown(box, 12) : box
  const bottom = box.y + box.height
  return (
    <svg
      className="drawing"
      width={Math.ceil(view.width)}
      height={Math.ceil(view.height)}
      viewBox={`${view.x} ${view.y} ${Math.ceil(view.width)} ${Math.ceil(view.height)}`}
      role="img"
      aria-label={`Flow diagram of ${layout.name}`}
      style={{ '--zoom': 1 } as React.CSSProperties}
    >
      {[...sheet.shafts.values()].map((shaft) => (
        <g key={shaft.id} className="shaft">
          <path
            className="shaft-line"
            d={shaft.lines.map(([a, b]) => `M${a.join(' ')}L${b.join(' ')}`).join('')}
          />
          {shaft.generator && (
            <g transform={`translate(${shaft.generator.join(' ')})`}>
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
      ))}
      {[...sheet.streams.keys()].map((id) => (
        <Stream key={id} id={id} source={source} />
      ))}
      {[...sheet.units.values()].map((unit) => (
        <g key={unit.id} data-unit={unit.id} transform={`translate(${unit.at.join(' ')})`}>
          <UnitSymbol
            kind={unit.kind}
            form={unit.form}
            mirrored={unit.mirrored}
            upended={unit.upended}
          />
        </g>
      ))}
      {[...labels.values()].map((label) => (
        <Label key={label.id} label={label} source={source} />
      ))}
      {[...tags.values()].map((tag) => (
        <Tag key={tag.id} tag={tag} source={source} />
      ))}
      {legend && <Legend source={source} x={box.x + 12} y={bottom - legendHeight + 10} />}
      {frame && (
        <g className="drawing-frame">
          <rect x={box.x} y={box.y} width={box.width} height={box.height} />
          <rect
            x={box.x + box.width - blockWidth}
            y={bottom - blockHeight}
            width={blockWidth}
            height={blockHeight}
          />
          <text
            className="drawing-title"
            x={box.x + box.width - blockWidth + 10}
            y={bottom - blockHeight + 18}
          >
            {frame.title}
          </text>
          {frame.lines.map((text, i) => (
            <text
              key={text}
              className="drawing-note"
              x={box.x + box.width - blockWidth + 10}
              y={bottom - blockHeight + 18 + titleBlock.line * (i + 1)}
            >
              {text}
            </text>
          ))}
        </g>
      )}
    </svg>
  )
}

function Strokes({
  path,
  pattern,
  colour,
  width,
}: {
  readonly path: string
  readonly pattern: StreamPattern
  readonly colour: string
  readonly width: number
}) {
  const bore = width - 2 * wall
  const isHollow = pattern === 'steam' || pattern === 'wet'
  return (
    <>
      <path
        className="stream-line"
        d={path}
        stroke={colour}
        strokeWidth={pattern === 'none' ? 1.25 : width}
        {...(pattern === 'none' ? { strokeDasharray: '5 3.5' } : {})}
      />
      {isHollow && <path className="stream-bore" d={path} strokeWidth={bore} />}
      {isHollow && <path className="stream-tint" d={path} stroke={colour} strokeWidth={bore} />}
      {pattern === 'wet' && (
        <path
          className="stream-beads"
          d={path}
          stroke={colour}
          strokeWidth={Math.max(1.1, Math.min(2.2, bore * 0.62))}
          strokeDasharray={`0 ${bore < 2.5 ? 4.5 : 5.5}`}
        />
      )}
    </>
  )
}

function Stream({ id, source }: { readonly id: string; readonly source: DrawingSource }) {
  const stream = source.sheet.streams.get(id)
  if (!stream) return null
  const m = source.value(`${id}.m`)
  const T = source.value(`${id}.T`)
  const pattern = patternOf(source.phase(id), m)
  const flows = pattern !== 'none'
  const bare = flows ? streamWidth(m, source.largestFlow) : 1.25
  const width = pattern === 'steam' || pattern === 'wet' ? hollowWidth(bare) : bare
  const { length, half } = arrowSize(bare)
  const route = flows && m !== null && m < 0 ? [...stream.route].reverse() : stream.route
  const colour =
    flows && T !== null ? rampColour(T, source.coldest, source.hottest) : 'var(--muted)'
  return (
    <g className={`stream stream-${pattern}`} data-stream={id}>
      <Strokes
        path={pathOf(route, stream.bridges, length - 1)}
        pattern={pattern}
        colour={colour}
        width={width}
      />
      <path d={arrowOf(route, length, half)} style={{ fill: colour }} />
    </g>
  )
}

interface Part {
  readonly value: string
  readonly unit: string
  readonly given: boolean
}

function partOf(source: DrawingSource, path: string, dimension: Dimension): Part | null {
  const value = source.value(path)
  if (value === null) return null
  const given = source.isGiven(path)
  const { text, unit } = formatQuantity(value, dimension, source.units, {
    digits: given ? 'given' : 'shown',
  })
  return { value: text, unit, given }
}

function Numbers({ part }: { readonly part: Part }) {
  return (
    <>
      <tspan {...(part.given ? { className: 'given' } : {})}>{part.value}</tspan>
      {part.unit !== '' && <tspan className="unit-of">{`\u2009${part.unit}`}</tspan>}
    </>
  )
}

const anchors = { left: 'start', centre: 'middle', right: 'end' } as const

function xOf({ x, width, align }: PlacedLabel | PlacedTag): number {
  return align === 'left' ? x : align === 'right' ? x + width : x + width / 2
}

/** Words in lines no wider than there is room for. */
function wrapped(text: string, room: number): string[] {
  const lines: string[] = []
  for (const word of text.split(' ')) {
    const last = lines.at(-1)
    if (last !== undefined && textWidth(`${last} ${word}`, 12) <= room + 0.5) {
      lines[lines.length - 1] = `${last} ${word}`
    } else lines.push(word)
  }
  return lines
}

function Label({ label, source }: { readonly label: PlacedLabel; readonly source: DrawingSource }) {
  const { layout, sheet } = source
  const unit = sheet.units.get(label.id)
  const isShaft = !unit
  const chief = unit ? kindOf(unit.kind)?.chief : 'generatorPower'
  const described = chief && describeQuantity(layout, `${label.id}.${chief}`)
  const part = described ? partOf(source, `${label.id}.${chief}`, described.dimension) : null
  const name = isShaft ? '' : unit.label
  const x = xOf(label)
  const anchor = anchors[label.align]
  if (label.arrangement === 'beside') {
    return (
      <text x={x} y={label.y + baseline} textAnchor={anchor}>
        {name}
        {part && (
          <>
            <tspan> </tspan>
            <tspan className="figure">{`\u2002${part.value}`}</tspan>
            {part.unit !== '' && <tspan className="unit-of">{`\u2009${part.unit}`}</tspan>}
          </>
        )}
      </text>
    )
  }
  const names =
    name === '' ? [] : label.arrangement === 'wrapped' ? wrapped(name, label.width) : [name]
  const count = names.length + (part ? 1 : 0)
  const isAbove = unit !== undefined && label.y + label.height <= unit.body.y
  const top = isAbove ? label.y + label.height - count * line : label.y
  return (
    <g>
      {names.map((words, i) => (
        <text key={words} x={x} y={top + baseline + i * line} textAnchor={anchor}>
          {words}
        </text>
      ))}
      {part && (
        <text className="figure" x={x} y={top + baseline + names.length * line} textAnchor={anchor}>
          {part.value}
          {part.unit !== '' && <tspan className="unit-of">{`\u2009${part.unit}`}</tspan>}
        </text>
      )}
    </g>
  )
}

const dimensions: Readonly<Record<TagQuantity | 'x', Dimension>> = {
  p: 'pressure',
  T: 'temperature',
  h: 'specificEnthalpy',
  m: 'massFlow',
  x: 'dryness',
}

function Tag({ tag, source }: { readonly tag: PlacedTag; readonly source: DrawingSource }) {
  const { tagQuantities } = source
  const isWet = source.phase(tag.id) === 'wet'
  const parts = tagQuantities.map((name) => {
    const its = isWet && name === 'T' ? 'x' : name
    const part = partOf(source, `${tag.id}.${its}`, dimensions[its])
    return part && { ...part, name: its, unit: its === 'x' ? 'dry' : part.unit }
  })
  if (parts.every((part) => part === null)) return null
  const perLine = Math.ceil(tagQuantities.length / tag.lines)
  const [start] = tag.leader
  return (
    <g className="drawing-tag" data-tag={tag.id}>
      {start && (
        <g className="drawing-leader">
          <path d={`M${tag.leader.map((point) => point.join(' ')).join('L')}`} />
          <circle cx={start[0]} cy={start[1]} r={1.5} />
        </g>
      )}
      {Array.from({ length: tag.lines }, (_, i) => (
        <text
          // biome-ignore lint/suspicious/noArrayIndexKey: lines have no name of their own.
          key={i}
          x={xOf(tag)}
          y={tag.y + baseline + i * line}
          textAnchor={anchors[tag.align]}
        >
          {parts.slice(i * perLine, (i + 1) * perLine).map(
            (part, k) =>
              part && (
                <tspan key={part.name}>
                  {k > 0 ? '\u2002' : ''}
                  <Numbers part={part} />
                </tspan>
              ),
          )}
        </text>
      ))}
    </g>
  )
}

const patterns = [
  ['liquid', 'liquid'],
  ['wet', 'wet'],
  ['steam', 'steam'],
  ['none', 'no flow'],
] as const

/** What colour, pattern and width of a stream mean. */
function Legend({
  source,
  x,
  y,
}: {
  readonly source: DrawingSource
  readonly x: number
  readonly y: number
}) {
  const { coldest, hottest, largestFlow, units } = source
  if (largestFlow <= 0) return null
  const whole = (T: number) => {
    const { text, unit } = formatQuantity(T, 'temperature', units)
    const number = Number(text.replace('−', '-'))
    return { text: Number.isFinite(number) ? String(Math.round(number)) : text, unit }
  }
  const bar = 120
  const steps = 60
  const marks = flowMarks(largestFlow)
  return (
    <g className="drawing-legend" transform={`translate(${x} ${y})`}>
      {Array.from({ length: steps }, (_, i) => (
        <rect
          // biome-ignore lint/suspicious/noArrayIndexKey: steps are known by their order.
          key={i}
          x={(bar * i) / steps}
          width={bar / steps + 0.4}
          height={8}
          fill={rampAt(i / (steps - 1))}
        />
      ))}
      <text y={22}>{whole(coldest).text}</text>
      <text x={bar / 2} y={22} textAnchor="middle">
        {whole((coldest + hottest) / 2).text}
      </text>
      <text x={bar} y={22} textAnchor="end">
        {`${whole(hottest).text} ${whole(hottest).unit}`}
      </text>
      {patterns.map(([pattern, words], i) => {
        const left = bar + 28 + i * 50
        return (
          <g key={pattern}>
            <g className="stream">
              <Strokes
                path={`M${left} 4h34`}
                pattern={pattern}
                colour={pattern === 'none' ? 'var(--muted)' : rampAt(0.42)}
                width={pattern === 'liquid' ? 3.2 : hollowWidth(3)}
              />
            </g>
            <text x={left + 17} y={22} textAnchor="middle">
              {words}
            </text>
          </g>
        )
      })}
      {marks.map((m, i) => {
        const left = bar + 250 + i * 50
        const { text, unit } = formatQuantity(m, 'massFlow', units)
        const plain = text.replace(/(\.\d*?)0+$/, '$1').replace(/\.$/, '')
        return (
          <g key={m}>
            <path
              className="drawing-width"
              d={`M${left} 4h36`}
              strokeWidth={streamWidth(m, largestFlow)}
            />
            <text x={left + 18} y={22} textAnchor="middle">
              {i === marks.length - 1 ? `${plain} ${unit}` : plain}
            </text>
          </g>
        )
      })}
    </g>
  )
}
