import { createStore, del, get, promisifyRequest, set } from 'idb-keyval'

/** A plant kept in this browser. */
export interface KeptPlant {
  readonly id: string
  readonly title: string
  /** When it was last written, ms since 1970. */
  readonly at: number
}

/** How many plants are kept before the oldest makes room. */
const most = 20

const store = createStore('bledsteam', 'plants')
const listKey = 'list'
const textKey = (id: string) => `plant/${id}`

/** The plants kept, newest first. */
export async function keptPlants(): Promise<readonly KeptPlant[]> {
  const list: unknown = await get(listKey, store)
  return Array.isArray(list) ? (list as KeptPlant[]) : []
}

/** The text of a plant file kept, if it is there. */
export async function readKept(id: string): Promise<string | undefined> {
  const text: unknown = await get(textKey(id), store)
  return typeof text === 'string' ? text : undefined
}

/** Keeps a plant's text under its id; list and text change together or not at all. */
export async function keepPlant(plant: KeptPlant, text: string): Promise<void> {
  await store('readwrite', async (plants) => {
    const list: unknown = await promisifyRequest(plants.get(listKey))
    const others = (Array.isArray(list) ? (list as KeptPlant[]) : []).filter(
      ({ id }) => id !== plant.id,
    )
    const kept = [plant, ...others].sort((a, b) => b.at - a.at)
    for (const { id } of kept.slice(most)) plants.delete(textKey(id))
    plants.put(text, textKey(plant.id))
    await promisifyRequest(plants.put(kept.slice(0, most), listKey))
  })
}

/** Puts a text that cannot be read aside, so that a later version may still read it. */
export async function putAside(id: string, text: string): Promise<void> {
  await set(`aside/${id}`, text, store)
  await del(textKey(id), store)
  await set(
    listKey,
    (await keptPlants()).filter((one) => one.id !== id),
    store,
  )
}

/** A last word of a window that closes before the database has answered. */
interface LastWord {
  readonly plant: KeptPlant
  readonly text: string
}

const lastWordKey = 'bledsteam/last-word'

/** Writes at once, for the moment in which the window closes. */
export function leaveLastWord(plant: KeptPlant, text: string): void {
  try {
    localStorage.setItem(lastWordKey, JSON.stringify({ plant, text } satisfies LastWord))
  } catch {
    // Too large or forbidden: the database's own write, begun earlier, has to do.
  }
}

export function withdrawLastWord(): void {
  try {
    localStorage.removeItem(lastWordKey)
  } catch {
    // Nothing was kept there either.
  }
}

/** Takes over what a closing window left, where it is newer than what the database has. */
export async function takeLastWord(): Promise<void> {
  let word: LastWord | null = null
  try {
    word = JSON.parse(localStorage.getItem(lastWordKey) ?? 'null') as LastWord | null
  } catch {
    word = null
  }
  if (!word?.plant?.id || typeof word.text !== 'string') return
  const kept = (await keptPlants()).find(({ id }) => id === word.plant.id)
  if (!kept || kept.at < word.plant.at) await keepPlant(word.plant, word.text)
  withdrawLastWord()
}
