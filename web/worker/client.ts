import type {
  Answer,
  BalanceMessage,
  DomeMessage,
  NamesMessage,
  Question,
  QuestionAnswer,
  Request,
  SolveRequest,
} from '../../src/messages.ts'

/** The part of a Worker that the client needs. */
export interface WorkerPort {
  postMessage(request: Request): void
  terminate(): void
  onmessage: ((event: MessageEvent<Answer>) => void) | null
  onerror: ((event: ErrorEvent) => void) | null
  onmessageerror: ((event: MessageEvent) => void) | null
}

/** What is to be solved. */
export type Job = Omit<SolveRequest, 'type' | 'sequence'>

export interface Reports<Mark> {
  /** A balance, newer than any shown before, with the mark of the job that asked for it. */
  balance(names: NamesMessage, balance: BalanceMessage, mark: Mark): void
  dome(dome: DomeMessage): void
  /** The plant as it stands cannot be read; the message is ready to show. */
  unusable(message: string): void
  /** The solver gave up on the newest job; the message is ready to show. */
  gaveUp(message: string): void
  /** Whether an answer to the newest job is still to come. */
  busy(busy: boolean): void
}

export interface Patience {
  /** How long one job may take, ms. */
  readonly answer: number
  /** The same for the first job of a worker, which has to load first. */
  readonly start: number
  /** How long a job goes on when a newer one waits behind it, ms. */
  readonly superseded: number
}

// An impossible plant is searched longest, and a machine may be slow or busy: stopped is what hangs.
const usualPatience: Patience = { answer: 20_000, start: 30_000, superseded: 1_000 }

interface Running<Mark> {
  readonly request: SolveRequest
  readonly mark: Mark
  readonly since: number
  /** Workers that died over it. */
  readonly deaths: number
}

interface Asking {
  readonly question: Question
  readonly receive: (answer: QuestionAnswer) => void
}

export interface SolverClient<Mark> {
  /** Asks for a balance. One job runs at a time; of those that wait only the newest is kept. */
  solve(job: Job, mark: Mark): void
  /**
   * Asks something of the balance shown. It is sent when no balance is under way; of questions with
   * the same key that wait only the newest is kept. A question that is lost with its worker, or that
   * a newer balance overtakes, is not answered: whoever asks asks again after each balance.
   */
  ask(key: string, question: Question, receive: (answer: QuestionAnswer) => void): void
  stop(): void
}

/**
 * Talks to the worker that solves: starts it, starts it again when it dies or does not answer, and
 * drops answers that a newer one has overtaken.
 */
export function createSolverClient<Mark>(
  startWorker: () => WorkerPort,
  reports: Reports<Mark>,
  patience: Patience = usualPatience,
): SolverClient<Mark> {
  let worker: WorkerPort | null = null
  /** The worker has answered: its code is loaded. */
  let proven = false
  let sequence = 0
  let shown = 0
  let running: Running<Mark> | null = null
  let waiting: { request: SolveRequest; mark: Mark } | null = null
  /** Questions not sent yet, by key, and those sent, by sequence. */
  const asked = new Map<string, Asking>()
  const sent = new Map<number, Asking['receive']>()
  let timer: ReturnType<typeof setTimeout> | undefined
  /** The names of the newest structure: a worker sends them once, before its first balance. */
  let names: NamesMessage | null = null

  const start = (): WorkerPort => {
    const port = startWorker()
    port.onmessage = (event) => {
      if (port === worker) receive(event.data)
    }
    port.onerror = (event) => {
      event.preventDefault?.()
      if (port === worker) died()
    }
    port.onmessageerror = () => {
      if (port === worker) died()
    }
    proven = false
    names = null
    return port
  }

  const end = () => {
    clearTimeout(timer)
    const port = worker
    worker = null
    sent.clear()
    port?.terminate()
  }

  const sendQuestions = () => {
    if (running || !worker || !proven) return
    for (const { question, receive } of asked.values()) {
      sequence += 1
      sent.set(sequence, receive)
      worker.postMessage({ ...question, sequence })
    }
    asked.clear()
  }

  /** Sets the watchdog for what is left of the running job's time. */
  const watch = () => {
    clearTimeout(timer)
    if (!running) return
    const allowed = !proven ? patience.start : waiting ? patience.superseded : patience.answer
    timer = setTimeout(overdue, Math.max(0, running.since + allowed - Date.now()))
  }

  const send = (request: SolveRequest, mark: Mark, deaths: number) => {
    worker ??= start()
    running = { request, mark, since: Date.now(), deaths }
    worker.postMessage(request)
    watch()
  }

  const next = () => {
    running = null
    clearTimeout(timer)
    if (waiting) {
      const { request, mark } = waiting
      waiting = null
      send(request, mark, 0)
    } else {
      reports.busy(false)
      sendQuestions()
    }
  }

  const receive = (answer: Answer) => {
    proven = true
    switch (answer.type) {
      case 'names':
        names = answer
        break
      case 'dome':
        reports.dome(answer)
        break
      case 'balance': {
        const job = running
        const its = names?.structure === answer.structure ? names : null
        if (answer.sequence > shown && its && job?.request.sequence === answer.sequence) {
          shown = answer.sequence
          reports.balance(its, answer, job.mark)
        }
        if (job?.request.sequence === answer.sequence) next()
        break
      }
      case 'answer': {
        const reply = sent.get(answer.sequence)
        sent.delete(answer.sequence)
        // What is under way will change the answer, and is followed by the same question.
        if (!running) reply?.(answer.answer)
        break
      }
      case 'unusable':
        if (running?.request.sequence === answer.sequence) {
          if (!waiting) reports.unusable(answer.message)
          next()
        }
        break
    }
  }

  const overdue = () => {
    end()
    if (!waiting) {
      reports.gaveUp(
        `No balance within ${Math.round((proven ? patience.answer : patience.start) / 1000)} s: the solver was stopped. The plant is kept; change a number or undo the last edit, and it tries again.`,
      )
    }
    next()
  }

  const died = () => {
    const job = running
    end()
    if (!job) return
    if (waiting) next()
    else if (job.deaths === 0) send(job.request, job.mark, 1)
    else {
      reports.gaveUp(
        proven
          ? 'The solver stopped twice over this plant. The plant is kept; undo the last edit, or save it to a file and reload the page.'
          : 'The solver could not be started. The plant is kept; reload the page.',
      )
      next()
    }
  }

  return {
    solve(job, mark) {
      sequence += 1
      const request: SolveRequest = { type: 'solve', sequence, ...job }
      reports.busy(true)
      if (running) {
        waiting = { request, mark }
        watch()
      } else send(request, mark, 0)
    },
    ask(key, question, receive) {
      asked.set(key, { question, receive })
      sendQuestions()
    },
    stop() {
      asked.clear()
      running = null
      waiting = null
      end()
    },
  }
}
