import { memo } from 'react'
import type { Figure, Piece } from '../../src/messages.ts'
import { readLayout } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { quantityName } from './give.ts'
import { quantitySymbol } from './quantity-symbol.ts'

/** ①, ② ... for the steps of a statement. */
export function stepMark(step: number): string {
  return step < 20 ? String.fromCharCode(0x2460 + step) : `(${step + 1})`
}

function Symbol_({ path }: { path: string }) {
  const { symbol, owner } = quantitySymbol(readLayout(), path)
  return (
    <span className="symbol">
      {symbol}
      {owner && <sub>{owner}</sub>}
    </span>
  )
}

function FigureText({ figure, unit }: Figure) {
  return (
    <span className="worked-figure">
      {figure}
      {unit && <span className="quantity-unit">{`\u2009${unit}`}</span>}
    </span>
  )
}

interface Props {
  readonly pieces: readonly Piece[]
  /** What a click on a quantity does; without it nothing can be clicked. */
  onFollow?(path: string): void
}

/** An equation in symbols or in figures, each quantity to be asked in turn. */
export const WorkedLine = memo(function WorkedLine({ pieces, onFollow }: Props) {
  const { hover } = useSelectionStore.getState()
  return (
    <span className="worked-line">
      {pieces.map((piece, i) => {
        const key = i
        if (typeof piece === 'string') return <span key={key}>{piece}</span>
        const shown =
          'figure' in piece ? (
            <FigureText {...piece} />
          ) : 'path' in piece ? (
            <Symbol_ path={piece.path} />
          ) : (
            stepMark(piece.step)
          )
        const { path } = 'path' in piece ? piece : { path: undefined }
        if (path === undefined || !onFollow) {
          const step = 'figure' in piece ? piece.step : undefined
          return (
            <span key={key} className={step === undefined ? undefined : 'worked-step-value'}>
              {shown}
            </span>
          )
        }
        const [id = ''] = path.split('.')
        return (
          <button
            key={key}
            type="button"
            className="worked-quantity"
            title={quantityName(path)}
            data-follow={path}
            onClick={() => onFollow(path)}
            onPointerEnter={() => hover(id)}
            onPointerLeave={() => hover(null)}
            onFocus={() => hover(id)}
            onBlur={() => hover(null)}
          >
            {shown}
          </button>
        )
      })}
    </span>
  )
})
