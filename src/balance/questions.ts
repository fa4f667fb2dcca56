import { Outcome, Saturation, STATE_SIZE, State, stateAtPressureEnthalpy } from '../steam/index.ts'
import type { Model } from './model.ts'
import type { Question, QuestionAnswer } from './question.ts'
import type { Balance } from './solve.ts'
import { equationsOf, whereFrom } from './where-from.ts'
import { type Worth, Worths } from './worth.ts'

/** Answers questions about the balance solved last; works nothing out before it is asked. */
export class Questions {
  private balance: Balance | undefined
  private worths: { readonly model: Model; readonly of: Worths } | undefined
  private isFresh = false

  /** A new balance; undefined: there is none. */
  takeOver(balance: Balance | undefined): void {
    this.balance = balance
    this.isFresh = false
  }

  answer(question: Question): QuestionAnswer {
    const { balance } = this
    switch (question.type) {
      case 'whereFrom': {
        const { path, units } = question
        const origin = balance ? whereFrom(balance.model, path, balance.results, units) : null
        return { type: 'whereFrom', origin }
      }
      case 'worth': {
        const { target, frozen } = question
        const worths = balance?.status === 'solved' ? this.worthsFor(target, balance, frozen) : []
        return { type: 'worth', target, frozen, worths }
      }
      case 'equations': {
        const { owner, units } = question
        const equations = balance ? equationsOf(balance.model, owner, balance.results, units) : []
        return { type: 'equations', equations }
      }
    }
  }

  private worthsFor(target: string, balance: Balance, frozen: boolean): readonly Worth[] {
    const { model } = balance
    if (this.worths?.model !== model) this.worths = { model, of: new Worths(model) }
    else if (!this.isFresh) this.worths.of.refresh()
    this.isFresh = true
    const { of } = this.worths
    if (model.system.indexOf.has(target)) return of.of(target, balance, frozen)
    const slopes = slopesOf(balance, target)
    if (!slopes) return []
    const stream = target.slice(0, target.lastIndexOf('.'))
    const byPressure = of.of(`${stream}.p`, balance, frozen)
    const byEnthalpy = of.of(`${stream}.h`, balance, frozen)
    return byPressure.map((one, k) => {
      const other = byEnthalpy[k]!
      return {
        ...one,
        fixed: slopes.p * one.fixed + slopes.h * other.fixed,
        frozen:
          one.frozen === null || other.frozen === null
            ? null
            : slopes.p * one.frozen + slopes.h * other.frozen,
      }
    })
  }
}

const record = new Float64Array(STATE_SIZE)

/** How a stream's further quantities change with its pressure and enthalpy, SI. */
function slopesOf(
  { results }: Balance,
  path: string,
): { readonly p: number; readonly h: number } | undefined {
  const dot = path.lastIndexOf('.')
  const stream = path.slice(0, dot)
  const [p, h] = [results.value(`${stream}.p`), results.value(`${stream}.h`)]
  if (p === null || h === null || results.value(path) === null) return undefined
  if (stateAtPressureEnthalpy(record, 0, p, h) !== Outcome.fine) return undefined
  const at = (index: number): number => record[index]!
  const saturated = at(State.saturation + Saturation.Tp)
  switch (path.slice(dot + 1)) {
    case 'T':
      return { p: at(State.Tp), h: at(State.Th) }
    case 's':
      return { p: at(State.sp), h: at(State.sh) }
    case 'v':
      return { p: at(State.vp), h: at(State.vh) }
    case 'x':
      return { p: at(State.xp), h: at(State.xh) }
    case 'superheat':
      return { p: at(State.Tp) - saturated, h: at(State.Th) }
    case 'subcooling':
      return { p: saturated - at(State.Tp), h: -at(State.Th) }
    default:
      return undefined
  }
}
