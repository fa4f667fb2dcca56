import { variablesOf } from '../equations/expression/index.ts'
import type { Given, Layout } from '../plant/document.ts'
import type { Finding, Remedy } from './answer.ts'
import { error, Wording } from './findings.ts'
import { givensBehind } from './givens-behind.ts'
import type { Model } from './model.ts'
import type { Results } from './results.ts'

/** A relative difference of this size is round-off: of pressures, flows and entropy flows. */
const roundOff = 1e-8
/** Remedies offered for an impossible answer. */
const mostRemedies = 12
/** A temperature difference of this size is round-off, K. */
const differenceRoundOff = 1e-7

/** Errors and cautions that the answer itself shows: what cannot be, and what is unusual. */
export function checkAnswer(model: Model, results: Results): Finding[] {
  const wording = new Wording(model.system.layout)
  const findings = [
    ...flowChecks(model, results, wording),
    ...pressureChecks(model, results, wording),
    ...rangeChecks(model, wording),
    ...entropyChecks(model, results, wording),
    ...differenceChecks(model, wording),
    ...transferChecks(model, wording),
    ...stateChecks(model, results, wording),
    ...divisorChecks(model, results, wording),
    ...curveChecks(model, results, wording),
    ...idleChecks(model.system.layout, wording),
  ]
  const causes = findings.filter((finding) => isOfGiven(model, finding))
  return findings
    .filter(
      (finding) => causes.length === 0 || finding.severity !== 'error' || causes.includes(finding),
    )
    .map((finding) =>
      finding.severity === 'error'
        ? { ...finding, remedies: remediesFor(model, finding.quantities) }
        : finding,
    )
}

/** A given that cannot be: what else cannot be follows from it, and would only hide it. */
function isOfGiven({ system }: Model, { severity, code, quantities }: Finding): boolean {
  if (severity !== 'error' || !ownValueCodes.includes(code)) return false
  const index = system.indexOf.get(quantities[0] ?? '')
  return index !== undefined && !Number.isNaN(system.given[index]!)
}

/** Findings of one quantity's own value. */
const ownValueCodes: readonly string[] = ['impossible-value', 'reversed-flow']

/** Whether an answer with these findings cannot be. */
export function isImpossible(checks: readonly Finding[]): boolean {
  return checks.some((finding) => finding.severity === 'error')
}

/** Whether a given itself cannot be, so that no other answer helps. */
export function isOfGivens(model: Model, checks: readonly Finding[]): boolean {
  return checks.some((finding) => isOfGiven(model, finding))
}

/** Givens on which an impossible number depends, nearest first: one of them is to be changed. */
function remediesFor(model: Model, quantities: readonly string[]): Remedy[] {
  return givensBehind(model, quantities, mostRemedies).map((path) => ({ action: 'give', path }))
}

function largestFlow(results: Results): number {
  let largest = 0
  for (let k = 0; k < results.states.phases.length; k++) {
    const m = Math.abs(results.states.get(k, 'm'))
    if (m > largest) largest = m
  }
  return largest
}

function flowChecks(model: Model, results: Results, wording: Wording): Finding[] {
  const findings: Finding[] = []
  const { streams } = model.system.layout
  const largest = largestFlow(results)
  const allKnown = streams.every((_, k) => !Number.isNaN(results.states.get(k, 'm')))
  if (streams.length > 0 && allKnown && largest < 1e-9) {
    const flows = streams.map((stream) => `${stream.id}.m`)
    findings.push(
      error(
        'no-flow',
        streams.map((stream) => stream.id),
        flows,
        'The equations hold only with every flow zero: nothing fixes the size of the plant.',
        { advice: 'Give a flow or a power other than zero.' },
      ),
    )
    return findings
  }
  streams.forEach((stream, k) => {
    const m = results.states.get(k, 'm')
    if (m < -roundOff * largest) {
      const ends = [stream.from, stream.to].map((end) => end.slice(0, end.indexOf('.')))
      findings.push(
        error(
          'reversed-flow',
          [stream.id, ...ends],
          [`${stream.id}.m`],
          `${wording.name(stream.id)} would have to flow backwards, ${wording.value(m, 'massFlow')}.`,
          { advice: 'What it serves takes no flow at these values: change them, or leave it out.' },
        ),
      )
    }
  })
  return findings
}

function pressureChecks(model: Model, results: Results, wording: Wording): Finding[] {
  const findings: Finding[] = []
  for (const placed of model.system.units) {
    const { unit, kind, shape, streams } = placed
    const reported = new Set<string>()
    for (const { from, to, course } of kind.paths(shape)) {
      const fromId = streams.get(from)
      const toId = streams.get(to)
      if (fromId === undefined || toId === undefined) continue
      const first = results.states.get(results.placeOf.get(fromId)!, 'p')
      const last = results.states.get(results.placeOf.get(toId)!, 'p')
      const rise = last - first
      if (!(Math.abs(rise) > roundOff * first)) continue
      const isThrottled = course === 'throttledLine'
      if (isThrottled && results.states.get(results.placeOf.get(fromId)!, 'm') === 0) continue
      const wrong = kind.raisesPressure ? rise < 0 : rise > 0
      const culprit = isThrottled ? fromId : toId
      if (!wrong || reported.has(culprit)) continue
      reported.add(culprit)
      const p1 = wording.value(first, 'pressure')
      const p2 = wording.value(last, 'pressure')
      const name = wording.name(unit.id)
      const message = kind.raisesPressure
        ? `${name} would lower the pressure, from ${p1} to ${p2}.`
        : isThrottled
          ? `${name}: ${wording.name(fromId)} arrives at ${p1}, below the ${p2} inside.`
          : `${name} would raise the pressure, from ${p1} to ${p2}.`
      findings.push(
        error(
          isThrottled ? 'entry-below-unit' : 'pressure-rises',
          [unit.id, fromId, toId],
          [`${toId}.p`, `${fromId}.p`],
          message,
          { advice: 'Change the pressure on one of its sides.' },
        ),
      )
    }
  }
  return findings
}

function rangeChecks(model: Model, wording: Wording): Finding[] {
  const findings: Finding[] = []
  const { system, program } = model
  system.variables.forEach((variable, index) => {
    const { possible, range, dimension } = variable.description
    if (program.lost[index] || variable.isPhantom || (!possible && !range)) return
    const value = model.values[index]!
    const { path, owner } = variable
    if (possible) {
      const { above, least, most, below } = possible
      const slack = roundOff * Math.max(1, Math.abs(value))
      const tooLow =
        (above !== undefined && value <= above) || (least !== undefined && value < least - slack)
      const tooHigh =
        (most !== undefined && value > most + slack) || (below !== undefined && value >= below)
      if (tooLow || tooHigh) {
        const limit = tooLow ? (above ?? least)! : (most ?? below)!
        const bound = tooLow
          ? above !== undefined
            ? 'must be above'
            : 'cannot be below'
          : most !== undefined
            ? 'cannot be above'
            : 'must be below'
        findings.push(
          error(
            'impossible-value',
            [owner],
            [path],
            `${wording.quantity(path)} is ${wording.value(value, dimension)}; it ${bound} ${wording.value(limit, dimension)}.`,
            { advice: 'Change it, or what it follows from.' },
          ),
        )
        return
      }
    }
    if (range && !Number.isNaN(system.given[index]!) && (value < range[0] || value > range[1])) {
      findings.push({
        severity: 'caution',
        code: 'outside-usual-range',
        where: [owner],
        quantities: [path],
        message: `${wording.quantity(path)} is ${wording.value(value, dimension)}, outside the usual ${wording.value(range[0], dimension)} to ${wording.value(range[1], dimension)} (${variable.description.basis ?? 'common practice'}).`,
      })
    }
  })
  return findings
}

/** A given ratio of nothing to nothing: the products hold, but nothing is fixed by it. */
function divisorChecks(model: Model, results: Results, wording: Wording): Finding[] {
  const { system } = model
  const size = Math.abs(results.value('plant.heatInput') ?? 0)
  return model
    .divisors()
    .filter(({ owner, key, value }) => {
      const index = system.indexOf.get(`${owner}.${key}`)
      const isGiven = index !== undefined && !Number.isNaN(system.given[index]!)
      return isGiven && Math.abs(value) <= roundOff * size
    })
    .map(({ owner, key }) =>
      error(
        'ratio-of-nothing',
        [owner],
        [`${owner}.${key}`],
        `${wording.quantity(`${owner}.${key}`)} is given, but what it relates to comes out as zero: the given value cannot be reached.`,
        { advice: 'Give another value, or another quantity.' },
      ),
    )
}

/** Temperature differences that must not be below zero, even where only a conductance would suffer. */
function differenceChecks(model: Model, wording: Wording): Finding[] {
  const findings: Finding[] = []
  for (const { owner, name, value } of model.differences()) {
    if (value >= -differenceRoundOff) continue
    const streams = model.system.unitOf.get(owner)?.connections ?? []
    const outlets = streams
      .filter(({ description }) => description.direction === 'out')
      .map(({ stream }) => `${stream}.T`)
    const own = ['terminalDifference', 'drainApproach', 'hotEndDifference', 'coldEndDifference']
      .map((quantity) => `${owner}.${quantity}`)
      .filter((path) => model.system.indexOf.has(path))
    findings.push(
      error(
        'temperature-cross',
        [owner],
        [...own, ...outlets],
        `${wording.name(owner)}: the temperature difference ${name} is ${wording.value(value, 'temperatureDifference')}; heat would have to flow from cold to hot.`,
        {
          advice:
            'Lower what the water is heated to, raise the steam pressure, or give another approach.',
        },
      ),
    )
  }
  return findings
}

/** A zone whose conductance is given and that would pass no heat all the same. */
function transferChecks(model: Model, wording: Wording): Finding[] {
  return model.unmet().map(({ owner, key }) => {
    const { equation } = model.system.equations.find(
      (one) => one.owner === owner && one.key === key,
    )!
    const paths = variablesOf(equation).map((index) => model.system.variables[index]!.path)
    return error(
      'no-answer',
      [owner],
      paths.filter((path) => path.startsWith(`${owner}.`)),
      `${wording.name(owner)}: a zone would pass no heat although its conductance is given.`,
      { advice: 'Give another conductance, or the approach instead.' },
    )
  })
}

/** A balance can be closed with a state for which there are no steam properties. */
function stateChecks(model: Model, results: Results, wording: Wording): Finding[] {
  const { layout } = model.system
  const { lost } = model.program
  return layout.streams.flatMap((stream, k) => {
    const base = model.system.streamBase[k]!
    const isKnown = !lost[base] && !lost[base + 1] && !lost[base + 2]
    if (!isKnown || !Number.isNaN(results.states.get(k, 'T'))) return []
    const p = wording.value(model.values[base + 1]!, 'pressure')
    const h = wording.value(model.values[base + 2]!, 'specificEnthalpy')
    return error(
      'state-outside-range',
      [stream.id, stream.from.slice(0, stream.from.indexOf('.'))],
      [`${stream.id}.h`, `${stream.id}.p`],
      `${wording.name(stream.id)} would be at ${p} and ${h}, where the properties (IAPWS-IF97) end.`,
      { advice: 'Change what heats or cools it, or its flow.' },
    )
  })
}

function entropyChecks(model: Model, results: Results, wording: Wording): Finding[] {
  const findings: Finding[] = []
  for (const { unit, kind } of model.system.units) {
    const audit = results.audits.get(unit.id)!
    const generated = audit.entropyGenerated ?? 0
    const scale = Math.max(audit.entropyScale, 1e-3)
    if (kind.secondLaw === 'adiabatic' && generated < -roundOff * scale) {
      findings.push(
        error(
          'entropy-destroyed',
          [unit.id],
          [`${unit.id}.entropyGenerated`],
          `${wording.name(unit.id)} would destroy entropy, ${wording.value(generated, 'entropyFlow')}: the second law forbids it.`,
          { advice: 'Check its efficiencies and the states around it.' },
        ),
      )
    }
  }
  return findings
}

function curveChecks(model: Model, results: Results, wording: Wording): Finding[] {
  const findings: Finding[] = []
  const { layout } = model.system
  const look = (owner: string, given: Readonly<Record<string, Given>>): void => {
    for (const [name, value] of Object.entries(given)) {
      if (typeof value === 'number' || !('points' in value)) continue
      const r = results.value(value.against)
      if (r === null) continue
      const first = value.points[0]![0]
      const last = value.points[value.points.length - 1]![0]
      if (r >= first && r <= last) continue
      const path = `${owner}.${name}`
      findings.push({
        severity: 'caution',
        code: 'beyond-curve',
        where: [owner],
        quantities: [path, value.against],
        message: `${wording.quantity(path)} is read beyond the end of its curve, which is then carried straight on.`,
        advice: 'Add points to the curve that cover this case.',
      })
    }
  }
  for (const unit of layout.units) look(unit.id, unit.given)
  for (const stream of layout.streams) look(stream.id, stream.given)
  for (const shaft of layout.shafts) look(shaft.id, shaft.given)
  look('plant', layout.plant.given)
  return findings
}

/** Givens without effect here: kept, and remarked. */
function idleChecks(layout: Layout, wording: Wording): Finding[] {
  const driven = new Set(layout.shafts.flatMap((shaft) => [...shaft.pumps]))
  return layout.units
    .filter((unit) => driven.has(unit.id) && unit.given.driveEfficiency !== undefined)
    .map((unit) => ({
      severity: 'remark' as const,
      code: 'without-effect',
      where: [unit.id],
      quantities: [`${unit.id}.driveEfficiency`],
      message: `${wording.name(unit.id)} is driven by a shaft, so the drive efficiency given for a motor has no effect.`,
    }))
}
