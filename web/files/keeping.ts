import { emptyPlant, type Plant, readPlant, writePlant } from '../../src/document.ts'
import { usePlantStore } from '../store/plant-store.ts'
import { useNoticeStore } from '../strip/notice-store.ts'
import { setKeeping, useKeepingStore } from './keeping-store.ts'
import {
  type KeptPlant,
  keepPlant,
  keptPlants,
  leaveLastWord,
  putAside,
  readKept,
  takeLastWord,
  withdrawLastWord,
} from './kept-plants.ts'
import { createPlantLock } from './plant-lock.ts'

/** How long edits are gathered before the plant is written, ms. */
const gathering = 400
const elsewhereNotice = 'plant-elsewhere'
/** Which kept plant this window shows; a reload comes back to it. */
const sessionKey = 'bledsteam/plant'

const newId = () => crypto.randomUUID()

let id = ''
/** This window may write under `id`. */
let ours = false
let unwritten: Plant | null = null
/** On its way to the database, and lost if the page goes before it arrives. */
let beingWritten: Plant | null = null
let timer: ReturnType<typeof setTimeout> | undefined
/** Writes follow one another in order. */
let writing: Promise<void> = Promise.resolve()

const lock = createPlantLock(() => {
  // What was not yet written is left to the window that took over only if it was written before.
  ours = false
  setKeeping('elsewhere')
  sayElsewhere('This plant was taken over by another window. Changes made here are not saved.')
})

function stamp(plant: Plant): KeptPlant {
  return { id, title: plant.title, at: Date.now() }
}

async function write(): Promise<void> {
  clearTimeout(timer)
  timer = undefined
  const plant = unwritten
  if (!plant || !ours) return
  unwritten = null
  beingWritten = plant
  try {
    await keepPlant(stamp(plant), writePlant(plant))
    if (!unwritten) withdrawLastWord()
    if (ours && !unwritten) setKeeping('kept')
  } catch (error) {
    unwritten ??= plant
    setKeeping('failed')
    useNoticeStore.getState().say({
      id: 'keeping-failed',
      severity: 'caution',
      text: `This browser does not keep the plant (${error instanceof Error ? error.message : 'storage refused'}). Save it to a file before you close the window.`,
    })
  } finally {
    beingWritten = null
  }
}

/** Writes what is not yet written. */
export function flush(): Promise<void> {
  writing = writing.then(write)
  return writing
}

function changed(plant: Plant): void {
  unwritten = plant
  if (!ours) return
  setKeeping('writing')
  timer ??= setTimeout(flush, gathering)
}

function remember(): void {
  try {
    sessionStorage.setItem(sessionKey, id)
  } catch {
    // Without session storage a reload shows the newest plant, which this one most likely is.
  }
}

function sayElsewhere(text: string): void {
  useNoticeStore.getState().say({
    id: elsewhereNotice,
    severity: 'caution',
    text,
    lasting: true,
    actions: [
      { name: 'Work on a copy', run: () => void workOnCopy() },
      { name: 'Edit it here', run: () => void editHere() },
    ],
  })
}

/** From now on this window keeps its plant under another id. */
async function startAfresh(plant: Plant): Promise<void> {
  id = newId()
  remember()
  ours = await lock.take(id)
  useNoticeStore.getState().dismiss(elsewhereNotice)
  changed(plant)
  await flush()
}

async function workOnCopy(): Promise<void> {
  const { plant, edit } = usePlantStore.getState()
  edit('Copy of the plant', (present) => ({ ...present, title: `${plant.title} (copy)` }))
  await startAfresh(usePlantStore.getState().plant)
}

/**
 * Takes the plant over from the other window. Where nothing was changed here, what the other window
 * wrote is shown; changes made here would be lost by that, so they then go on as they stand, and the
 * other's state stays among the kept plants.
 */
async function editHere(): Promise<void> {
  const mine = unwritten
  const theirs = await readKept(id)
  const read = theirs === undefined ? null : readPlant(theirs)
  await lock.seize(id)
  ours = true
  useNoticeStore.getState().dismiss(elsewhereNotice)
  if (mine) {
    if (theirs !== undefined && read) {
      const title = `${read.outcome === 'plant' ? read.plant.title : mine.title} (other window)`
      await keepPlant({ id: newId(), title, at: Date.now() - 1 }, theirs)
    }
    changed(mine)
    await flush()
    return
  }
  if (read?.outcome === 'plant') show(read.plant)
  setKeeping('kept')
}

/** Opens a plant without counting it as changed. */
function show(plant: Plant): void {
  showing = true
  usePlantStore.getState().open(plant)
  showing = false
}
let showing = false

/** Shows a plant from a file, an example or the command 'New': the one before stays kept as it is. */
export async function openAsNew(plant: Plant): Promise<void> {
  await flush()
  show(plant)
  await startAfresh(plant)
}

/** Shows a plant kept in this browser; false where it is no longer there or cannot be read. */
export async function openKept(wanted: string): Promise<boolean> {
  await flush()
  const text = await readKept(wanted)
  if (text === undefined) return false
  const read = readPlant(text)
  if (read.outcome === 'unusable') {
    await putAside(wanted, text)
    useNoticeStore.getState().say({
      id: 'kept-unusable',
      severity: 'error',
      text: `The plant kept in this browser cannot be read: ${read.message} It was put aside.`,
    })
    return false
  }
  id = wanted
  remember()
  unwritten = null
  ours = await lock.take(id)
  show(read.plant)
  useNoticeStore.getState().dismiss(elsewhereNotice)
  setKeeping(ours ? 'kept' : 'elsewhere')
  if (!ours) {
    sayElsewhere('This plant is open in another window. Changes made here are not saved.')
  }
  return true
}

/** The plant that the window had before it was reloaded, or else the newest kept. */
async function lastPlant(): Promise<boolean> {
  await takeLastWord()
  const list = await keptPlants()
  let wanted: string | null = null
  try {
    wanted = sessionStorage.getItem(sessionKey)
  } catch {
    wanted = null
  }
  const ids = list.map((one) => one.id)
  for (const one of wanted && ids.includes(wanted) ? [wanted, ...ids] : ids) {
    if (await openKept(one)) return true
  }
  return false
}

/** Shows the last plant, or at first use what `example` brings, and keeps what is edited from then on. */
export async function startKeeping(example: () => Promise<Plant | null>): Promise<void> {
  let found = false
  try {
    found = await lastPlant()
  } catch {
    setKeeping('failed')
  }
  if (!found) {
    const plant = (await example()) ?? emptyPlant()
    show(plant)
    await startAfresh(plant)
  }
  usePlantStore.subscribe((now, then) => {
    if (now.plant !== then.plant && !showing) changed(now.plant)
  })
  const leave = () => {
    const plant = unwritten ?? beingWritten
    if (!plant || !ours) return
    leaveLastWord(stamp(plant), writePlant(plant))
    void flush()
  }
  document.addEventListener('visibilitychange', () => {
    if (document.visibilityState === 'hidden') leave()
  })
  window.addEventListener('pagehide', leave)
  window.addEventListener('beforeunload', (event) => {
    const { state } = useKeepingStore.getState()
    if (unwritten && (state === 'elsewhere' || state === 'failed')) event.preventDefault()
  })
}
