import { type ChildProcess, spawn } from 'node:child_process'
import { existsSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import type { TestProject } from 'vitest/node'

declare module 'vitest' {
  interface ProvidedContext {
    /** Address of the built window, with a slash at its end. */
    address: string
  }
}

export interface Preview {
  readonly address: string
  /** Stops serving; the address then refuses connections. */
  stop(): Promise<void>
}

const root = fileURLToPath(new URL('../..', import.meta.url))

/** How long the server may take to say where it is, ms. */
const patience = 30_000

/** Serves what `npm run build` left in dist, at a free port unless one is asked for. */
export async function startPreview(port = 0): Promise<Preview> {
  if (!existsSync(`${root}/dist/index.html`)) {
    throw new Error('There is no built window to open: run `npm run build` first.')
  }
  const place = ['--host', '127.0.0.1', '--port', String(port), '--strictPort']
  const server = spawn(process.execPath, ['node_modules/vite/bin/vite.js', 'preview', ...place], {
    cwd: root,
    env: { ...process.env, NO_COLOR: '1', FORCE_COLOR: undefined },
    stdio: ['pipe', 'pipe', 'pipe'],
  })
  const gone = new Promise<void>((resolve) => {
    server.once('exit', () => resolve())
  })
  const stop = async (): Promise<void> => {
    server.kill('SIGKILL')
    await gone
  }
  try {
    return { address: await announcedAddress(server), stop }
  } catch (error) {
    await stop()
    throw error
  }
}

function announcedAddress(server: ChildProcess): Promise<string> {
  return new Promise((resolve, reject) => {
    let said = ''
    const giveUp = (why: string): void => reject(new Error(`The preview ${why}.\n${said}`))
    const timer = setTimeout(() => giveUp('did not start in time'), patience)
    const listen = (text: Buffer): void => {
      said += text
      const found = /http:\/\/127\.0\.0\.1:\d+\//.exec(said)
      if (!found) return
      clearTimeout(timer)
      resolve(found[0])
    }
    server.stdout?.on('data', listen)
    server.stderr?.on('data', listen)
    server.once('exit', () => {
      clearTimeout(timer)
      giveUp('ended at once')
    })
  })
}

/** Vitest calls this once before the browser tests and the returned function after them. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const preview = await startPreview()
  project.provide('address', preview.address)
  return preview.stop
}
