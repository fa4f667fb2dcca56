import { at, type SymbolDrawing } from './symbol.ts'

export const separator: SymbolDrawing = {
  size: () => ({ width: 32, height: 56 }),
  ports: {
    inlet: at(0, 16, 'left'),
    steam: at(32, 16, 'right'),
    drain: at(16, 56, 'bottom'),
  },
  Drawing: () => (
    <>
      <path d="M8 0H24L32 8V36L16 56L0 36V8Z" />
      <path className="detail open" d="M7 9L13 16L7 23M13 9L19 16L13 23M19 9L25 16L19 23" />
    </>
  ),
  label: ['right', 'left', 'top', 'bottom'],
}
