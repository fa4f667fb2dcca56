import { addUnit, kinds, moveUnits, type Plant, portsOf } from '../../src/document.ts'
import { usePlantStore } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { useCanvasStore } from './canvas-store.ts'
import { refuse, type SheetPort, say, useConnectingStore } from './connecting-store.ts'
import { onGrid, outward, type Point } from './geometry.ts'
import { connectEnds, judge, layoutOf, wayOf } from './joins.ts'
import { type KindItem, openKindMenu } from './kind-menu-store.ts'
import { freeSpot } from './placing.ts'
import { placesOf } from './ports.ts'
import { placeUnits } from './standing.ts'
import { withAxesKept, withEndsTurned } from './steady.ts'
import { symbolOf } from './symbols/index.ts'
import { toClient } from './view.ts'

/** A stream that ends on bare paper: what can come there is offered, and placed and connected at once. */

const groups = ['Machines', 'Heaters', 'Heat', 'Vessels', 'Lines', 'Edges']
const plainForm = { options: {}, counts: {} }

/** The kinds that can be connected to a port, each with the port that takes the stream. */
export function offersFor(plant: Plant, layoutId: string, from: string): KindItem[] {
  const layout = layoutOf(plant, layoutId)
  const way = wayOf(layout, from)
  const own = layout.units.find((unit) => from.startsWith(`${unit.id}.`))
  const carried = own && portsOf(layout, own).find(({ name }) => from === `${own.id}.${name}`)
  const carries = carried?.description.carries ?? 'any'
  const found = kinds.flatMap((kind) => {
    const trial = addUnit(plant, layoutId, kind.name, [0, 0])
    const tried = layoutOf(trial.plant, layoutId)
    const unit = tried.units.find(({ id }) => id === trial.id)
    if (!unit) return []
    const fitting = portsOf(tried, unit).filter(
      ({ name, description }) =>
        description.direction !== way && judge(tried, from, `${unit.id}.${name}`).allowed,
    )
    const required = fitting.filter(({ description }) => !description.optional)
    // An optional port alone (a spray, a vent) makes no unit that follows.
    const meant = required.length > 0 ? required : fitting.slice(0, kind.group === 'Edges' ? 1 : 0)
    return meant.map((port) => ({
      item: {
        kind: kind.name,
        label: kind.label,
        detail: port.description.label,
        port: port.name,
      },
      rank:
        (port.description.carries === carries ? 0 : 100) +
        groups.indexOf(kind.group) * 10 +
        (meant.length > 1 ? meant.indexOf(port) : 0),
    }))
  })
  return found.sort((a, b) => a.rank - b.rank).map(({ item }) => item)
}

/** Offers what can come at a point of the sheet, or, without one, near the port. */
export function offerFollowing(from: SheetPort, at: Point | null): void {
  const { plant, layoutId } = usePlantStore.getState()
  const items = offersFor(plant, layoutId, from.reference)
  const [ox, oy] = outward[from.side]
  const point: Point = at ?? [from.point[0] + 24 * ox, from.point[1] + 24 * oy]
  useConnectingStore.setState({
    connecting: { from, targets: [], pointer: point, over: null, stream: null },
    choosing: null,
  })
  const end = () => useConnectingStore.setState({ connecting: null })
  openKindMenu({
    title: from.direction === 'out' ? 'What follows' : 'What comes before',
    items,
    at: toClient(point),
    take(item) {
      end()
      placeFollowing(from, item, at)
    },
    close() {
      end()
      document.querySelector<HTMLElement>('.canvas')?.focus({ preventScroll: true })
    },
  })
}

/** Places a kind with its port at a point, or in the free spot before the port, and connects the two. */
export function placeFollowing(from: SheetPort, item: KindItem, at: Point | null): void {
  const { edit, layoutId } = usePlantStore.getState()
  const { sheet } = useCanvasStore.getState()
  const symbol = symbolOf(item.kind)
  const size = symbol.size(plainForm)
  const port = item.port ?? ''
  const lie = { symbol, form: plainForm, mirrored: false, upended: false, at: [0, 0] as Point }
  const place = placesOf(lie, port)?.[0] ?? { x: 0, y: 0 }
  const [ox, oy] = outward[from.side]
  const corner = at
    ? ([onGrid(at[0] - place.x), onGrid(at[1] - place.y)] as Point)
    : freeSpot(size, [
        from.point[0] + ox * (72 + size.width / 2),
        from.point[1] + oy * (72 + size.height / 2),
      ])
  let id = ''
  try {
    edit(`Place ${item.label.toLowerCase()}`, (plant) => {
      const added = addUnit(plant, layoutId, item.kind, corner)
      id = added.id
      const joined = connectEnds(
        added.plant,
        layoutId,
        { port: from.reference },
        { port: `${id}.${port}` },
        (stream) => sheet.streams.get(stream)?.route,
      )
      const steady = withAxesKept(layoutOf(added.plant, layoutId), joined.plant)
      const turned = withEndsTurned(steady, layoutId, joined.id)
      return at ? withPortAt(turned, layoutId, id, port, at) : turned
    })
  } catch (error) {
    refuse(error instanceof Error ? error.message : `${item.label} cannot come here.`, corner)
    return
  }
  useSelectionStore.getState().select([id])
  document.querySelector<HTMLElement>('.canvas')?.focus({ preventScroll: true })
  say(`${item.label} placed and connected.`)
}

/** A mirrored unit has its port on the other side: it is moved so that the port is where it was wanted. */
function withPortAt(plant: Plant, layoutId: string, id: string, port: string, at: Point): Plant {
  const anchor = placeUnits(layoutOf(plant, layoutId)).get(id)?.anchors[port]
  if (!anchor) return plant
  return moveUnits(plant, layoutId, [id], [onGrid(at[0] - anchor.x), onGrid(at[1] - anchor.y)])
}
