import { at, type SymbolDrawing } from './symbol.ts'

export const heatExchanger: SymbolDrawing = {
  size: () => ({ width: 48, height: 48 }),
  ports: {
    hot: at(0, 8, 'left'),
    hotOutlet: at(48, 8, 'right'),
    cold: at(48, 40, 'right'),
    coldOutlet: at(0, 40, 'left'),
  },
  Drawing: () => (
    <>
      <path d="M0 0H48V48H0Z" />
      <path className="open" d="M0 24L4 19L12 29L20 19L28 29L36 19L44 29L48 24" />
      <path className="detail open" d="M0 8H48M34 4L40 8L34 12M48 40H0M14 36L8 40L14 44" />
    </>
  ),
  label: ['top', 'bottom', 'right', 'left'],
}
