import { mkdtemp, readFile, rm } from 'node:fs/promises'
import { createRequire } from 'node:module'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import {
  type BrowserContext,
  type BrowserContextOptions,
  chromium,
  type Page,
} from 'playwright-core'
import { inject } from 'vitest'
import { findBrowser, noBrowser } from '../../.ci/browser.mjs'

export interface VisitOptions {
  /** Size of the window, CSS px; 1440 x 900 unless given. */
  readonly viewport?: { readonly width: number; readonly height: number }
  /** Part of the address after the slash, empty unless given. */
  readonly path?: string
  /** Another address than that of the shared preview. */
  readonly address?: string
  /** Anything else that Playwright knows of a context: colour scheme, reduced motion, locale ... */
  readonly context?: BrowserContextOptions
}

/** A browser with a profile of its own and the window open in it. */
export interface Visit {
  readonly page: Page
  readonly context: BrowserContext
  /** Where the window is served, with a slash at its end. */
  readonly address: string
  /**
   * What the pages complained of so far: uncaught errors, console errors and warnings, refused by the
   * security policy or not loaded. Empty in a sound window.
   */
  readonly problems: readonly string[]
  /** Closes the browser and opens the window again in the same profile, as the next day would. */
  reopen(): Promise<Visit>
  /** Closes the browser and throws its profile away. */
  close(): Promise<void>
}

const flags = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
]

/** Opens the window in a fresh profile. Close it in an `afterEach`, `afterAll` or `finally`. */
export async function openWindow(options: VisitOptions = {}): Promise<Visit> {
  return visit(await mkdtemp(join(tmpdir(), 'bledsteam-profile-')), options)
}

/** Opens the window in a fresh profile, hands it to `use` and closes it, come what may. */
export async function withWindow(
  use: (visit: Visit) => Promise<void>,
  options: VisitOptions = {},
): Promise<void> {
  const opened = await openWindow(options)
  try {
    await use(opened)
  } finally {
    await opened.close()
  }
}

async function visit(profile: string, options: VisitOptions): Promise<Visit> {
  const executablePath = findBrowser()
  if (!executablePath) throw new Error(noBrowser)
  const context = await chromium.launchPersistentContext(profile, {
    viewport: options.viewport ?? { width: 1440, height: 900 },
    ...options.context,
    executablePath,
    args: flags,
  })
  const close = async (): Promise<void> => {
    await context.close()
    await rm(profile, { recursive: true, force: true, maxRetries: 5, retryDelay: 200 })
  }
  // Before the test itself is given up, so that the failure says what was waited for.
  context.setDefaultTimeout(20_000)
  try {
    const problems: string[] = []
    const watch = (page: Page): void => {
      // Choosers are caught as long as somebody listens: from the first on, or an early one is missed.
      page.on('filechooser', () => {})
      page.on('pageerror', (error) => problems.push(`uncaught: ${error.message}`))
      page.on('console', (message) => {
        if (message.type() === 'error' || message.type() === 'warning') {
          problems.push(`${message.type()}: ${message.text()}`)
        }
      })
    }
    const page = context.pages()[0] ?? (await context.newPage())
    watch(page)
    context.on('page', watch)
    const address = options.address ?? inject('address')
    await page.goto(address + (options.path ?? ''))
    const reopen = async (): Promise<Visit> => {
      await context.close()
      return visit(profile, options)
    }
    return { page, context, address, problems, reopen, close }
  } catch (error) {
    await close()
    throw error
  }
}

/** Waits until the service worker keeps all files, so that the window opens without a network. */
export async function keptOffline(page: Page): Promise<void> {
  await page.evaluate(async () => {
    await navigator.serviceWorker.ready
  })
}

/**
 * What axe-core finds wrong with the page, one line a fault: rule, what it says, where. Limited to
 * what `within` (a selector) holds when given.
 */
export async function accessibilityFaults(page: Page, within?: string): Promise<string[]> {
  const source = await readFile(
    createRequire(import.meta.url).resolve('axe-core/axe.min.js'),
    'utf8',
  )
  await page.evaluate(source)
  return page.evaluate(async (selector) => {
    const axe = (window as unknown as { axe: typeof import('axe-core') }).axe
    const { violations } = await axe.run(selector ?? document)
    return violations.flatMap(({ id, help, nodes }) =>
      nodes.map((node) => `${id}: ${help}: ${node.target.join(' ')}`),
    )
  }, within)
}
