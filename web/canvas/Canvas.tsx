import { useCallback, useEffect, useMemo, useRef, useState } from 'react'
import {
  type Edge,
  type EdgeChange,
  type EdgeTypes,
  type Node,
  type NodeChange,
  type NodeTypes,
  Position,
  ReactFlow,
  ReactFlowProvider,
  SelectionMode,
  useReactFlow,
  ViewportPortal,
} from 'reactflow'
import 'reactflow/dist/base.css'
import './canvas.css'
import './print.css'
import { moveUnits } from '../../src/document.ts'
import { editLayout, usePlantStore } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { Announcer, ResultAnnouncer } from './Announcer.tsx'
import { CanvasControls } from './CanvasControls.tsx'
import { ConnectionPreview } from './ConnectionPreview.tsx'
import { followPlant, tagsBeyond, useCanvasStore } from './canvas-store.ts'
import { EmptyCanvas } from './EmptyCanvas.tsx'
import { FirstSteps } from './FirstSteps.tsx'
import { useFirstSteps } from './first-steps-store.ts'
import { around, type Box, type Point } from './geometry.ts'
import { KindMenu } from './KindMenu.tsx'
import { onCanvasKey } from './keyboard.ts'
import { Legend } from './Legend.tsx'
import { motion } from './motion.ts'
import { pin } from './pin-store.ts'
import { insertWhereDropped, rememberStreams } from './placing.ts'
import { preparePrinting } from './printing.ts'
import { RenameField } from './RenameField.tsx'
import { startRenaming } from './rename-store.ts'
import { ShaftLines } from './ShaftLines.tsx'
import { StreamEdge } from './StreamEdge.tsx'
import { streamNameId, unitNameId } from './spoken-names.tsx'
import type { PlacedUnit } from './standing.ts'
import { Texts } from './Texts.tsx'
import { UnitNode } from './UnitNode.tsx'
import { useCanvasCommands } from './use-canvas-commands.ts'
import { setView } from './view.ts'

const nodeTypes: NodeTypes = { unit: UnitNode }
const edgeTypes: EdgeTypes = { stream: StreamEdge }
const snapGrid: [number, number] = [8, 8]
const deleteKeys: string[] = []
const noData = {}

interface Props {
  readonly onOpenExample?: () => void
  readonly onOpenFile?: () => void
}

/** The flowsheet: units, streams and shafts of the layout shown. Fills its box. */
export default function Canvas(props: Props) {
  return (
    <ReactFlowProvider>
      <Flow {...props} />
    </ReactFlowProvider>
  )
}

function Flow({ onOpenExample, onOpenFile }: Props) {
  const box = useRef<HTMLDivElement>(null)
  const flow = useReactFlow()
  const nodes = useNodes()
  const edges = useEdges()
  const empty = useCanvasStore((state) => state.sheet.units.size === 0)
  const opened = usePlantStore((state) => state.opened)
  const layoutId = usePlantStore((state) => state.layoutId)
  const title = usePlantStore((state) => state.plant.title)
  // A finger on bare paper moves the sheet, a mouse draws a box of selection.
  const [touch, setTouch] = useState(() => window.matchMedia('(pointer: coarse)').matches)

  const units = useUnitChoice()
  /** The whole sheet is in view, and stays so while the user moves nothing. */
  const whole = useRef(true)

  useEffect(() => followPlant(), [])
  useEffect(() => (box.current ? preparePrinting(box.current) : undefined), [])

  const showWhole = useCallback(
    (duration = 0) => {
      const canvas = box.current?.getBoundingClientRect()
      if (!canvas) return
      whole.current = true
      // Texts grow as the sheet shrinks: they are set for the new zoom before it is fitted for good.
      useCanvasStore.getState().setZoom(fitted(canvas).zoom)
      void flow.setViewport(fitted(canvas), { duration })
    },
    [flow],
  )

  useEffect(() => {
    setView({
      toSheet: ([x, y]) => {
        const at = flow.screenToFlowPosition({ x, y }, { snapToGrid: false })
        return [at.x, at.y]
      },
      toClient: ([x, y]) => {
        const at = flow.flowToScreenPosition({ x, y })
        return [at.x, at.y]
      },
      box: () => box.current?.getBoundingClientRect() ?? new DOMRect(),
    })
    return () => setView(null)
  }, [flow])

  // Another plant, or another layout of it, is shown whole.
  // biome-ignore lint/correctness/useExhaustiveDependencies: these two are what it waits for
  useEffect(() => {
    const frame = requestAnimationFrame(() => showWhole())
    return () => cancelAnimationFrame(frame)
  }, [opened, layoutId, showWhole])

  // Numbers in other units may need more room.
  // biome-ignore lint/correctness/useExhaustiveDependencies: the units are what it waits for
  useEffect(() => {
    if (!whole.current) return
    const frame = requestAnimationFrame(() => showWhole())
    return () => cancelAnimationFrame(frame)
  }, [units, showWhole])

  useCanvasCommands(showWhole)

  const onViewportChange = useCallback(({ zoom }: { zoom: number }) => {
    box.current?.style.setProperty('--zoom', String(zoom))
    useCanvasStore.getState().setZoom(zoom)
  }, [])

  return (
    // Keys reach the units and streams within, which have the focus.
    // biome-ignore lint/a11y/noStaticElementInteractions: see above
    <div
      ref={box}
      className="canvas"
      tabIndex={-1}
      onKeyDown={onCanvasKey}
      data-title={title}
      onPointerDownCapture={(event) => {
        adding = event.shiftKey
        setTouch(event.pointerType === 'touch')
      }}
      onPointerDown={(event) => {
        // Keys after a click on bare paper are meant for the canvas.
        if (event.target instanceof Element && event.target.matches('.react-flow__pane')) {
          box.current?.focus({ preventScroll: true })
        }
      }}
    >
      <ReactFlow
        nodes={nodes}
        edges={edges}
        nodeTypes={nodeTypes}
        edgeTypes={edgeTypes}
        onNodesChange={onNodesChange}
        onEdgesChange={onEdgesChange}
        onNodeDragStart={rememberStreams}
        onSelectionDragStart={rememberStreams}
        onNodeDragStop={dropMoved}
        onSelectionDragStop={dropMoved}
        onNodeMouseEnter={hoverOn}
        onNodeMouseMove={hoverOn}
        onNodeMouseLeave={hoverOff}
        onEdgeMouseEnter={hoverOn}
        onEdgeMouseMove={hoverOn}
        onEdgeMouseLeave={hoverOff}
        onNodeDoubleClick={renameItem}
        onEdgeDoubleClick={renameItem}
        onPaneClick={clearSelection}
        onViewportChange={onViewportChange}
        onMoveStart={(event) => {
          if (event) whole.current = false
        }}
        snapToGrid
        snapGrid={snapGrid}
        nodesConnectable={false}
        nodesFocusable
        edgesFocusable
        disableKeyboardA11y
        deleteKeyCode={deleteKeys}
        selectionOnDrag={!touch}
        selectionMode={SelectionMode.Partial}
        panOnDrag={touch || panButtons}
        panActivationKeyCode="Space"
        multiSelectionKeyCode="Shift"
        selectNodesOnDrag={false}
        elevateNodesOnSelect={false}
        zoomOnDoubleClick={false}
        minZoom={0.2}
        maxZoom={3}
        proOptions={proOptions}
        ariaLabelConfig={descriptions}
      >
        <ViewportPortal>
          <ShaftLines />
          <Texts />
          <ConnectionPreview />
          <RenameField />
        </ViewportPortal>
      </ReactFlow>
      {empty && (
        <EmptyCanvas
          {...(onOpenExample ? { onOpenExample } : {})}
          {...(onOpenFile ? { onOpenFile } : {})}
        />
      )}
      {!empty && <FirstSteps />}
      <footer className="canvas-foot">
        <Legend />
        <CanvasControls onFit={() => showWhole(motion())} />
      </footer>
      <KindMenu />
      <Announcer />
      <ResultAnnouncer />
    </div>
  )
}

const panButtons = [1]
const descriptions = {
  'edge.a11yDescription.default': 'Enter selects, Delete removes, arrows lead on to the units.',
}
const proOptions = { hideAttribution: true }

/** Room under the drawing for the legend, and round it, px. */
const plainFoot = 52
const footWithHint = 92
const margin = tagsBeyond

/** The view that shows the whole sheet, texts included; never magnified. */
function fitted(canvas: DOMRect) {
  const { sheet, labels } = useCanvasStore.getState()
  const boxes: Box[] = [...labels.values()]
  if (sheet.extent) boxes.push(sheet.extent)
  const extent = around(boxes)
  if (!extent || canvas.width === 0) return { x: 0, y: 0, zoom: 1 }
  const foot = useFirstSteps.getState().step === null ? plainFoot : footWithHint
  const zoom = Math.max(
    0.2,
    Math.min(
      1,
      (canvas.width - 2 * margin) / extent.width,
      (canvas.height - 2 * margin - foot) / extent.height,
    ),
  )
  return {
    x: (canvas.width - extent.width * zoom) / 2 - extent.x * zoom,
    y:
      margin +
      Math.max(0, (canvas.height - foot - 2 * margin - extent.height * zoom) / 2) -
      extent.y * zoom,
    zoom,
  }
}

/** React Flow's nodes, each the same object until its own unit moves or is selected. */
function useNodes(): Node[] {
  const units = useCanvasStore((state) => state.sheet.units)
  const selected = useSelectionStore((state) => state.selected)
  const kept = useRef(new Map<string, { unit: PlacedUnit; selected: boolean; node: Node }>())
  return useMemo(() => {
    const next: typeof kept.current = new Map()
    for (const unit of units.values()) {
      const isSelected = selected.includes(unit.id)
      const earlier = kept.current.get(unit.id)
      next.set(
        unit.id,
        earlier && earlier.unit === unit && earlier.selected === isSelected
          ? earlier
          : { unit, selected: isSelected, node: nodeOf(unit, isSelected) },
      )
    }
    kept.current = next
    return [...next.values()].map((one) => one.node)
  }, [units, selected])
}

function nodeOf(unit: PlacedUnit, selected: boolean): Node {
  const { id, at, size } = unit
  const handle = { x: size.width / 2, y: size.height / 2, width: 1, height: 1, id: null }
  return {
    id,
    type: 'unit',
    position: { x: at[0], y: at[1] },
    data: noData,
    width: size.width,
    height: size.height,
    measured: size,
    handles: [
      { ...handle, type: 'source', position: Position.Right },
      { ...handle, type: 'target', position: Position.Left },
    ],
    selected,
    ariaRole: 'button',
    domAttributes: {
      'aria-labelledby': unitNameId(id),
      'aria-pressed': selected,
      'aria-roledescription': 'unit',
    },
  }
}

function useEdges(): Edge[] {
  const layout = usePlantStore((state) =>
    state.plant.layouts.find((one) => one.id === state.layoutId),
  )
  const selected = useSelectionStore((state) => state.selected)
  const kept = useRef(new Map<string, Edge>())
  return useMemo(() => {
    const next = new Map<string, Edge>()
    for (const { id, from, to } of layout?.streams ?? []) {
      const source = from.slice(0, from.indexOf('.'))
      const target = to.slice(0, to.indexOf('.'))
      const isSelected = selected.includes(id)
      const earlier = kept.current.get(id)
      next.set(
        id,
        earlier &&
          earlier.source === source &&
          earlier.target === target &&
          earlier.selected === isSelected
          ? earlier
          : {
              id,
              source,
              target,
              type: 'stream',
              selected: isSelected,
              ariaRole: 'button',
              domAttributes: {
                'aria-labelledby': streamNameId(id),
                'aria-pressed': isSelected,
                'aria-roledescription': 'stream',
              },
            },
      )
    }
    kept.current = next
    return [...next.values()]
  }, [layout, selected])
}

function onNodesChange(changes: NodeChange[]): void {
  let moved: Map<string, Point> | null = null
  for (const change of changes) {
    if (change.type !== 'position' || !change.position || change.dragging !== true) continue
    moved ??= new Map(useCanvasStore.getState().moved ?? [])
    moved.set(change.id, [change.position.x, change.position.y])
  }
  if (moved && somethingMoved(moved)) useCanvasStore.getState().move(moved)
  select(changes)
}

function onEdgesChange(changes: EdgeChange[]): void {
  select(changes)
}

function somethingMoved(moved: ReadonlyMap<string, Point>): boolean {
  const { units } = useCanvasStore.getState().sheet
  for (const [id, [x, y]] of moved) {
    const at = units.get(id)?.at
    if (at && (at[0] !== x || at[1] !== y)) return true
  }
  return false
}

/** The pointer went down with Shift: what it selects joins what is selected. */
let adding = false

/** React Flow says what comes and goes; the selection itself is the window's. */
function select(changes: readonly (NodeChange | EdgeChange)[]): void {
  const { selected, select: set } = useSelectionStore.getState()
  let next = selected
  // React Flow lets go of units and streams only: a shaft, or the plant, it does not know.
  if (!adding && changes.some((change) => change.type === 'select' && change.selected)) {
    const { units, streams } = useCanvasStore.getState().sheet
    next = next.filter((id) => units.has(id) || streams.has(id))
  }
  for (const change of changes) {
    if (change.type !== 'select') continue
    next = change.selected
      ? next.includes(change.id)
        ? next
        : [...next, change.id]
      : next.filter((id) => id !== change.id)
  }
  if (next.length !== selected.length || next.some((id, i) => id !== selected[i])) set(next)
}

let drags = 0

/** A move ends: one step of undo, whatever way it took. */
function dropMoved(): void {
  const { moved, move } = useCanvasStore.getState()
  if (!moved) return
  const layout = usePlantStore
    .getState()
    .plant.layouts.find((one) => one.id === usePlantStore.getState().layoutId)
  const merge = `move ${++drags}`
  // Units that moved alike go together.
  const ways = new Map<string, { by: Point; ids: string[] }>()
  for (const [id, [x, y]] of moved) {
    const at = layout?.units.find((unit) => unit.id === id)?.at
    if (!at || (at[0] === x && at[1] === y)) continue
    const by: Point = [x - at[0], y - at[1]]
    const key = by.join()
    const way = ways.get(key) ?? { by, ids: [] }
    way.ids.push(id)
    ways.set(key, way)
  }
  if (ways.size === 0) {
    move(null)
    return
  }
  const count = moved.size
  for (const { by, ids } of ways.values()) {
    editLayout(
      count === 1 ? 'Move unit' : `Move ${count} units`,
      (plant, layoutId) => moveUnits(plant, layoutId, ids, by),
      { merge },
    )
  }
  useCanvasStore.setState({ moved: null })
  pin([...moved.keys()])
  const [only] = moved.keys()
  if (count === 1 && only) insertWhereDropped(only)
}

function hoverOn(_: unknown, item: { readonly id: string }): void {
  useSelectionStore.getState().hover(item.id)
}

function hoverOff(): void {
  useSelectionStore.getState().hover(null)
}

function renameItem(_: unknown, item: { readonly id: string }): void {
  startRenaming(item.id)
}

function clearSelection(event: React.MouseEvent): void {
  if (!event.shiftKey) useSelectionStore.getState().select([])
}
