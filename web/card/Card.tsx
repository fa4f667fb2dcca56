import { useMemo, useRef, useState } from 'react'
import { ownerOf, setLabel, setOption, withinSentence } from '../../src/document.ts'
import { editLayout, useLayout, usePlantStore } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { Icon } from '../strip/Icon.tsx'
import { CardFoot } from './CardFoot.tsx'
import { CardRows } from './CardRows.tsx'
import { CardTrouble } from './CardTrouble.tsx'
import { type CardContent, type CardOption, cardContent, type Neighbour } from './card-content.ts'
import { ManyCard } from './ManyCard.tsx'
import { usePlace } from './use-place.ts'
import './card.css'

function Title({ content }: { content: CardContent }) {
  const [text, setText] = useState<string | null>(null)
  const { id, title, renamable } = content
  if (!renamable) return <h2>{title}</h2>
  const commit = () => {
    const wanted = text?.trim()
    setText(null)
    if (wanted !== undefined && wanted !== title) {
      editLayout(`Rename ${title} to ${wanted}`, (plant, layoutId) =>
        setLabel(plant, layoutId, id, wanted),
      )
    }
  }
  return (
    <h2>
      <input
        className="card-title"
        aria-label="Name"
        value={text ?? title}
        spellCheck={false}
        onChange={(event) => setText(event.target.value)}
        onBlur={commit}
        onKeyDown={(event) => {
          event.stopPropagation()
          if (event.key === 'Enter') event.currentTarget.blur()
          else if (event.key === 'Escape') setText(null)
        }}
      />
    </h2>
  )
}

function Options({ id, options }: { id: string; options: readonly CardOption[] }) {
  if (options.length === 0) return null
  const chosen = options.filter(({ on }) => on).map(({ description }) => description.label)
  return (
    <details className="card-part card-neighbours card-options">
      <summary title="Options: what it has and what it does">
        {chosen.length === 0 ? 'Options: none' : `With ${listText(chosen)}`}
      </summary>
      {options.map(({ name, description, on }) => (
        <label key={name} className="card-option" title={description.help}>
          <input
            type="checkbox"
            checked={on}
            onChange={() =>
              editLayout(`${description.label} ${on ? 'off' : 'on'}`, (plant, layoutId) =>
                setOption(plant, layoutId, id, name, on ? undefined : true),
              )
            }
          />
          {description.label}
        </label>
      ))}
    </details>
  )
}

/** 'drain cooler, plugged tubes' */
function listText(labels: readonly string[]): string {
  return labels.map(withinSentence).join(', ')
}

function Neighbours({ neighbours }: { neighbours: readonly Neighbour[] }) {
  const select = useSelectionStore((state) => state.select)
  const hover = useSelectionStore((state) => state.hover)
  if (neighbours.length === 0) return null
  return (
    <details className="card-part card-neighbours">
      <summary>Connections</summary>
      <ul>
        {neighbours.map(({ place, id, name }) => (
          <li key={`${place}/${id ?? ''}`}>
            <span className="muted">{place}</span>
            {id === undefined ? (
              <span className="muted">{name}</span>
            ) : (
              <button
                type="button"
                className="link"
                onClick={() => select([id])}
                onPointerEnter={() => hover(id)}
                onPointerLeave={() => hover(null)}
              >
                {name}
              </button>
            )}
          </li>
        ))}
      </ul>
    </details>
  )
}

function OpenCard({ content }: { content: CardContent }) {
  const card = useRef<HTMLElement>(null)
  const { place, startMove } = usePlace(card, content.id)
  const [pointed, setPointed] = useState<string | null>(null)
  const foot = pointed ?? content.chief
  const select = useSelectionStore((state) => state.select)
  return (
    <section
      ref={card}
      className="card"
      aria-label={content.title}
      style={place ? { left: place.left, top: place.top } : { opacity: 0 }}
      onKeyDown={(event) => {
        if (event.key !== 'Escape') return
        event.stopPropagation()
        select([])
        document
          .querySelector<HTMLElement>(`.canvas-place [data-id="${CSS.escape(content.id)}"]`)
          ?.focus()
      }}
    >
      <header className="card-head" onPointerDown={startMove}>
        <Title content={content} />
        <span className="card-about" title={content.help}>
          {content.about}
        </span>
        <button
          type="button"
          className="icon-button"
          aria-label="Close the card"
          onClick={() => select([])}
        >
          <Icon name="close" size={12} />
        </button>
      </header>
      <div className="card-body">
        <CardRows content={content} onPoint={setPointed} />
        <Options id={content.id} options={content.options} />
        <Neighbours neighbours={content.neighbours} />
      </div>
      <CardTrouble />
      {foot !== undefined && <CardFoot path={foot} />}
    </section>
  )
}

/** The card of what is selected, laid over the canvas where it covers least. */
export function Card() {
  const layout = useLayout()
  const opened = usePlantStore((state) => state.opened)
  const selected = useSelectionStore(({ selected: ids }) =>
    ids.length === 1 ? (ids[0] as string) : null,
  )
  const content = useMemo(
    () => (selected === null ? undefined : cardContent(layout, selected)),
    [layout, selected],
  )
  const many = useSelectionStore((state) => state.selected)
  if (many.length > 1) {
    const ids = many.filter((id) => ownerOf(layout, id) !== undefined)
    if (ids.length > 1) return <ManyCard key={`${opened}/${ids.join()}`} ids={many} />
  }
  return content ? <OpenCard key={`${opened}/${content.id}`} content={content} /> : null
}
