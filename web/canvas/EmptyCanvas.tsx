import { openExample, readExamples } from '../files/plant-file.ts'
import type { Form } from './symbols/symbol.ts'
import { UnitSymbol } from './UnitSymbol.tsx'

interface Props {
  readonly onOpenExample?: () => void
  readonly onOpenFile?: () => void
}

const form: Form = { options: {}, counts: {} }
const sketch = [
  ['boiler', 8, 16, ''],
  ['turbine', 136, 24, ''],
  ['condenser', 232, 36, ''],
  ['pump', 176, 124, ' scale(-1 1) translate(-32 0)'],
] as const

/** A plant with one heater, to be drawn further. */
async function openSketch(): Promise<void> {
  const examples = await readExamples().catch(() => [])
  const sketch = examples.find(({ file }) => file === 'one-heater.json')
  if (sketch) await openExample(sketch)
}

/** The empty canvas: three steps to a plant, or one that is there. */
export function EmptyCanvas({ onOpenExample, onOpenFile }: Props) {
  return (
    <div className="empty-canvas">
      <svg width={304} height={168} className="empty-sketch" aria-hidden="true">
        <path d="M40 16V4H144V30M184 74V96H208V20H264V40M264 96V140H204M180 140H40V120" />
        {sketch.map(([kind, x, y, mirrored]) => (
          <g key={kind} transform={`translate(${x} ${y})${mirrored}`}>
            <UnitSymbol kind={kind} form={form} />
          </g>
        ))}
      </svg>
      <div>
        <ol className="empty-steps">
          <li>
            <strong>Place a boiler</strong>
            <p>Drag it from the rail, or press B.</p>
          </li>
          <li>
            <span>Connect a turbine, a condenser and a pump</span>
            <p>Drag from port to port; only what can work lights up.</p>
          </li>
          <li>
            <span>Give what you know</span>
            <p>The ledger says how many numbers are still missing.</p>
          </li>
        </ol>
        <p className="empty-links">
          {onOpenExample && (
            <button type="button" className="link" onClick={onOpenExample}>
              Open an example plant
            </button>
          )}
          <button type="button" className="link" onClick={() => void openSketch()}>
            Start from a one-heater sketch
          </button>
          {onOpenFile && (
            <button type="button" className="link" onClick={onOpenFile}>
              Open a file
            </button>
          )}
        </p>
      </div>
    </div>
  )
}
