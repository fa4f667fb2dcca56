import { dimensions } from '../../src/document.ts'
import type { QuantityDescription } from '../../src/units/kind.ts'

/** What is missing or wrong in what a kind says of a quantity. */
export function descriptionFaults(name: string, description: QuantityDescription): string[] {
  const { label, symbol, dimension, help, usual, given, range, basis, possible, step } = description
  const faults: string[] = []
  const check = (isRight: boolean, what: string): void => {
    if (!isRight) faults.push(`${name}: ${what}`)
  }
  check(/^[A-ZΔ]\S*( \S+)*$/.test(label), `label '${label}'`)
  check(symbol !== undefined && /^\S{1,6}$/.test(symbol), `symbol '${symbol}'`)
  check(dimensions.includes(dimension), `dimension '${dimension}'`)
  check(/^[A-Z].*\.$/.test(help) && !/[.!?]\s/.test(help), `help is no sentence: '${help}'`)
  check(isReadOff(name, description) || (step !== undefined && step > 0), 'no step')
  check(!given || usual !== undefined, 'arrives given, at no value')
  const isWithoutRange = range === undefined && (!given || usual === 0)
  // Of what usually is nought (fixed losses) there is no usual range: it goes with the size.
  check(!given || usual === 0 || range !== undefined, 'arrives given, without a usual range')
  check(isWithoutRange || /\S/.test(basis ?? ''), 'usual, on no basis')
  if (range) {
    const [low, high] = range
    check(low < high, `range from ${low} to ${high}`)
    check(usual === undefined || (low <= usual && usual <= high), `usual ${usual} out of range`)
    for (const end of range) check(isPossible(end, possible), `${end} is usual and impossible`)
  }
  check(usual === undefined || isPossible(usual, possible), `usual ${usual} is impossible`)
  return faults
}

/** Constants of the hardware and what follows from a turbine's states: nobody sets them by steps. */
function isReadOff(name: string, { dimension, given, designed, usual }: QuantityDescription) {
  if (given || designed || usual !== undefined) return false
  if (dimension === 'lossConstant' || dimension === 'flowConstant') return true
  return ['exhaustVolumeFlow', 'groupEndEnthalpy', 'bleedSteam'].includes(name)
}

function isPossible(value: number, possible: QuantityDescription['possible'] = {}): boolean {
  const { above = -Infinity, least = -Infinity, most = Infinity, below = Infinity } = possible
  return value > above && value >= least && value <= most && value < below
}
