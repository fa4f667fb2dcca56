import { createEngine, transferables } from '../../src/engine.ts'
import type { Request } from '../../src/messages.ts'

declare const self: DedicatedWorkerGlobalScope

const engine = createEngine()

self.addEventListener('message', (event: MessageEvent<Request>) => {
  for (const answer of engine.answer(event.data)) {
    self.postMessage(answer, transferables(answer))
  }
})
