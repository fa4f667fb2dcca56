import { createElement } from 'react'
import { flushSync } from 'react-dom'
import { createRoot } from 'react-dom/client'
import { usePlantStore } from '../store/plant-store.ts'
import { useNoticeStore } from '../strip/notice-store.ts'
import { downloadBlob, downloadText, fileStem } from './download.ts'
import { readDrawingSource } from './drawing-source.ts'
import { type DrawingOptions, PlantDrawing } from './PlantDrawing.tsx'
import { pngOf, standaloneSvg } from './standalone-svg.ts'
import { titleLines } from './title-lines.ts'

export interface DrawingChoice {
  readonly frame: boolean
  readonly legend: boolean
}

/** The plant as the text of an SVG file. */
export function plantSvg({ frame, legend }: DrawingChoice): string {
  const { title, lines } = titleLines()
  const options: DrawingOptions = { legend, ...(frame ? { frame: { title, lines } } : {}) }
  const place = document.createElement('div')
  place.className = 'light-sheet'
  Object.assign(place.style, { position: 'fixed', left: '-20000px', top: '0' })
  document.body.append(place)
  const root = createRoot(place)
  try {
    flushSync(() =>
      root.render(createElement(PlantDrawing, { source: readDrawingSource(), options })),
    )
    const svg = place.querySelector('svg')
    if (!svg) throw new Error('The drawing could not be made.')
    return standaloneSvg(svg, { title: `${title}, ${lines[0] ?? ''}` })
  } finally {
    root.unmount()
    place.remove()
  }
}

/** Saves the plant as a drawing. */
export async function saveDrawing(kind: 'svg' | 'png', choice: DrawingChoice): Promise<void> {
  try {
    const svg = plantSvg(choice)
    const { title, lines } = titleLines()
    const stem = fileStem(usePlantStore.getState().plant.title || title, lines[0] ?? '', 'diagram')
    if (kind === 'svg') downloadText(`${stem}.svg`, svg, 'image/svg+xml')
    else downloadBlob(`${stem}.png`, await pngOf(svg, 3))
  } catch (error) {
    useNoticeStore.getState().say({
      id: 'drawing',
      severity: 'error',
      text: `${error instanceof Error ? error.message : 'The drawing could not be made.'} Try the other kind of file.`,
    })
  }
}
