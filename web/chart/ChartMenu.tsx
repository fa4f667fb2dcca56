import { type ReactNode, type RefObject, useEffect, useRef, useState } from 'react'
import { downloadBlob, downloadText, fileStem } from '../export/download.ts'
import { pngOf, standaloneSvg } from '../export/standalone-svg.ts'
import { useGhostStore } from '../store/ghost-store.ts'
import { readLayout, usePlantStore } from '../store/plant-store.ts'
import { readUnitChoice } from '../store/settings-store.ts'
import { useNoticeStore } from '../strip/notice-store.ts'
import { type ChartName, useChartSettings } from './chart-settings.ts'
import { readChartSource } from './chart-source.ts'
import { chartText } from './chart-text.ts'

interface Props {
  readonly chart: ChartName
  readonly title: string
  /** What holds the chart. */
  readonly body: RefObject<HTMLElement | null>
  readonly icon: ReactNode
}

function say(severity: 'error' | 'remark', text: string): void {
  useNoticeStore.getState().say({ id: 'chart', severity, text })
}

/** The chart as an SVG file's text, or nothing while there is none. */
function svgOf(body: HTMLElement | null, title: string): string | null {
  const svg = body?.querySelector<SVGSVGElement>('.chart-picture svg')
  return svg ? standaloneSvg(svg, { within: 'chart-picture', title }) : null
}

/** What can be done with a chart: lines of dryness, files, data. */
export function ChartMenu({ chart, title, body, icon }: Props) {
  const [open, setOpen] = useState(false)
  const place = useRef<HTMLDivElement>(null)
  const button = useRef<HTMLButtonElement>(null)
  const dryness = useChartSettings((settings) => settings.dryness)
  const change = useChartSettings((settings) => settings.change)
  const ghost = useGhostStore((state) => state.ghost)

  const items = () =>
    Array.from(place.current?.querySelectorAll<HTMLElement>('[role^="menuitem"]') ?? [])
  useEffect(() => {
    if (!open) return
    items()[0]?.focus()
    const leave = (event: PointerEvent) => {
      if (!place.current?.contains(event.target as Node)) setOpen(false)
    }
    window.addEventListener('pointerdown', leave, true)
    return () => window.removeEventListener('pointerdown', leave, true)
  })

  const name = () => fileStem(usePlantStore.getState().plant.title, readLayout().name, title)
  const actions: readonly { readonly name: string; readonly checked?: boolean; run(): void }[] = [
    ...(chart === 'ts' || chart === 'hs'
      ? [
          {
            name: 'Lines of constant dryness',
            checked: dryness,
            run: () => change({ dryness: !dryness }),
          },
        ]
      : []),
    ...(ghost ? [{ name: 'Forget the ghost', run: () => useGhostStore.getState().forget() }] : []),
    {
      name: 'Copy as data',
      run() {
        const text = chartText(chart, readChartSource(), readUnitChoice())
        navigator.clipboard.writeText(text).then(
          () => say('remark', 'The chart’s data are on the clipboard, ready for a spreadsheet.'),
          () => say('error', 'The browser does not let the window copy. Save the tables instead.'),
        )
      },
    },
    {
      name: 'Save as SVG',
      run() {
        const svg = svgOf(body.current, title)
        if (svg) downloadText(`${name()}.svg`, svg, 'image/svg+xml')
      },
    },
    {
      name: 'Save as PNG',
      run() {
        const svg = svgOf(body.current, title)
        if (!svg) return
        pngOf(svg, 3).then(
          (picture) => downloadBlob(`${name()}.png`, picture),
          (error: Error) => say('error', error.message),
        )
      },
    },
  ]

  const close = () => {
    setOpen(false)
    button.current?.focus()
  }
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: keys bubble up here from the menu's items.
    <div
      ref={place}
      className="chart-menu-place"
      onKeyDown={(event) => {
        if (!open) return
        const all = items()
        const at = all.indexOf(document.activeElement as HTMLElement)
        const step = { ArrowDown: 1, ArrowUp: -1 }[event.key]
        if (step) all[(at + step + all.length) % all.length]?.focus()
        else if (event.key === 'Escape') close()
        else if (event.key === 'Tab') setOpen(false)
        else return
        if (event.key !== 'Tab') event.preventDefault()
        event.stopPropagation()
      }}
    >
      <button
        ref={button}
        type="button"
        className="icon-button"
        aria-haspopup="menu"
        aria-expanded={open}
        aria-label="More of this chart"
        title="Save, copy and more"
        onClick={() => setOpen(!open)}
      >
        {icon}
      </button>
      {open && (
        <div className="chart-menu" role="menu" aria-label="More of this chart">
          {actions.map(({ name: words, checked, run }) => (
            <button
              key={words}
              type="button"
              {...(checked === undefined
                ? { role: 'menuitem' }
                : { role: 'menuitemcheckbox', 'aria-checked': checked })}
              tabIndex={-1}
              onClick={() => {
                close()
                run()
              }}
            >
              <span className="menu-check">{checked ? '✓' : ''}</span>
              {words}
            </button>
          ))}
        </div>
      )}
    </div>
  )
}
