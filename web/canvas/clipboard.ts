import { copyItems, type Plant, pasteItems, readPlant, writePlant } from '../../src/document.ts'
import { editLayout, readLayout, usePlantStore } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { useCanvasStore } from './canvas-store.ts'
import { refuse, say } from './connecting-store.ts'
import { around, type Box, onGrid, overlap, type Point } from './geometry.ts'
import { removeSelected, selectedUnits } from './removing.ts'
import { placeUnits } from './standing.ts'
import { middleOfCanvas, sheetInView } from './view.ts'

/**
 * Units go over the system's clipboard as the text of a plant file, from window to window, into a
 * letter and back.
 */

/** The text last copied here, for browsers that keep the clipboard from being read. */
let lastCopied = ''
/** How often it has been pasted: each copy stands a little further. */
let pasted = 0
const step = 24

const unitsText = (count: number) => (count === 1 ? '1 unit' : `${count} units`)

/** The selected units and the streams between them, as text; nothing while no unit is selected. */
export function copySelected(): string | null {
  const ids = selectedUnits()
  if (ids.length === 0) return null
  const { plant, layoutId } = usePlantStore.getState()
  lastCopied = writePlant(copyItems(plant, layoutId, ids))
  pasted = 0
  say(`${unitsText(ids.length)} copied.`)
  return lastCopied
}

export function cutSelected(): string | null {
  const text = copySelected()
  if (text === null) return null
  const { length } = selectedUnits()
  removeSelected('Cut')
  say(`${unitsText(length)} cut.`)
  return text
}

/** Pastes what a plant file's text holds; says why not, where it holds nothing. */
export function pasteText(text: string): void {
  const read = readPlant(text)
  const units = read.outcome === 'plant' ? (read.plant.layouts[0]?.units ?? []) : []
  if (read.outcome !== 'plant' || units.length === 0) {
    refuse('The clipboard holds no units: copy some here or in another window.', middleOfCanvas())
    return
  }
  const by = wayFor(read.plant, text)
  let ids: readonly string[] = []
  editLayout(`Paste ${unitsText(units.length)}`, (plant, layoutId) => {
    const result = pasteItems(plant, layoutId, read.plant, by)
    ids = result.ids
    return result.plant
  })
  selectPasted(ids)
  say(`${unitsText(units.length)} pasted.`)
}

/** Selects the units among what has come. */
export function selectPasted(ids: readonly string[]): void {
  const units = new Set(readLayout().units.map(({ id }) => id))
  useSelectionStore.getState().select(ids.filter((id) => units.has(id)))
  document.querySelector<HTMLElement>('.canvas')?.focus({ preventScroll: true })
}

/** How far what is pasted moves: beside where it was, or into the middle of what is seen. */
function wayFor(part: Plant, text: string): Point {
  if (text !== lastCopied) {
    lastCopied = text
    pasted = 0
  }
  const [layout] = part.layouts
  const extent = layout && around([...placeUnits(layout).values()].map(({ body }) => body))
  if (!extent) return [0, 0]
  const seen = sheetInView()
  const there = [...useCanvasStore.getState().sheet.units.values()]
  const moved = (by: Point): Box => ({ ...extent, x: extent.x + by[0], y: extent.y + by[1] })
  const free = !there.some(({ body }) => overlap(body, extent))
  if (pasted === 0 && free && seen && overlap(seen, extent)) {
    pasted = 1
    return [0, 0]
  }
  pasted++
  const beside: Point = [step * pasted, step * pasted]
  if (seen && overlap(seen, moved(beside))) return beside
  const middle = middleOfCanvas()
  return [
    onGrid(middle[0] - extent.x - extent.width / 2) + step * (pasted - 1),
    onGrid(middle[1] - extent.y - extent.height / 2) + step * (pasted - 1),
  ]
}

/** True where the keys mean text: a field has the focus, or text is marked. */
function meansText(event: ClipboardEvent): boolean {
  const { target } = event
  if (target instanceof HTMLElement && target.matches('input, textarea, select')) return true
  if (document.querySelector('dialog[open]')) return true
  return event.type !== 'paste' && (document.getSelection()?.toString() ?? '') !== ''
}

/** From now on the browser's copy, cut and paste mean the units selected; returns what ends that. */
export function listenForClipboard(): () => void {
  const give = (event: ClipboardEvent) => {
    if (meansText(event)) return
    const text = event.type === 'cut' ? cutSelected() : copySelected()
    if (text === null) return
    event.clipboardData?.setData('text/plain', text)
    event.preventDefault()
  }
  const take = (event: ClipboardEvent) => {
    if (meansText(event)) return
    event.preventDefault()
    pasteText(event.clipboardData?.getData('text/plain') ?? '')
  }
  document.addEventListener('copy', give)
  document.addEventListener('cut', give)
  document.addEventListener('paste', take)
  return () => {
    document.removeEventListener('copy', give)
    document.removeEventListener('cut', give)
    document.removeEventListener('paste', take)
  }
}

/** Hands text to the system's clipboard from a menu, where no clipboard event is at hand. */
export function writeClipboard(text: string | null): void {
  if (text === null) return
  // Refused by the browser: pasting within this window works all the same.
  navigator.clipboard?.writeText(text).catch(() => {})
}

export function pasteFromClipboard(): void {
  const reading = navigator.clipboard?.readText?.()
  if (reading) reading.then(pasteText, () => pasteText(lastCopied))
  else pasteText(lastCopied)
}
