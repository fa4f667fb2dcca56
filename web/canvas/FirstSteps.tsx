import { keysText } from '../commands/shortcuts.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { lastStep, showStep, useFirstSteps } from './first-steps-store.ts'

const steps: readonly (() => string)[] = [
  () =>
    'Click a unit or a stream for its numbers. Underlined ones are given: type over one and the plant follows.',
  () =>
    'Drag a kind from the rail onto a stream to put it in. Drag from a port to connect, or to see what can follow.',
  () =>
    `${keysText('Mod+K')} finds every unit, number and command. ${keysText('Mod+Z')} takes back whatever you try.`,
]

/** Three hints for whoever sees the window for the first time, one at a time, over the legend. */
export function FirstSteps() {
  const step = useFirstSteps((state) => state.step)
  // An open card needs the room, and has the word.
  const quiet = useSelectionStore((state) => state.selected.length > 0)
  const text = step === null ? undefined : steps[step]?.()
  if (quiet || step === null || text === undefined) return null
  return (
    <aside className="first-steps" aria-label="First steps">
      <span className="first-steps-count">
        {step + 1} of {steps.length}
      </span>
      <p>{text}</p>
      <button
        type="button"
        className="link"
        onClick={() => showStep(step < lastStep ? step + 1 : null)}
      >
        {step < lastStep ? 'Next' : 'Done'}
      </button>
      {step < lastStep && (
        <button type="button" className="link" onClick={() => showStep(null)}>
          No hints
        </button>
      )}
    </aside>
  )
}
