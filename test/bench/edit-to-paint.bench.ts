/*
 * From the key that gives a number to the frame that shows the new balance, in real Chromium on the
 * demonstration plant: 100 edits of the condenser pressure in its card, by keyboard, no two alike. Read
 * off a trace of the browser: when it received the key (the event's own time), when the plant's heat
 * rate changed on the page, and when the frame with it was on the screen; beside it the processor time
 * that the page and the worker spent on it, which other load on the machine does not change. Serves what
 * `npm run build` left in dist.
 */
import { mkdtemp, readFile, rm } from 'node:fs/promises'
import { cpus, loadavg, tmpdir } from 'node:os'
import { join } from 'node:path'
import { chromium, type Page } from 'playwright-core'
import { findBrowser, noBrowser } from '../../.ci/browser.mjs'
import { startPreview } from '../browser/preview.ts'

const edits = 100
/** Edits before those that count: code is compiled, caches fill. */
const warmUp = 10

interface TraceEvent {
  readonly name: string
  readonly ph: string
  readonly pid: number
  readonly tid: number
  /** Microseconds. */
  readonly ts: number
  /** Processor time of the task, microseconds. */
  readonly tdur?: number
  readonly args?: { readonly name?: string }
}

/** Marks in the trace when a key came and when the heat rate showed a new number. */
function watchHeatRate(): void {
  const total = document.querySelectorAll('.total-value .quantity-value')[1]
  if (!total) throw new Error('There are no totals.')
  let count = 0
  let asked = false
  window.addEventListener(
    'keydown',
    (event) => {
      if (event.key !== 'Enter') return
      asked = true
      performance.mark(`key ${count}`, { startTime: event.timeStamp })
    },
    true,
  )
  new MutationObserver(() => {
    if (!asked) return
    asked = false
    performance.mark(`shown ${count}`)
    count += 1
    // Read by whoever makes the edits: after the frame that shows the number.
    requestAnimationFrame(() =>
      setTimeout(() => {
        document.documentElement.dataset.edits = String(count)
      }),
    )
  }).observe(total, { characterData: true, childList: true, subtree: true })
}

async function makeEdits(page: Page, from: number, to: number): Promise<void> {
  for (let i = from; i < to; i++) {
    await page.keyboard.type(`${(5 + 0.02 * (i + 1)).toFixed(2)} kPa`)
    await page.keyboard.press('Enter')
    await page.waitForFunction((n) => document.documentElement.dataset.edits === String(n), i + 1)
  }
}

function quantile(sorted: readonly number[], share: number): number {
  return sorted[Math.min(sorted.length - 1, Math.ceil(share * sorted.length) - 1)] as number
}

function report(name: string, times: readonly number[]): void {
  const sorted = [...times].sort((a, b) => a - b)
  const [median, high, most] = [quantile(sorted, 0.5), quantile(sorted, 0.95), quantile(sorted, 1)]
  console.log(
    `${name.padEnd(34)} median ${median.toFixed(1).padStart(6)} ms   95th percentile ${high.toFixed(1).padStart(6)} ms   longest ${most.toFixed(1).padStart(6)} ms`,
  )
}

function evaluate(events: readonly TraceEvent[]): void {
  const marks = new Map<string, number>()
  const frames: number[] = []
  const threads = new Map<string, string>()
  const tasks: TraceEvent[] = []
  for (const event of events) {
    const { name, ph, ts, pid, tid, args } = event
    if (/^(key|shown) \d+$/.test(name) && ph !== 'X') marks.set(name, ts)
    else if (name === 'AnimationFrame::Presentation') frames.push(ts)
    else if (name === 'thread_name') threads.set(`${pid}/${tid}`, args?.name ?? '')
    else if (name === 'RunTask') tasks.push(event)
  }
  frames.sort((a, b) => a - b)
  const times = {
    shown: [] as number[],
    painted: [] as number[],
    page: [] as number[],
    solver: [] as number[],
  }
  for (let i = warmUp; i < warmUp + edits; i++) {
    const key = marks.get(`key ${i}`)
    const change = marks.get(`shown ${i}`)
    const frame = frames.find((ts) => change !== undefined && ts > change)
    if (key === undefined || change === undefined || frame === undefined) {
      throw new Error(`Edit ${i} is not in the trace.`)
    }
    const worked = (thread: string): number =>
      tasks
        .filter(
          ({ ts, pid, tid }) => ts >= key && ts < frame && threads.get(`${pid}/${tid}`) === thread,
        )
        .reduce((sum, { tdur = 0 }) => sum + tdur, 0)
    times.shown.push((change - key) / 1e3)
    times.painted.push((frame - key) / 1e3)
    times.page.push(worked('CrRendererMain') / 1e3)
    times.solver.push(worked('DedicatedWorker thread') / 1e3)
  }
  report('key to the number in the page', times.shown)
  report('key to the frame on the screen', times.painted)
  report('processor time of the page', times.page)
  report('processor time of the worker', times.solver)
}

const executablePath = findBrowser()
if (!executablePath) throw new Error(noBrowser)
const preview = await startPreview()
const folder = await mkdtemp(join(tmpdir(), 'bledsteam-bench-'))
const browser = await chromium.launch({
  executablePath,
  args: ['--no-sandbox', '--disable-gpu', '--no-first-run', '--disable-background-networking'],
})
try {
  const page = await browser.newPage({ viewport: { width: 1440, height: 900 } })
  await page.goto(preview.address)
  await page.getByText('Mass and energy close').waitFor({ state: 'attached' })
  await page.locator('.chart-states circle').first().waitFor()
  await page.keyboard.press('Control+k')
  await page.keyboard.type('Condenser, pressure')
  await page.keyboard.press('Enter')
  await page.locator('.card [data-path="condenser.pressure"]:focus').waitFor()
  await page.evaluate(watchHeatRate)
  await makeEdits(page, 0, warmUp)
  const path = join(folder, 'trace.json')
  await browser.startTracing(page, {
    path,
    categories: ['blink.user_timing', 'devtools.timeline', 'disabled-by-default-devtools.timeline'],
  })
  // One more, so that the last that counts has its frame in the trace.
  await makeEdits(page, warmUp, warmUp + edits + 1)
  await browser.stopTracing()
  console.log(
    `${edits} edits on the demonstration plant, Chromium ${browser.version()}, ${cpus().length} processors, load ${loadavg()[0]?.toFixed(1)}`,
  )
  evaluate((JSON.parse(await readFile(path, 'utf8')) as { traceEvents: TraceEvent[] }).traceEvents)
} finally {
  await browser.close()
  await preview.stop()
  await rm(folder, { recursive: true, force: true })
}
