import { type KeyboardEvent, memo, useId, useState } from 'react'
import { labelOf } from '../../src/document.ts'
import { useLayout } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { useChartStore } from './chart-store.ts'
import { stateInWords } from './summary.ts'
import { useNamedStates, useStates } from './use-named-states.ts'

const Option = memo(function Option({
  id,
  text,
  current,
}: {
  readonly id: string
  readonly text: string
  readonly current: boolean
}) {
  return (
    // The list keeps the focus and says which option is meant.
    <div id={id} role="option" aria-selected={current} tabIndex={-1}>
      {text}
    </div>
  )
})

/**
 * The chart for the keyboard and for those who hear it: a list of its states, unseen, that lights on the
 * chart whatever it stands on. Keys that it has no use for go on to `onKeyDown`.
 */
export function StateList({
  onKeyDown,
}: {
  readonly onKeyDown: (event: KeyboardEvent<HTMLElement>) => void
}) {
  const id = useId()
  const store = useChartStore()
  const states = useStates()
  const named = useNamedStates()
  const layout = useLayout()
  const units = useUnitChoice()
  const hover = useSelectionStore((selection) => selection.hover)
  const select = useSelectionStore((selection) => selection.select)
  const [current, setCurrent] = useState<string | null>(null)
  const ids = [...states.keys()]
  const at = current === null ? -1 : ids.indexOf(current)

  const point = (stream: string | undefined) => {
    setCurrent(stream ?? null)
    store.setState({ pointed: stream === undefined ? null : { kind: 'state', stream } })
    hover(stream ?? null)
  }
  const keyDown = (event: KeyboardEvent<HTMLElement>) => {
    const last = ids.length - 1
    const plain = !event.shiftKey && !event.ctrlKey && !event.metaKey && !event.altKey
    const move = (next: number) => {
      event.preventDefault()
      if (ids.length > 0) point(ids[Math.min(last, Math.max(0, next))])
    }
    if (plain && event.key === 'ArrowDown') move(at + 1)
    else if (plain && event.key === 'ArrowUp') move(at < 0 ? last : at - 1)
    else if (plain && event.key === 'Home') move(0)
    else if (plain && event.key === 'End') move(last)
    else if (event.key === 'Enter' && current !== null) {
      event.preventDefault()
      select([current], event.ctrlKey || event.metaKey || event.shiftKey ? 'toggle' : 'replace')
    } else if (event.key === 'Escape' && current !== null) {
      event.stopPropagation()
      point(undefined)
    } else onKeyDown(event)
  }

  return (
    <div
      className="chart-list visually-hidden"
      role="listbox"
      aria-label="States on the chart; arrow keys walk through them, plus and minus zoom, zero fits, shift and arrows move the view"
      tabIndex={0}
      aria-activedescendant={at >= 0 ? `${id}-${current}` : undefined}
      onKeyDown={keyDown}
      onBlur={() => {
        if (current !== null) point(undefined)
      }}
    >
      {ids.map((stream) => {
        const name = named.find((one) => one.id === stream)?.name
        const label = labelOf(layout, stream)
        const title = name ? `${name}, ${label}` : label
        const state = states.get(stream)
        const isCurrent = stream === current
        return (
          <Option
            key={stream}
            id={`${id}-${stream}`}
            current={isCurrent}
            text={isCurrent && state ? `${title}: ${stateInWords(state, units)}` : title}
          />
        )
      })}
    </div>
  )
}
