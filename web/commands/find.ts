import {
  kindOf,
  type Layout,
  labelOf,
  quantitiesOfId,
  splitPath,
  withinSentence,
} from '../../src/document.ts'
import { type Command, commandName, isEnabled } from './command-store.ts'

export type Found =
  | {
      readonly type: 'command'
      readonly key: string
      readonly name: string
      readonly command: Command
    }
  | {
      readonly type: 'item'
      readonly key: string
      readonly name: string
      readonly detail: string
      readonly id: string
    }
  | {
      readonly type: 'quantity'
      readonly key: string
      readonly name: string
      readonly detail: string
      readonly id: string
      readonly path: string
    }

interface Entry {
  readonly found: Found
  /** What the words are looked for in, lower case; earlier texts weigh more. */
  readonly texts: readonly string[]
  readonly weight: number
}

/** How well a word fits a text: 3 the whole, 2 the start, 1.5 the start of a word, 1 within, 0 not. */
function likeness(word: string, text: string): number {
  const at = text.indexOf(word)
  if (at < 0) return 0
  if (at === 0) return text.length === word.length ? 3 : 2
  return /[\s.,(-]/.test(text[at - 1] ?? '') ? 1.5 : 1
}

function score(words: readonly string[], entry: Entry): number {
  let sum = 0
  for (const word of words) {
    let best = 0
    entry.texts.forEach((text, i) => {
      best = Math.max(best, likeness(word, text) / (1 + 0.3 * i))
    })
    if (best === 0) return 0
    sum += best
  }
  return (sum / words.length) * entry.weight
}

const entriesOfLayout = new WeakMap<Layout, readonly Entry[]>()

/** Units, streams, shafts and quantities of a layout, kept as long as the layout is. */
function layoutEntries(layout: Layout): readonly Entry[] {
  const kept = entriesOfLayout.get(layout)
  if (kept) return kept
  const entries: Entry[] = []
  const add = (id: string, detail: string, hint: string) => {
    const name = labelOf(layout, id)
    if (id !== 'plant') {
      entries.push({
        found: { type: 'item', key: id, name, detail, id },
        texts: [name.toLowerCase(), id.toLowerCase(), detail.toLowerCase()],
        weight: 1.2,
      })
    }
    for (const { path, label, description } of quantitiesOfId(layout, id)) {
      const full = id === 'plant' ? label : `${name}, ${withinSentence(label)}`
      entries.push({
        found: {
          type: 'quantity',
          key: path,
          name: full,
          detail: description.symbol ?? hint,
          id,
          path,
        },
        texts: [
          full.toLowerCase(),
          path.toLowerCase(),
          (description.symbol ?? splitPath(path)?.[1] ?? '').toLowerCase(),
        ],
        weight: id === 'plant' ? 1.1 : 0.9,
      })
    }
  }
  add('plant', '', 'plant')
  for (const unit of layout.units) {
    add(unit.id, withinSentence(kindOf(unit.kind)?.label ?? unit.kind), unit.id)
  }
  for (const stream of layout.streams) add(stream.id, `stream ${stream.id}`, stream.id)
  for (const shaft of layout.shafts) add(shaft.id, 'shaft', shaft.id)
  entriesOfLayout.set(layout, entries)
  return entries
}

/** What fits the words typed, best first. Without words: the commands of the menu. */
export function find(
  text: string,
  layout: Layout,
  commands: readonly Command[],
  most = 12,
): readonly Found[] {
  const words = text.toLowerCase().split(/\s+/).filter(Boolean)
  const runnable = commands.filter(isEnabled).map((command): Entry => {
    const name = commandName(command)
    return {
      found: { type: 'command', key: command.id, name, command },
      texts: [name.toLowerCase(), command.group.toLowerCase()],
      // 'Undo: condenser, pressure ...' is not what is meant by 'condenser pressure'.
      weight: typeof command.name === 'function' ? 0.6 : 1,
    }
  })
  if (words.length === 0) return runnable.slice(0, most).map((entry) => entry.found)
  return [...runnable, ...layoutEntries(layout)]
    .map((entry) => ({ entry, score: score(words, entry) }))
    .filter((one) => one.score > 0)
    .sort((a, b) => b.score - a.score)
    .slice(0, most)
    .map((one) => one.entry.found)
}
