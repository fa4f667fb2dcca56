import { type ChildProcess, fork } from 'node:child_process'
import { mkdirSync, writeFileSync } from 'node:fs'
import { availableParallelism } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { type Family, fileOf, type Outcome, Tally, tryPlant } from './tally.ts'

/*
 * npm run fuzz -- [--count N] [--seed S] [--from PLACE] [--family solvable|unsolvable] [--jobs J]
 *                 [--out FOLDER]
 *
 * Random plants that have an answer by construction, and as many spoilt on purpose; see
 * random-plant.ts, solvable.ts and unsolvable.ts. The same seed and place give the same plant. With
 * --out the plants that fared badly are written there as plant files. Exit 0 when at least 99.9 % of
 * the solvable ones are solved, every spoilt one is answered rightly and none hangs.
 */

/** A plant that takes longer than this to draw, solve and judge hangs, ms. */
const patience = 60_000
/** The share of solvable plants that must be solved. */
const leastSolved = 0.999

interface Call {
  readonly count: number
  readonly seed: number
  readonly from: number
  readonly families: readonly Family[]
  readonly jobs: number
  readonly out: string | undefined
}

function readCall(words: readonly string[]): Call {
  const known = ['count', 'seed', 'from', 'family', 'jobs', 'out']
  const values = new Map<string, string>()
  for (let k = 0; k < words.length; k += 2) {
    const name = words[k]!.replace(/^--/, '')
    const value = words[k + 1]
    if (!known.includes(name) || value === undefined) {
      throw new Error(`${words[k]} is not understood; there are --${known.join(' N, --')} N`)
    }
    values.set(name, value)
  }
  const number = (name: string, usual: number): number => {
    const value = Number(values.get(name) ?? usual)
    if (!Number.isInteger(value) || value < 0) throw new Error(`--${name} wants a whole number`)
    return value
  }
  const family = values.get('family')
  if (family !== undefined && family !== 'solvable' && family !== 'unsolvable') {
    throw new Error('--family is solvable or unsolvable')
  }
  return {
    count: number('count', 1000),
    seed: number('seed', 1),
    from: number('from', 0),
    families: family === undefined ? ['solvable', 'unsolvable'] : [family],
    jobs: Math.max(1, number('jobs', Math.max(1, availableParallelism() - 1))),
    out: values.get('out'),
  }
}

interface Task {
  readonly family: Family
  readonly seed: number
  readonly place: number
}

/** In a child: answers one task after the other. */
function work(): void {
  process.on('message', ({ family, seed, place }: Task) => {
    let outcome: Outcome
    try {
      outcome = tryPlant(family, seed, place)
    } catch (error) {
      const message = error instanceof Error ? error.message : String(error)
      outcome = failed(place, `throws: ${message.slice(0, 60)}`)
    }
    process.send!(outcome)
  })
}

function failed(place: number, fault: string): Outcome {
  return {
    place,
    units: 0,
    fault,
    milliseconds: 0,
    largestBlock: 0,
    hasReheatAndHeaters: false,
    hasPowerGiven: false,
    swaps: 0,
  }
}

/** Hands places to children; one that does not answer in time is ended and replaced. */
function run(call: Call, family: Family): Promise<Tally> {
  const tally = new Tally()
  const last = call.from + call.count
  let next = call.from
  let running = 0
  return new Promise((resolve) => {
    const start = (): void => {
      const child = fork(fileURLToPath(import.meta.url), [], {
        execArgv: process.execArgv,
        env: { ...process.env, FUZZ_CHILD: '1' },
      })
      running++
      let timer: NodeJS.Timeout | undefined
      const give = (): void => {
        if (next >= last) {
          end(child)
          return
        }
        const place = next++
        timer = setTimeout(() => {
          take(failed(place, 'hangs'))
          end(child)
          start()
        }, patience)
        child.send({ family, seed: call.seed, place } satisfies Task)
      }
      const end = (one: ChildProcess): void => {
        one.kill('SIGKILL')
        running--
        if (running === 0 && next >= last) resolve(tally)
      }
      child.on('message', (outcome: Outcome) => {
        clearTimeout(timer)
        take(outcome)
        give()
      })
      give()
    }
    const take = (outcome: Outcome): void => {
      tally.take(outcome)
      if (outcome.fault !== undefined && call.out !== undefined) keep(call, family, outcome)
    }
    for (let k = 0; k < call.jobs; k++) start()
  })
}

function keep(call: Call, family: Family, outcome: Outcome): void {
  mkdirSync(call.out!, { recursive: true })
  const fault = outcome.fault!.replace(/[^a-z]+/gi, '-')
  const name = `${family}-${fault}-${call.seed}-${outcome.place}.json`
  writeFileSync(join(call.out!, name), fileOf(family, call.seed, outcome))
}

async function main(): Promise<number> {
  const call = readCall(process.argv.slice(2))
  let passed = true
  for (const family of call.families) {
    const tally = await run(call, family)
    console.log(tally.lines(family).join('\n'))
    const least = family === 'solvable' ? leastSolved * tally.used : tally.used
    if (tally.good < least || tally.hung > 0 || tally.used === 0) passed = false
  }
  return passed ? 0 : 1
}

if (process.env.FUZZ_CHILD === '1') work()
else process.exitCode = await main()
