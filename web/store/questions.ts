import { create } from 'zustand'
import type { Origin, OwnEquation, Question, QuestionAnswer, Worth } from '../../src/messages.ts'
import { readValue, useBalanceStore } from './balance-store.ts'
import { readUnitChoice, useSettingsStore } from './settings-store.ts'

type Ask = (key: string, question: Question, receive: (answer: QuestionAnswer) => void) => void

/** While balances follow each other faster than this (a drag), questions wait for a lull, ms. */
const rush = 160
/** The lull after which dear questions are asked, ms. */
const lull = 200

interface QuestionState {
  readonly origins: ReadonlyMap<string, Origin>
  readonly equations: ReadonlyMap<string, readonly OwnEquation[]>
  /** By path of the given number: at fixed performance. */
  readonly worths: ReadonlyMap<string, Worth>
  /** The same with the hardware frozen too; may lag behind while a number is being dragged. */
  readonly frozenWorths: ReadonlyMap<string, Worth>
  /** What the worths shown are of. */
  readonly worthTarget: string
}

/** Answers of the worker to what the window is showing. */
export const useQuestionStore = create<QuestionState>()(() => ({
  origins: new Map(),
  equations: new Map(),
  worths: new Map(),
  frozenWorths: new Map(),
  worthTarget: '',
}))

/** What is on show, counted by who shows it. */
const wanted = {
  origins: new Map<string, number>(),
  equations: new Map<string, number>(),
  worth: 0,
}
let ask: Ask | null = null

function counted(map: Map<string, number>, key: string): () => void {
  map.set(key, (map.get(key) ?? 0) + 1)
  return () => {
    const left = (map.get(key) ?? 1) - 1
    if (left > 0) map.set(key, left)
    else map.delete(key)
  }
}

/** From now on the origin of a quantity is kept up to date, until the function returned is called. */
export function wantOrigin(path: string): () => void {
  const done = counted(wanted.origins, path)
  askOrigin(path)
  return () => {
    done()
    if (wanted.origins.has(path)) return
    useQuestionStore.setState(({ origins }) => ({ origins: without(origins, path) }))
  }
}

/** As `wantOrigin`, for the equations of a unit, shaft or of the plant. */
export function wantEquations(owner: string): () => void {
  const done = counted(wanted.equations, owner)
  askEquations(owner)
  return () => {
    done()
    if (wanted.equations.has(owner)) return
    useQuestionStore.setState(({ equations }) => ({ equations: without(equations, owner) }))
  }
}

/** As `wantOrigin`, for the worth of all given numbers. */
export function wantWorth(): () => void {
  wanted.worth += 1
  if (wanted.worth === 1) {
    askWorth(false)
    later()
  }
  return () => {
    wanted.worth -= 1
  }
}

function without<T>(map: ReadonlyMap<string, T>, key: string): ReadonlyMap<string, T> {
  const next = new Map(map)
  next.delete(key)
  return next
}

function askOrigin(path: string): void {
  ask?.(`whereFrom/${path}`, { type: 'whereFrom', path, units: readUnitChoice() }, (answer) => {
    const { origin } = answer as Extract<QuestionAnswer, { type: 'whereFrom' }>
    if (!wanted.origins.has(path)) return
    useQuestionStore.setState(({ origins }) => ({
      origins: origin ? new Map(origins).set(path, origin) : without(origins, path),
    }))
  })
}

function askEquations(owner: string): void {
  ask?.(`equations/${owner}`, { type: 'equations', owner, units: readUnitChoice() }, (answer) => {
    const { equations } = answer as Extract<QuestionAnswer, { type: 'equations' }>
    if (!wanted.equations.has(owner)) return
    useQuestionStore.setState((state) => ({
      equations: new Map(state.equations).set(owner, equations),
    }))
  })
}

/** Where the target chosen has no value in this plant. */
const otherTargets = ['unitHeatRate', 'netTurbineHeatRate', 'netPower', 'cycleEfficiency'].map(
  (name) => `plant.${name}`,
)

function target(): string {
  const { worthTarget: chosen } = useSettingsStore.getState()
  return [chosen, ...otherTargets].find((path) => readValue(path) !== null) ?? chosen
}

function askWorth(frozen: boolean): void {
  ask?.(`worth/${frozen}`, { type: 'worth', target: target(), frozen }, (answer) => {
    const { worths, target: its } = answer as Extract<QuestionAnswer, { type: 'worth' }>
    const found = new Map(worths.map((worth) => [worth.path, worth]))
    const { worthTarget } = useQuestionStore.getState()
    if (frozen) useQuestionStore.setState({ worths: found, frozenWorths: found, worthTarget: its })
    else {
      useQuestionStore.setState({
        worths: found,
        worthTarget: its,
        ...(its === worthTarget ? {} : { frozenWorths: new Map() }),
      })
    }
  })
}

let timer: ReturnType<typeof setTimeout> | undefined

/** Asks what is dear once nothing has changed for a while. */
function later(): void {
  clearTimeout(timer)
  timer = setTimeout(() => {
    if (wanted.worth > 0) askWorth(true)
    for (const path of wanted.origins.keys()) askOrigin(path)
    for (const owner of wanted.equations.keys()) askEquations(owner)
  }, lull)
}

function askAll(): void {
  if (wanted.worth > 0) askWorth(false)
  for (const path of wanted.origins.keys()) askOrigin(path)
  for (const owner of wanted.equations.keys()) askEquations(owner)
}

/** Asks anew after each balance and each change of units or target. */
export function startAsking(by: Ask): void {
  ask = by
  let last = Number.NEGATIVE_INFINITY
  useBalanceStore.subscribe((now, then) => {
    if (now.balance === then.balance) return
    const time = performance.now()
    // In a rush of balances the answers would be late for the next: they come when it is over.
    if (time - last > rush) askAll()
    last = time
    later()
  })
  useSettingsStore.subscribe((now, then) => {
    if (now.worthTarget !== then.worthTarget && wanted.worth > 0) {
      askWorth(false)
      later()
    }
    if (now.unitSet !== then.unitSet || now.unitOverrides !== then.unitOverrides) askAll()
  })
  askAll()
}
