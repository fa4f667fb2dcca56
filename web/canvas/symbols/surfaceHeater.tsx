import { at, type Form, inTurn, type SymbolDrawing } from './symbol.ts'

const has = (form: Form, option: string): boolean => form.options[option] === true

export const surfaceHeater: SymbolDrawing = {
  size: () => ({ width: 48, height: 32 }),
  ports: {
    water: at(0, 16, 'left'),
    outlet: at(48, 16, 'right'),
    // Over the zone that the steam meets first.
    'steam*': (form, number) => {
      const first = has(form, 'desuperheater') ? 40 : 32
      const x = [first, first - 16, first - 8, 8][Math.min(number, 4) - 1] as number
      return [{ x, y: 0, side: 'top' }]
    },
    'drain*': inTurn(
      { x: 24, y: 32, side: 'bottom' },
      { x: 40, y: 32, side: 'bottom' },
      { x: 32, y: 32, side: 'bottom' },
      { x: 16, y: 32, side: 'bottom' },
    ),
    drain: at(8, 32, 'bottom'),
  },
  Drawing({ form }) {
    const cooler = has(form, 'drainCooler')
    const desuperheater = has(form, 'desuperheater')
    return (
      <>
        <path d="M0 0H48V32H0Z" />
        {cooler && <path className="tinted" d="M0 0H16V32H0Z" />}
        {desuperheater && <path className="open" d="M32 0V32" />}
        <path className="open" d="M0 16L4 8L12 24L20 8L28 24L36 8L44 24L48 16" />
      </>
    )
  },
  label: ['top', 'bottom', 'right', 'left'],
}
