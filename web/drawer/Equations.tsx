import { useEffect } from 'react'
import { labelOf, ownerOf, withinSentence } from '../../src/document.ts'
import type { OwnEquation } from '../../src/messages.ts'
import { WorkedLine } from '../number/WorkedLine.tsx'
import { useLayout } from '../store/plant-store.ts'
import { useQuestionStore, wantEquations } from '../store/questions.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { equationName } from './equation-name.ts'
import { useWhereFromStore } from './where-from-store.ts'
import './where-from.css'

function Equation({ equation }: { equation: OwnEquation }) {
  const { key, path, symbols, worked } = equation
  const ask = useWhereFromStore((state) => state.ask)
  return (
    <tr>
      <th scope="row">{equationName(key)}</th>
      <td>
        <WorkedLine pieces={symbols} onFollow={ask} />
        {worked && (
          <div className="equation-figures">
            {worked.result.path !== undefined && (
              <>
                <WorkedLine pieces={[worked.result]} />
                {' = '}
              </>
            )}
            <WorkedLine pieces={worked.figures} onFollow={ask} />
          </div>
        )}
      </td>
      <td className="muted">
        {path === null ? 'fixes nothing yet' : <WorkedLine pieces={[{ path }]} onFollow={ask} />}
      </td>
    </tr>
  )
}

function Listed({ owner }: { owner: string }) {
  const layout = useLayout()
  const equations = useQuestionStore((state) => state.equations.get(owner))
  useEffect(() => wantEquations(owner), [owner])
  const name = owner === 'plant' ? 'the plant' : withinSentence(labelOf(layout, owner))
  return (
    <section className="equations">
      <h3>Equations of {name}</h3>
      {equations && (
        <table>
          <thead>
            <tr className="muted">
              <th scope="col">Equation</th>
              <th scope="col">In symbols and in figures</th>
              <th scope="col">Fixes</th>
            </tr>
          </thead>
          <tbody>
            {equations.map((equation) => (
              <Equation key={equation.key} equation={equation} />
            ))}
          </tbody>
        </table>
      )}
      {equations?.length === 0 && <p className="muted">It has no equations of its own.</p>}
    </section>
  )
}

/** The equations of the one thing selected, or a word on how to see them. */
export function Equations() {
  const layout = useLayout()
  const selected = useSelectionStore((state) =>
    state.selected.length === 1 ? (state.selected[0] ?? null) : null,
  )
  if (selected === null || ownerOf(layout, selected) === undefined) {
    return <p className="muted ledger-note">Select a unit, and its equations stand here.</p>
  }
  return <Listed key={selected} owner={selected} />
}
