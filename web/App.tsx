import { lazy, Suspense, useEffect, useLayoutEffect, useRef, useState } from 'react'
import Canvas from './canvas/Canvas.tsx'
import { Card } from './card/Card.tsx'
import { runCommand } from './commands/command-store.ts'
import { Dialogs } from './commands/Dialogs.tsx'
import { Divider } from './Divider.tsx'
import { Drawer } from './drawer/Drawer.tsx'
import { Guard } from './Guard.tsx'
import { CaseRow } from './layouts/CaseRow.tsx'
import { CurveDialog } from './number/CurveDialog.tsx'
import { UnitsDialog } from './number/UnitsDialog.tsx'
import Rail from './rail/Rail.tsx'
import { useSettingsStore } from './store/settings-store.ts'
import { Notices } from './strip/Notices.tsx'
import { Strip } from './strip/Strip.tsx'
import './styles/layout.css'
import { Totals } from './totals/Totals.tsx'

// The charts bring a large library along: the canvas need not wait for them.
const Chart = lazy(() => import('./chart/ChartPanel.tsx'))

/** Below this width the chart folds under the canvas. */
const narrow = 900
const drawerHead = 32

function useWidth(): number {
  const [width, setWidth] = useState(window.innerWidth)
  useEffect(() => {
    const look = () => setWidth(window.innerWidth)
    window.addEventListener('resize', look)
    return () => window.removeEventListener('resize', look)
  }, [])
  return width
}

function Sheet() {
  const place = useRef<HTMLDivElement>(null)
  const [room, setRoom] = useState(0)
  useLayoutEffect(() => {
    const element = place.current
    if (!element) return
    const look = () => setRoom(element.clientHeight)
    look()
    const observer = new ResizeObserver(look)
    observer.observe(element)
    return () => observer.disconnect()
  }, [])
  const height = useSettingsStore((state) => state.drawerHeight)
  const folded = useSettingsStore((state) => state.drawerFolded)
  const change = useSettingsStore((state) => state.change)
  const most = Math.max(drawerHead + 60, room - 160)
  const usual = Math.max(drawerHead + 60, Math.round(0.42 * room - 100))
  const shown = folded ? drawerHead : Math.min(height ?? usual, most)
  return (
    <div className="sheet" ref={place}>
      <CaseRow />
      <div className="canvas-place">
        <Guard name="The canvas">
          <Canvas
            onOpenExample={() => runCommand('open-example')}
            onOpenFile={() => runCommand('open')}
          />
        </Guard>
        <Guard name="The card">
          <Card />
        </Guard>
      </div>
      <Divider
        orientation="horizontal"
        label="Height of the drawer"
        behind
        size={shown}
        least={drawerHead}
        most={most}
        onSize={(size) =>
          size < drawerHead + 40
            ? change({ drawerFolded: true })
            : change({ drawerFolded: false, drawerHeight: size })
        }
      />
      <div className="drawer-place" style={{ height: shown }}>
        <Guard name="The drawer">
          <Drawer />
        </Guard>
      </div>
    </div>
  )
}

function Side() {
  return (
    <>
      <div className="chart-place">
        <Guard name="The chart">
          <Suspense fallback={<p className="muted chart-wait">The chart is being loaded.</p>}>
            <Chart />
          </Suspense>
        </Guard>
      </div>
      <Totals />
    </>
  )
}

export function App() {
  const width = useWidth()
  const chartShare = useSettingsStore((state) => state.chartShare)
  const chartFolded = useSettingsStore((state) => state.chartFolded)
  const change = useSettingsStore((state) => state.change)
  const isNarrow = width < narrow
  const chartWidth = Math.round(Math.min(width - 480, Math.max(240, width * chartShare)))
  return (
    <div className="window" data-narrow={isNarrow}>
      <Strip />
      <Notices />
      <main className="work">
        <Rail />
        <Sheet />
        {!chartFolded && !isNarrow && (
          <Divider
            orientation="vertical"
            label="Width of the chart"
            behind
            size={chartWidth}
            least={240}
            most={Math.max(240, width - 480)}
            onSize={(size) => change({ chartShare: size / width })}
          />
        )}
        {!chartFolded && (
          <aside
            className="side"
            aria-label="Chart and totals"
            style={isNarrow ? undefined : { width: chartWidth }}
          >
            <Side />
          </aside>
        )}
      </main>
      <Dialogs />
      <CurveDialog />
      <UnitsDialog />
    </div>
  )
}
