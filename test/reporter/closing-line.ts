import { writeFileSync } from 'node:fs'
import type { Reporter } from 'vitest/node'

/** The little that counting needs of a test file that has run. */
export interface RunFile {
  /** Errors of the file itself: it did not load, or a hook of it failed. */
  errors(): readonly unknown[]
  readonly children: {
    allTests(): Iterable<{ result(): { readonly state: string } }>
    allSuites(): Iterable<{ errors(): readonly unknown[] }>
  }
}

export interface Counts {
  passed: number
  failed: number
  skipped: number
}

/**
 * Counts a run: each test once, and each error that belongs to no test (a file that does not load, a
 * failing hook of a suite, an error that nobody caught) as a failure. A test that never got its turn
 * is a failure too.
 */
export function countRun(files: readonly RunFile[], unhandled: readonly unknown[]): Counts {
  const counts: Counts = { passed: 0, failed: unhandled.length, skipped: 0 }
  for (const file of files) {
    counts.failed += file.errors().length
    for (const suite of file.children.allSuites()) counts.failed += suite.errors().length
    for (const test of file.children.allTests()) {
      const { state } = test.result()
      if (state === 'passed') counts.passed += 1
      else if (state === 'skipped') counts.skipped += 1
      else counts.failed += 1
    }
  }
  return counts
}

export function closingLine({ passed, failed, skipped }: Counts): string {
  return `${passed} passed, ${failed} failed${skipped > 0 ? `, ${skipped} skipped` : ''}`
}

/**
 * Ends a run with `N passed, N failed`. Under the whole check (.ci/test.mjs), which sums several
 * runs, it writes the counts to the file named by BLEDSTEAM_COUNTS instead.
 */
export default class ClosingLine implements Reporter {
  onTestRunEnd(files: readonly RunFile[], unhandled: readonly unknown[]): void {
    const counts = countRun(files, unhandled)
    const target = process.env.BLEDSTEAM_COUNTS
    if (target) writeFileSync(target, JSON.stringify(counts))
    else console.log(closingLine(counts))
  }
}
