import { usePlantStore } from '../store/plant-store.ts'

/** The remedy that always helps: the edit after which the plant has no answer is taken back. */
export function TakeBack() {
  const name = usePlantStore((state) => state.past.at(-1)?.name)
  const undo = usePlantStore((state) => state.undo)
  if (name === undefined) return null
  return (
    <div className="remedies">
      <button type="button" className="remedy" data-remedy="undo" onClick={undo}>
        Take back<span className="remedy-value">{name}</span>
      </button>
    </div>
  )
}
