import { useEffect, useState } from 'react'
import { formatQuantity } from '../../src/document.ts'
import { readValue, useBalanceStore } from '../store/balance-store.ts'
import { readUnitChoice } from '../store/settings-store.ts'
import { useSolvingStore } from '../store/solving-store.ts'
import { useConnectingStore } from './connecting-store.ts'

/** How long a balance must stand before it is told, ms: typing and dragging give many. */
const settling = 700

const words: Readonly<Record<string, string>> = {
  underspecified: 'Not solved: numbers are missing. See the ledger.',
  overspecified: 'Not solved: a number too many is given. See the ledger.',
  infeasible: 'Not solved: the plant cannot run like this. See the findings.',
  notConverged: 'Not solved: no balance was found. See the findings.',
}

function told(): string {
  const { balance } = useBalanceStore.getState()
  if (!balance) return ''
  if (balance.status !== 'solved') return words[balance.status] ?? 'Not solved.'
  const units = readUnitChoice()
  const parts = (
    [
      ['Net power', 'plant.netPower', 'power'],
      ['unit heat rate', 'plant.unitHeatRate', 'heatRate'],
    ] as const
  ).flatMap(([name, path, dimension]) => {
    const value = readValue(path)
    if (value === null) return []
    const { text, unit } = formatQuantity(value, dimension, units)
    return [`${name} ${text} ${unit}`]
  })
  return ['Solved.', parts.join(', ')].join(' ').trim()
}

/** Says what a balance came to, once it has settled. */
export function ResultAnnouncer() {
  const [text, setText] = useState('')
  useEffect(() => {
    let timer: ReturnType<typeof setTimeout> | undefined
    const settle = () => {
      clearTimeout(timer)
      if (!useSolvingStore.getState().busy) timer = setTimeout(() => setText(told()), settling)
    }
    const endBalance = useBalanceStore.subscribe((now, then) => {
      if (now.balance !== then.balance) settle()
    })
    const endBusy = useSolvingStore.subscribe((now, then) => {
      if (now.busy !== then.busy) settle()
    })
    return () => {
      endBalance()
      endBusy()
      clearTimeout(timer)
    }
  }, [])
  return (
    <div className="visually-hidden" role="log" aria-live="polite" aria-label="Results">
      {text}
    </div>
  )
}

/** Says aloud what happened on the canvas. */
export function Announcer() {
  const notice = useConnectingStore((state) => state.notice)
  const connecting = useConnectingStore((state) => state.connecting)
  const choosing = useConnectingStore((state) => state.choosing)
  const chosen = choosing?.ports[choosing.at]
  const text = chosen
    ? `${choosing?.follow ? 'Place after' : 'Connect from'} ${chosen.label}. Arrows choose, Enter takes.`
    : connecting?.over && !connecting.pointer
      ? `To ${connecting.over.label}, ${connecting.over.reference}`
      : (notice?.text ?? '')
  return (
    <div className="visually-hidden" role="status" aria-live="polite">
      {text}
    </div>
  )
}
