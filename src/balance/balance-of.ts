import type { Layout, Plant } from '../plant/document.ts'
import type { Overrides } from '../plant/overrides.ts'
import { phaseNames } from '../units/phases.ts'
import type { Finding } from './answer.ts'
import { solveCase } from './case/solve-case.ts'
import { Model } from './model.ts'
import { type Balance, solve } from './solve.ts'
import { Phase, streamResults } from './states.ts'

type Numbers = Record<string, number | string | null>

/** The balance as the command line prints it (contract, section 5). SI; null where undetermined. */
export interface AskedBalance {
  readonly status: Balance['status']
  readonly streams: Record<string, Numbers>
  readonly units: Record<string, Numbers>
  readonly shafts: Record<string, Numbers>
  readonly plant: Numbers
  readonly closure: Balance['closure']
  readonly undetermined: readonly string[]
  readonly unbounded: readonly string[]
  readonly findings: readonly Finding[]
  readonly unknowns: number
  readonly equations: number
  readonly blocks: number
  readonly iterations: number
}

/** Solves a layout as it stands and gives every quantity by name. */
export function balanceOf(layout: Layout): AskedBalance {
  return asked(solve(new Model(layout)), [])
}

/** Solves a layout, or a case of it, with further changes; a call that makes no sense is unusable. */
export function balanceOfCase(
  plant: Plant,
  layoutId: string,
  caseId: string | null,
  overrides?: Overrides,
):
  | { readonly outcome: 'balance'; readonly balance: AskedBalance }
  | { readonly outcome: 'unusable'; readonly message: string } {
  const solved = solveCase(plant, layoutId, caseId, overrides)
  if (solved.outcome === 'unusable') return solved
  return { outcome: 'balance', balance: asked(solved.balance, solved.remarks) }
}

function asked(balance: Balance, remarks: readonly Finding[]): AskedBalance {
  const { results, status, model } = balance
  const { layout } = model.system
  const streams: Record<string, Numbers> = {}
  layout.streams.forEach((stream, k) => {
    const numbers: Numbers = {}
    for (const name of streamResults) numbers[name] = finite(results.states.get(k, name))
    const phase = results.states.phases[k]!
    if (phase !== Phase.wet && numbers.h !== null) numbers.x = null
    numbers.phase = phase === Phase.none ? null : phaseNames[phase]!
    streams[stream.id] = numbers
  })
  const units: Record<string, Numbers> = {}
  for (const unit of layout.units) units[unit.id] = {}
  const shafts: Record<string, Numbers> = {}
  for (const shaft of layout.shafts) shafts[shaft.id] = {}
  const plant: Numbers = {}
  results.paths.forEach((path, k) => {
    const dot = path.indexOf('.')
    const owner = path.slice(0, dot)
    const group = owner === 'plant' ? plant : (units[owner] ?? shafts[owner])
    if (group) group[path.slice(dot + 1)] = finite(results.values[k]!)
  })
  const { structure } = model
  return {
    status,
    streams,
    units,
    shafts,
    plant,
    closure: balance.closure,
    undetermined: balance.undetermined,
    unbounded: balance.unbounded,
    findings: [...remarks, ...balance.findings],
    unknowns: structure.equationCount + structure.missing - structure.excess,
    equations: structure.equationCount,
    blocks: structure.blocks.length,
    iterations: balance.iterations,
  }
}

function finite(value: number): number | null {
  return Number.isFinite(value) ? value : null
}
