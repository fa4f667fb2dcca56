import { create } from 'zustand'
import { kindOf, type Layout } from '../../src/document.ts'
import { textWidth } from '../chart/measure-text.ts'
import { readLayout, usePlantStore } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { useSettingsStore } from '../store/settings-store.ts'
import { drawnAlike } from './drawn-alike.ts'
import { around, grown, type Point, type Size } from './geometry.ts'
import {
  type Arrangement,
  type LabelRequest,
  type PlacedLabel,
  type PlacedTag,
  placeLabels,
  placeTags,
  tagAt,
} from './labelling.ts'
import { drawSheet, emptySheet, generatorBox, type Sheet } from './sheet.ts'
import type { PlacedUnit } from './standing.ts'
import { useTagPlaces } from './tag-places.ts'
import { type TagChoice, useTagStore } from './tag-store.ts'
import { usualFigure, usualPart } from './usual-texts.ts'

interface CanvasState {
  readonly sheet: Sheet
  readonly labels: ReadonlyMap<string, PlacedLabel>
  readonly tags: ReadonlyMap<string, PlacedTag>
  /** Units on their way under the pointer: top left corners, px at 100 %. */
  readonly moved: ReadonlyMap<string, Point> | null
  readonly zoom: number
  /** What text is enlarged by, so that it keeps its size on screen when zoomed out. */
  readonly textScale: number
  /** The kind whose symbol is being carried over the canvas. */
  move(moved: ReadonlyMap<string, Point> | null): void
  setZoom(zoom: number): void
}

/** Smallest text on the screen, px, and its size at 100 %. */
const smallestText = 11.6
const textSize = 12
export const lineHeight = 15
/** Below this zoom tags, and below that one figures, would crowd the sheet. */
const tagsFrom = 0.55
export const figuresFrom = 0.5
/** How far tags may stand beyond all else, px: they are not to make the whole smaller on the screen. */
export const tagsBeyond = 24

export const useCanvasStore = create<CanvasState>()((set, get) => ({
  sheet: emptySheet,
  labels: new Map(),
  tags: new Map(),
  moved: null,
  zoom: 1,
  textScale: 1,
  move(moved) {
    const { sheet, textScale, labels, tags, zoom } = get()
    const layout = readLayout()
    const next = drawSheet(layout, moved, sheet)
    const along = moved
      ? textsAlong({ labels, tags, sheet }, next)
      : texts(layout, next, textScale, zoom, { labels, tags, sheet })
    set({ moved, sheet: next, ...along })
  },
  setZoom(zoom) {
    const wanted = Math.max(1, smallestText / textSize / zoom)
    // In steps, so that labels are not set anew at every turn of the wheel.
    const textScale = wanted === 1 ? 1 : Math.ceil(wanted * 8) / 8
    const { sheet, textScale: earlier, zoom: before } = get()
    const step = (at: number) => Number(at >= tagsFrom) + Number(at >= figuresFrom)
    if (textScale === earlier && step(zoom) === step(before)) {
      if (zoom !== before) set({ zoom })
    } else set({ zoom, textScale, ...texts(readLayout(), sheet, textScale, zoom) })
  },
}))

let shownOpened = -1
let shownLayout: Layout | null = null

/** Draws the sheet anew whenever the layout changes; returns what ends that. */
export function followPlant(): () => void {
  const follow = () => {
    const layout = readLayout()
    const { opened } = usePlantStore.getState()
    if (layout === shownLayout && opened === shownOpened) return
    // Another plant or layout is routed from scratch; an edit keeps the routes that it does not touch.
    const fresh = opened !== shownOpened || layout.id !== shownLayout?.id
    if (!fresh && shownLayout && drawnAlike(layout, shownLayout)) {
      shownLayout = layout
      return
    }
    shownLayout = layout
    shownOpened = opened
    const { sheet, textScale, zoom } = useCanvasStore.getState()
    const next = drawSheet(layout, null, fresh ? emptySheet : sheet)
    useCanvasStore.setState({
      sheet: next,
      moved: null,
      ...texts(layout, next, textScale, zoom),
    })
    // What was removed under the pointer never hears that the pointer has left it.
    const { hovered, hover } = useSelectionStore.getState()
    const stands = ({ units, streams }: Sheet, id: string) => units.has(id) || streams.has(id)
    if (hovered !== null && stands(sheet, hovered) && !stands(next, hovered)) hover(null)
  }
  follow()
  const endPlant = usePlantStore.subscribe(follow)
  const setTexts = () => {
    const { sheet, textScale, zoom } = useCanvasStore.getState()
    useCanvasStore.setState(texts(readLayout(), sheet, textScale, zoom))
  }
  const endTags = useTagStore.subscribe(setTexts)
  const endPlaces = useTagPlaces.subscribe(setTexts)
  const endUnits = useSettingsStore.subscribe((now, then) => {
    if (now.unitSet !== then.unitSet || now.unitOverrides !== then.unitOverrides) setTexts()
  })
  return () => {
    endPlant()
    endTags()
    endUnits()
    endPlaces()
    shownLayout = null
  }
}

function labelShapes(
  label: string,
  figure: string | undefined,
  scale: number,
): LabelRequest['shapes'] {
  const size = textSize * scale
  const line = lineHeight * scale
  const name = textWidth(label, size)
  const number = figure === undefined ? 0 : textWidth(figure, size)
  if (figure === undefined) return [{ arrangement: 'stacked', size: { width: name, height: line } }]
  const shapes: { arrangement: Arrangement; size: { width: number; height: number } }[] = [
    { arrangement: 'stacked', size: { width: Math.max(name, number), height: 2 * line } },
    { arrangement: 'beside', size: { width: name + number + 8 * scale, height: line } },
  ]
  const words = label.split(' ')
  if (words.length > 1 && name > number) {
    const widest = Math.max(...words.map((word) => textWidth(word, size)))
    shapes.push({
      arrangement: 'wrapped',
      size: { width: Math.max(widest, number), height: (words.length + 1) * line },
    })
  }
  return shapes
}

function figureOf(layout: Layout, { id, kind }: PlacedUnit): string | undefined {
  const chief = kindOf(kind)?.chief
  return chief === undefined ? undefined : usualFigure(layout, `${id}.${chief}`)
}

function texts(
  layout: Layout,
  sheet: Sheet,
  scale: number,
  zoom: number,
  earlier?: Pick<CanvasState, 'labels' | 'tags' | 'sheet'>,
): Pick<CanvasState, 'labels' | 'tags'> {
  const occupied = {
    bodies: [...sheet.units.values()].map((unit) => grown(unit.body, unit.symbol.overhang ?? 0)),
    streams: [...sheet.streams.values()] as { id: string; route: readonly Point[] }[],
  }
  for (const { id, generator, lines } of sheet.shafts.values()) {
    if (generator) occupied.bodies.push(generatorBox(generator))
    for (const route of lines) occupied.streams.push({ id, route })
  }
  const requests: LabelRequest[] = []
  for (const unit of sheet.units.values()) {
    if (unit.symbol.label.length === 0) continue
    if (unit.label === '') continue
    requests.push({
      id: unit.id,
      body: grown(unit.body, unit.symbol.overhang ?? 0),
      wish: unit.symbol.label,
      ...(unit.symbol.inside ? { inside: (size: Size) => insideOf(unit, size) } : {}),
      shapes: labelShapes(
        unit.label,
        zoom >= figuresFrom ? figureOf(layout, unit) : undefined,
        scale,
      ),
      anchors: Object.values(unit.anchors),
    })
  }
  for (const shaft of sheet.shafts.values()) {
    if (!shaft.generator) continue
    const line = lineHeight * scale
    requests.push({
      id: shaft.id,
      body: generatorBox(shaft.generator),
      wish: ['bottom', 'top', 'right', 'left'],
      shapes: [
        {
          arrangement: 'stacked',
          size: { width: textWidth(usualFigure(layout), textSize * scale), height: line },
        },
      ],
      anchors: [],
    })
  }
  // The label inside a turbine has no choice: it is set first.
  requests.sort((a, b) => Number(Boolean(b.inside)) - Number(Boolean(a.inside)))
  const stays = staying(sheet, earlier)
  const labels = placeLabels(requests, occupied, stays.labels)
  const whole = around([...labels.values(), ...(sheet.extent ? [sheet.extent] : [])])
  const bounds = whole && grown(whole, tagsBeyond)
  const tags = new Map<string, PlacedTag>()
  if (zoom >= tagsFrom) {
    const wanted = tagRequests(layout, sheet, scale)
    const { places } = useTagPlaces.getState()
    for (const request of wanted) {
      const at = places[request.id]
      const tag = at && tagAt(request, at)
      if (tag) tags.set(request.id, tag)
    }
    const others = wanted.filter(({ id }) => !tags.has(id))
    const set = placeTags(
      others,
      occupied,
      [...labels.values(), ...tags.values()],
      stays.tags,
      bounds,
    )
    for (const [id, tag] of set) tags.set(id, tag)
  }
  return earlier
    ? { labels: kept(earlier.labels, labels), tags: kept(earlier.tags, tags) }
    : { labels, tags }
}

/** While units are moved: their labels go along, tags of streams that change their course wait aside. */
function textsAlong(
  earlier: Pick<CanvasState, 'labels' | 'tags' | 'sheet'>,
  sheet: Sheet,
): Pick<CanvasState, 'labels' | 'tags'> {
  const labels = new Map<string, PlacedLabel>()
  for (const [id, label] of earlier.labels) {
    const before = earlier.sheet.units.get(id)
    const now = sheet.units.get(id)
    const generator = sheet.shafts.get(id)?.generator
    const generatorBefore = earlier.sheet.shafts.get(id)?.generator
    const [x, y] = now?.at ?? generator ?? [0, 0]
    const [x0, y0] = before?.at ?? generatorBefore ?? [x, y]
    labels.set(
      id,
      x === x0 && y === y0 ? label : { ...label, x: label.x + x - x0, y: label.y + y - y0 },
    )
  }
  const tags = new Map<string, PlacedTag>()
  for (const [id, tag] of earlier.tags) {
    if (sheet.streams.get(id)?.route === earlier.sheet.streams.get(id)?.route) tags.set(id, tag)
  }
  return { labels, tags }
}

function insideOf(unit: PlacedUnit, text: Size): Point | null {
  const at = unit.symbol.inside?.(unit.form, text)
  if (!at) return null
  const x = unit.mirrored ? unit.size.width - at[0] - text.width : at[0]
  return [unit.at[0] + x, unit.at[1] + at[1]]
}

/** Under way, the texts of what does not move need not be placed anew. */
function staying(sheet: Sheet, earlier?: Pick<CanvasState, 'labels' | 'tags' | 'sheet'>) {
  const labels = new Map<string, PlacedLabel>()
  const tags = new Map<string, PlacedTag | null>()
  if (!earlier) return { labels, tags }
  for (const [id, label] of earlier.labels) {
    const unit = sheet.units.get(id)
    const shaft = sheet.shafts.get(id)
    if (
      (unit && earlier.sheet.units.get(id) === unit) ||
      (shaft && earlier.sheet.shafts.get(id) === shaft)
    ) {
      labels.set(id, label)
    }
  }
  for (const [id, stream] of sheet.streams) {
    if (earlier.sheet.streams.get(id) === stream) tags.set(id, earlier.tags.get(id) ?? null)
  }
  return { labels, tags }
}

/** Texts that stand where they stood keep their identity and are not painted again. */
function kept<T extends PlacedLabel | PlacedTag>(
  earlier: ReadonlyMap<string, T>,
  later: Map<string, T>,
): Map<string, T> {
  for (const [id, one] of later) {
    const before = earlier.get(id)
    if (
      before &&
      before.x === one.x &&
      before.y === one.y &&
      before.width === one.width &&
      before.height === one.height &&
      before.align === one.align &&
      sameLeader(before, one)
    ) {
      later.set(id, before)
    }
  }
  return later
}

function sameLeader(a: PlacedLabel | PlacedTag, b: PlacedLabel | PlacedTag): boolean {
  if (!('leader' in a) || !('leader' in b)) return !('leader' in a) && !('leader' in b)
  return (
    a.leader.length === b.leader.length &&
    a.leader.every((point, i) => point[0] === b.leader[i]?.[0] && point[1] === b.leader[i]?.[1])
  )
}

/** Which streams carry a tag, those that the user has given numbers for first. */
function tagRequests(layout: Layout, sheet: Sheet, scale: number) {
  const choice: TagChoice = useTagStore.getState()
  if (choice.which === 'none' || choice.quantities.length === 0) return []
  const size = textSize * scale
  const parts = choice.quantities.map((name) => textWidth(usualPart(name), size))
  const line = lineHeight * scale
  const column = Math.max(...parts)
  const shapes = [1, 2, 3, 4].flatMap((lines) => {
    if (lines > parts.length) return []
    const perLine = Math.ceil(parts.length / lines)
    if (Math.ceil(parts.length / perLine) !== lines) return []
    let width = 0
    for (let i = 0; i < parts.length; i += perLine) {
      const row = parts.slice(i, i + perLine)
      width = Math.max(
        width,
        row.reduce((sum, part) => sum + part + 8 * scale, -8 * scale),
      )
    }
    return [
      {
        lines,
        size: { width: Math.max(width, lines === parts.length ? column : 0), height: lines * line },
      },
    ]
  })
  // Two lines read best; then three, then one.
  shapes.sort((a, b) => Math.abs(a.lines - 2) - Math.abs(b.lines - 2))
  return layout.streams
    .filter((stream) => {
      if (choice.which === 'all') return true
      return (
        Object.keys(stream.given).length > 0 ||
        (choice.which === 'chief' && isChief(layout, stream))
      )
    })
    .sort((a, b) => Object.keys(b.given).length - Object.keys(a.given).length)
    .flatMap(({ id }) => {
      const route = sheet.streams.get(id)?.route
      return route ? [{ id, route, shapes }] : []
    })
}

/** The streams that a reader looks for first: what machines give off at a pressure of its own. */
function isChief(layout: Layout, stream: Layout['streams'][number]): boolean {
  const dot = stream.from.indexOf('.')
  const unit = layout.units.find((one) => one.id === stream.from.slice(0, dot))
  const kind = unit && kindOf(unit.kind)
  const port = kind?.ports[stream.from.slice(dot + 1)]
  return Boolean(
    kind?.chief !== undefined && port?.pressure === 'own' && !port.optional && !port.repeated,
  )
}
