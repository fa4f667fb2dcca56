import { useConnectingStore } from './connecting-store.ts'

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
