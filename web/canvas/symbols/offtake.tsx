import { at, type SymbolDrawing } from './symbol.ts'

export const offtake: SymbolDrawing = {
  size: () => ({ width: 32, height: 16 }),
  ports: { inlet: at(10, 8, 'left') },
  Drawing: () => (
    <>
      <path d="M0 0H32V16H0L10 8Z" />
      <path className="detail open" d="M15 8H26" />
    </>
  ),
  label: ['top', 'bottom', 'right'],
}
