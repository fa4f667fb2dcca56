import { at, type SymbolDrawing } from './symbol.ts'

export const supply: SymbolDrawing = {
  size: () => ({ width: 32, height: 16 }),
  ports: { outlet: at(32, 8, 'right') },
  Drawing: () => (
    <>
      <path d="M0 0H23L32 8L23 16H0Z" />
      <path className="detail open" d="M7 8H19" />
    </>
  ),
  label: ['top', 'bottom', 'left'],
}
