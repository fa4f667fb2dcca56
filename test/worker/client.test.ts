import { afterEach, beforeEach, expect, test, vi } from 'vitest'
import type { Answer, BalanceMessage, NamesMessage, Request } from '../../src/messages.ts'
import { createSolverClient, type Job, type WorkerPort } from '../../web/worker/client.ts'

/** A worker that answers only when told to. */
class FakeWorker implements WorkerPort {
  readonly asked: Request[] = []
  ended = false
  onmessage: WorkerPort['onmessage'] = null
  onerror: WorkerPort['onerror'] = null
  onmessageerror: WorkerPort['onmessageerror'] = null

  postMessage(request: Request): void {
    this.asked.push(request)
  }

  terminate(): void {
    this.ended = true
  }

  say(...answers: Answer[]): void {
    for (const data of answers) this.onmessage?.({ data } as MessageEvent<Answer>)
  }

  /** Answers the newest request, with the names of a structure first. */
  solve(structure = 1): void {
    this.say(names(structure), balance(this.asked.at(-1)?.sequence ?? 0, structure))
  }

  die(): void {
    this.onerror?.({} as ErrorEvent)
  }
}

function names(structure: number): NamesMessage {
  const derived = { paths: [], account: [] }
  const of = { layout: 'base', case: null, given: [], mainSteam: null }
  return { type: 'names', structure, paths: [], streams: [], processes: [], ...of, derived }
}

function balance(sequence: number, structure = 1): BalanceMessage {
  return { type: 'balance', sequence, structure } as BalanceMessage
}

const job: Job = { plant: {} as Job['plant'], layout: 'base', case: null }
const patience = { answer: 5_000, start: 20_000, superseded: 1_000 }

function setUp() {
  const workers: FakeWorker[] = []
  const shown: string[] = []
  const said: string[] = []
  const busy: boolean[] = []
  const client = createSolverClient<string>(
    () => {
      const worker = new FakeWorker()
      workers.push(worker)
      return worker
    },
    {
      balance: (_, __, mark) => shown.push(mark),
      dome: () => shown.push('dome'),
      unusable: (message) => said.push(message),
      gaveUp: (message) => said.push(message),
      busy: (now) => busy.push(now),
    },
    patience,
  )
  const worker = (): FakeWorker => workers.at(-1) as FakeWorker
  return { client, workers, worker, shown, said, busy }
}

beforeEach(() => {
  vi.useFakeTimers()
})

afterEach(() => {
  vi.useRealTimers()
})

test('one job runs, and of those that wait only the newest is asked', () => {
  const { client, worker, shown, busy } = setUp()
  client.solve(job, 'first')
  client.solve(job, 'second')
  client.solve(job, 'third')
  expect(worker().asked).toHaveLength(1)
  worker().solve()
  expect(worker().asked.map(({ sequence }) => sequence)).toEqual([1, 3])
  worker().solve()
  expect(shown).toEqual(['first', 'third'])
  expect(busy.at(-1)).toBe(false)
})

test('an answer that was not asked for, or comes twice, is not shown', () => {
  const { client, worker, shown } = setUp()
  client.solve(job, 'first')
  worker().say(names(1), balance(7))
  expect(shown).toEqual([])
  worker().say(balance(1), balance(1))
  expect(shown).toEqual(['first'])
})

test('a balance whose names are not known is not shown', () => {
  const { client, worker, shown } = setUp()
  client.solve(job, 'first')
  worker().say(names(1), balance(1, 2))
  expect(shown).toEqual([])
  client.solve(job, 'second')
  worker().solve(2)
  expect(shown).toEqual(['second'])
})

test('a worker that does not answer is ended and said to be; the next job gets a new one', () => {
  const { client, workers, worker, said, busy, shown } = setUp()
  client.solve(job, 'first')
  worker().solve()
  client.solve(job, 'hangs')
  vi.advanceTimersByTime(patience.answer + 1)
  expect(workers[0]?.ended).toBe(true)
  expect(said).toHaveLength(1)
  expect(said[0]).toContain('within 5 s')
  expect(busy.at(-1)).toBe(false)
  client.solve(job, 'next')
  expect(workers).toHaveLength(2)
  worker().solve()
  expect(shown).toEqual(['first', 'next'])
})

test('a worker is given longer to load than to solve', () => {
  const { client, workers, said } = setUp()
  client.solve(job, 'first')
  vi.advanceTimersByTime(patience.answer + 1)
  expect(said).toEqual([])
  expect(workers[0]?.ended).toBe(false)
})

test('a slow job gives way to the newer one behind it, and nothing is said of it', () => {
  const { client, workers, worker, said, shown } = setUp()
  client.solve(job, 'first')
  worker().solve()
  client.solve(job, 'slow')
  client.solve(job, 'newer')
  vi.advanceTimersByTime(patience.superseded + 1)
  expect(workers).toHaveLength(2)
  expect(worker().asked.map(({ sequence }) => sequence)).toEqual([3])
  worker().solve()
  expect(shown).toEqual(['first', 'newer'])
  expect(said).toEqual([])
})

test('a worker that dies is started again and asked again, once', () => {
  const { client, workers, worker, said, shown } = setUp()
  client.solve(job, 'first')
  worker().solve()
  client.solve(job, 'deadly')
  worker().die()
  expect(workers).toHaveLength(2)
  expect(worker().asked.map(({ sequence }) => sequence)).toEqual([2])
  worker().die()
  expect(said).toHaveLength(1)
  expect(workers).toHaveLength(2)
  client.solve(job, 'mended')
  worker().solve()
  expect(shown).toEqual(['first', 'mended'])
})

test('what an ended worker still says is not heard', () => {
  const { client, workers, worker, shown } = setUp()
  client.solve(job, 'first')
  workers[0]?.solve()
  client.solve(job, 'second')
  workers[0]?.die()
  workers[0]?.say(balance(2))
  expect(shown).toEqual(['first'])
  worker().solve()
  expect(shown).toEqual(['first', 'second'])
})

test('a plant that cannot be read is said once, and not while a newer one waits', () => {
  const { client, worker, said } = setUp()
  client.solve(job, 'first')
  client.solve(job, 'second')
  worker().say({ type: 'unusable', sequence: 1, message: 'No such kind.' })
  expect(said).toEqual([])
  worker().say({ type: 'unusable', sequence: 2, message: 'No such kind.' })
  expect(said).toEqual(['No such kind.'])
})

const question = { type: 'worth', target: 'plant.netPower', frozen: false } as const
const answered = { ...question, worths: [] }

test('questions wait until the balance has been sent, the newest of each key alone', () => {
  const { client, worker } = setUp()
  const got: string[] = []
  client.solve(job, 'first')
  client.ask('worth', question, () => got.push('older'))
  client.ask('worth', question, () => got.push('newer'))
  expect(worker().asked).toHaveLength(1)
  worker().solve()
  expect(worker().asked.map(({ type }) => type)).toEqual(['solve', 'worth'])
  worker().say({ type: 'answer', sequence: worker().asked[1]?.sequence ?? 0, answer: answered })
  expect(got).toEqual(['newer'])
})

test('an answer that a newer balance overtakes is dropped, and so is one of a dead worker', () => {
  const { client, worker } = setUp()
  const got: string[] = []
  client.solve(job, 'first')
  worker().solve()
  client.ask('worth', question, () => got.push('overtaken'))
  const { sequence } = worker().asked[1] ?? { sequence: 0 }
  client.solve(job, 'second')
  worker().say({ type: 'answer', sequence, answer: answered })
  worker().die()
  worker().say({ type: 'answer', sequence, answer: answered })
  expect(got).toEqual([])
})
