import { execFile } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'

/** How a call of the command line ended. */
export interface Ended {
  readonly code: number
  readonly stdout: string
  readonly stderr: string
}

const root = fileURLToPath(new URL('../../', import.meta.url))

/** Runs the balance as `npm run balance` does, in a process of its own. */
export function runBalance(...parameters: readonly string[]): Promise<Ended> {
  return new Promise((resolve) => {
    execFile(
      process.execPath,
      ['--import', 'tsx', 'src/cli/balance.ts', ...parameters],
      { cwd: root, maxBuffer: 1 << 24 },
      (error, stdout, stderr) => {
        const code = typeof error?.code === 'number' ? error.code : error ? -1 : 0
        resolve({ code, stdout, stderr })
      },
    )
  })
}

/** A scratch folder for plant files; `remove` when done. */
export class Scratch {
  private readonly folder = mkdtempSync(join(tmpdir(), 'bledsteam-cli-'))

  file(name: string, text: string): string {
    const path = join(this.folder, name)
    writeFileSync(path, text)
    return path
  }

  remove(): void {
    rmSync(this.folder, { recursive: true, force: true })
  }
}
