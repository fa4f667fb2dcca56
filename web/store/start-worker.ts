import type { WorkerPort } from '../worker/client.ts'

/** A worker that solves. */
export function startWorker(): WorkerPort {
  return new Worker(new URL('../worker/worker.ts', import.meta.url), {
    type: 'module',
    name: 'balance',
  })
}
