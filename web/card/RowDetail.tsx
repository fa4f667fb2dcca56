import type { QuantityEntry } from '../../src/document.ts'
import { useWhereFromStore } from '../drawer/where-from-store.ts'
import { openCurve } from '../number/curve-store.ts'
import { usualText } from '../number/typed-number.ts'
import { useGiven } from '../store/plant-store.ts'
import { useSettingsStore, useUnitChoice } from '../store/settings-store.ts'
import { BasisEditor } from './BasisEditor.tsx'

/** What can be said of a quantity and done with it, under its row on demand. */
export function RowDetail({ entry }: { entry: QuantityEntry }) {
  const { path, description } = entry
  const given = useGiven(path)
  const units = useUnitChoice()
  const usual = usualText(description, units)
  const change = useSettingsStore((state) => state.change)
  const ask = useWhereFromStore((state) => state.ask)
  return (
    <div className="row-detail">
      <p>{description.help}</p>
      {usual && <p className="muted">{usual}</p>}
      {given !== undefined && <BasisEditor path={path} description={description} />}
      <p className="row-actions">
        <button type="button" className="link" onClick={() => ask(path)}>
          Where from
        </button>
        <button type="button" className="link" onClick={() => openCurve(path)}>
          {given !== undefined && typeof given !== 'number' ? 'Edit the curve' : 'Give as a curve'}
        </button>
        <button type="button" className="link" onClick={() => change({ worthTarget: path })}>
          Tell worth of this
        </button>
      </p>
    </div>
  )
}
