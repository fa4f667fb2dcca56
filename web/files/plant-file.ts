import { type Plant, readPlant, writePlant } from '../../src/document.ts'
import { usePlantStore } from '../store/plant-store.ts'
import { useNoticeStore } from '../strip/notice-store.ts'
import { openAsNew } from './keeping.ts'

const extension = '.plant.json'

/** The file that this plant was last saved to: saving again writes there without asking. */
let target: { readonly handle: FileSystemFileHandle; readonly opened: number } | null = null

interface SavePicker {
  showSaveFilePicker?(options: {
    suggestedName: string
    types: readonly { description: string; accept: Record<string, readonly string[]> }[]
  }): Promise<FileSystemFileHandle>
}

/** 'Tarn Vale unit 2' to 'tarn-vale-unit-2.plant.json'. */
export function fileName(title: string): string {
  const stem = title
    .normalize('NFKD')
    .replace(/\p{M}/gu, '')
    .replace(/[^\p{L}\p{N}]+/gu, '-')
    .replace(/^-+|-+$/g, '')
    .toLowerCase()
  return `${stem || 'plant'}${extension}`
}

function say(severity: 'error' | 'remark', text: string): void {
  useNoticeStore.getState().say({ id: 'file', severity, text })
}

/** Opens a plant from a file's text. One that cannot be read says where, and the present plant stays. */
export async function openText(name: string, text: string): Promise<boolean> {
  const read = readPlant(text)
  if (read.outcome === 'unusable') {
    say('error', `${name} cannot be opened: ${read.message} The plant on screen stays as it is.`)
    return false
  }
  target = null
  await openAsNew(read.plant)
  if (read.repairs.length > 0) {
    say('remark', `${name} was opened and put right: ${repairsText(read.repairs)}`)
  } else useNoticeStore.getState().dismiss('file')
  return true
}

function repairsText(repairs: readonly { readonly message: string }[]): string {
  const shown = repairs.slice(0, 3).map(({ message }) => message)
  const more = repairs.length - shown.length
  return `${shown.join(' ')}${more > 0 ? ` And ${more} more.` : ''}`
}

export async function openFile(file: File): Promise<void> {
  try {
    await openText(file.name, await file.text())
  } catch {
    say('error', `${file.name} cannot be read from the disk. The plant on screen stays as it is.`)
  }
}

/** Lets the user choose a file to open. */
export function chooseFile(): void {
  const input = document.createElement('input')
  input.type = 'file'
  input.accept = '.json,application/json'
  input.hidden = true
  input.addEventListener('change', () => {
    const file = input.files?.[0]
    input.remove()
    if (file) void openFile(file)
  })
  input.addEventListener('cancel', () => input.remove())
  // In the document, or the browser may collect it while the user still looks for the file.
  document.body.append(input)
  input.click()
}

function download(name: string, text: string): void {
  const address = URL.createObjectURL(new Blob([text], { type: 'application/json' }))
  const link = document.createElement('a')
  link.href = address
  link.download = name
  link.click()
  setTimeout(() => URL.revokeObjectURL(address), 60_000)
}

async function writeTo(handle: FileSystemFileHandle, text: string): Promise<void> {
  const file = await handle.createWritable()
  await file.write(text)
  await file.close()
}

/** Saves the plant to a file: where the browser can, again to the same; else as a download. */
export async function saveFile(asNew = false): Promise<void> {
  const { plant, opened } = usePlantStore.getState()
  const text = writePlant(plant)
  const name = fileName(plant.title)
  const { showSaveFilePicker } = window as SavePicker
  if (!showSaveFilePicker) {
    download(name, text)
    return
  }
  try {
    const known = !asNew && target?.opened === opened ? target.handle : null
    const handle =
      known ??
      (await showSaveFilePicker.call(window, {
        suggestedName: name,
        types: [{ description: 'Plant', accept: { 'application/json': [extension, '.json'] } }],
      }))
    await writeTo(handle, text)
    target = { handle, opened }
    say('remark', `Saved to ${handle.name}.`)
  } catch (error) {
    if (error instanceof DOMException && error.name === 'AbortError') return
    target = null
    say(
      'error',
      `The file could not be written (${error instanceof Error ? error.message : 'refused'}). Save it under another name or in another place.`,
    )
  }
}

/** From now on a file dropped anywhere onto the window is opened. */
export function listenForDrops(): void {
  const carriesFile = (event: DragEvent) => event.dataTransfer?.types.includes('Files') ?? false
  window.addEventListener('dragover', (event) => {
    if (!carriesFile(event)) return
    event.preventDefault()
    if (event.dataTransfer) event.dataTransfer.dropEffect = 'copy'
  })
  window.addEventListener('drop', (event) => {
    if (!carriesFile(event)) return
    event.preventDefault()
    const file = event.dataTransfer?.files[0]
    if (file) void openFile(file)
  })
}

/** An example plant as the list of them has it. */
export interface Example {
  /** Name of the file in the folder of examples. */
  readonly file: string
  readonly title: string
  /** What it shows, one sentence. */
  readonly shows: string
}

const exampleFolder = 'examples/'
/** The plant that the window opens with at first use. */
const firstExample = 'tarn-vale-1.json'

async function readText(address: string): Promise<string> {
  const response = await fetch(address)
  if (!response.ok) throw new Error(`${address} cannot be had (${response.status}).`)
  return response.text()
}

/** The example plants, in the order in which they are offered. */
export async function readExamples(): Promise<readonly Example[]> {
  return JSON.parse(await readText(`${exampleFolder}index.json`))
}

export async function openExample({ file, title }: Example): Promise<void> {
  try {
    await openText(title, await readText(exampleFolder + file))
  } catch {
    say('error', `${title} cannot be read. Open the window once with a network; it is then kept.`)
  }
}

/** The plant that the window shows at first use, or null where it cannot be had. */
export async function readExample(): Promise<Plant | null> {
  try {
    const read = readPlant(await readText(exampleFolder + firstExample))
    return read.outcome === 'plant' ? read.plant : null
  } catch {
    return null
  }
}
