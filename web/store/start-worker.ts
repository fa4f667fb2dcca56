import type { WorkerPort } from '../worker/client.ts'

// Started with the page: its code loads while the plant is still being read.
let prepared: WorkerPort | undefined = openWorker()

function openWorker(): WorkerPort {
  return new Worker(new URL('../worker/worker.ts', import.meta.url), {
    type: 'module',
    name: 'balance',
  })
}

/** A worker that solves. */
export function startWorker(): WorkerPort {
  const port = prepared ?? openWorker()
  prepared = undefined
  return port
}
