import { useEffect } from 'react'
import { describeQuantity } from '../../src/document.ts'
import { useWhereFromStore } from '../drawer/where-from-store.ts'
import { basisText } from '../number/basis-text.ts'
import { WorkedLine } from '../number/WorkedLine.tsx'
import { useLayout } from '../store/plant-store.ts'
import { useQuestionStore, wantOrigin } from '../store/questions.ts'
import { useUnitChoice } from '../store/settings-store.ts'

/** Where a number of the card comes from, in one line: a click shows it step by step. */
export function CardFoot({ path }: { path: string }) {
  const layout = useLayout()
  const units = useUnitChoice()
  const origin = useQuestionStore(({ origins }) => origins.get(path))
  const ask = useWhereFromStore((state) => state.ask)
  useEffect(() => wantOrigin(path), [path])
  const label = describeQuantity(layout, path)?.label ?? path
  return (
    <button
      type="button"
      className="card-foot"
      title="Where from, step by step (W, or a click with Alt on any number)"
      data-foot={path}
      onClick={() => ask(path)}
    >
      <span className="card-foot-line">
        <span className="card-foot-label">{label}</span>
        {origin?.worked ? (
          <>
            {' = '}
            <WorkedLine pieces={origin.worked.figures} />
          </>
        ) : origin?.how === 'given' ? (
          `: given. ${basisText(layout, path, units) ?? ''}`
        ) : origin ? (
          ': open.'
        ) : null}
      </span>
    </button>
  )
}
