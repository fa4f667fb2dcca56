import { createEngine, transferables } from '../../src/engine.ts'
import type { Answer, Request } from '../../src/messages.ts'

declare const self: DedicatedWorkerGlobalScope

const engine = createEngine()
let domeSent = false

function post(answer: Answer): void {
  self.postMessage(answer, transferables(answer))
}

self.addEventListener('message', (event: MessageEvent<Request>) => {
  for (const answer of engine.answer(event.data)) post(answer)
  if (domeSent) return
  // Behind the first balance, which has waited long enough for all this code to load.
  domeSent = true
  post(engine.dome())
})
