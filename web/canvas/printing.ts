import { useCanvasStore } from './canvas-store.ts'
import { around, type Box } from './geometry.ts'

/** What fits on a landscape sheet of A4 and of letter alike, margins off, CSS px. */
const page = { width: 968, height: 700 }
/** Room for the title above and the legend below, px. */
const head = 36
const foot = 44

/** How the whole sheet is moved and scaled on to the printed page. */
export function printTransform(): string {
  const { sheet, labels, tags } = useCanvasStore.getState()
  const boxes: Box[] = [...labels.values(), ...tags.values()]
  if (sheet.extent) boxes.push(sheet.extent)
  const extent = around(boxes)
  if (!extent) return 'none'
  const room = page.height - head - foot
  const zoom = Math.min(1.4, page.width / extent.width, room / extent.height)
  const x = (page.width - extent.width * zoom) / 2 - extent.x * zoom
  const y = head + (room - extent.height * zoom) / 2 - extent.y * zoom
  return `translate(${x}px, ${y}px) scale(${zoom})`
}

/** From now on the canvas fits the page when it is printed; returns what ends that. */
export function preparePrinting(canvas: HTMLElement): () => void {
  const prepare = () => canvas.style.setProperty('--print-transform', printTransform())
  window.addEventListener('beforeprint', prepare)
  return () => window.removeEventListener('beforeprint', prepare)
}

export function printSheet(): void {
  window.print()
}
