import { posix } from 'node:path'
import { type Import, readImports } from './read-imports.ts'

/** The engine's layers, lowest first; each may import those below it. */
const layers = [
  ['src/equations'],
  ['src/steam'],
  ['src/units'],
  ['src/plant'],
  ['src/balance'],
  ['src/study', 'src/review'],
]

const document = 'src/document.ts'
const engine = 'src/engine.ts'
const messages = 'src/messages.ts'
const doors = [document, engine, messages]

/** All that the engine may import from a package. */
const enginePackages = ['zod', 'zod/mini']

const within = (file: string, folder: string): boolean => file.startsWith(`${folder}/`)
const isWindow = (file: string): boolean => within(file, 'web') && !within(file, 'web/worker')
const isCode = (file: string): boolean => /\.[cm]?tsx?$/.test(file)

interface Edge extends Import {
  /** The file meant, from the root of the tree; undefined for a package. */
  readonly file: string | undefined
}

/** Why `from` may not import `to`, or undefined where it may. Both are files of this tree. */
function forbidden(from: string, to: string, edge: Import): string | undefined {
  if (within(from, 'test')) return undefined
  if (within(from, 'web')) {
    if (within(to, 'web')) return undefined
    const open = isWindow(from) ? [document, messages] : doors
    return open.includes(to) ? undefined : `the window may import ${open.join(' and ')} only`
  }
  if (!within(from, 'src')) return undefined
  if (!within(to, 'src')) return 'the engine imports nothing outside src'

  if (within(from, 'src/cli')) {
    const open = within(to, 'src/cli') || within(to, 'src/quantity') || doors.includes(to)
    return open ? undefined : 'the command line imports the doors only'
  }
  if (within(to, 'src/cli')) return 'nothing imports the command line'
  if (within(from, 'src/quantity')) {
    return within(to, 'src/quantity') ? undefined : 'quantity imports nothing'
  }
  if (from === messages && !edge.typeOnly) return 'messages are types, and import types only'
  if (within(to, 'src/quantity')) return undefined

  const level = (file: string): number =>
    doors.includes(file)
      ? layers.length
      : layers.findIndex((folders) => folders.some((folder) => within(file, folder)))
  const [own, other] = [level(from), level(to)]
  if (other < 0) return `${to} belongs to no layer`
  if (from === document && other > level('src/plant/')) {
    return 'the window loads document.ts, so it may reach no further than plant'
  }
  if (other < own) return undefined
  if (own === layers.length) {
    return to === messages ? undefined : 'a door may import messages.ts, but no other door'
  }
  const folder = (file: string): string => file.split('/').slice(0, 2).join('/')
  if (folder(from) === folder(to)) return undefined
  return `imports run one way: ${folder(from)} is below or beside ${doors.includes(to) ? 'the doors' : folder(to)}`
}

/** Why `from` may not import the package, or undefined where it may. */
function forbiddenPackage(from: string, name: string): string | undefined {
  if (within(from, 'src/cli')) {
    return name.startsWith('node:') ? undefined : 'the command line imports Node and the doors only'
  }
  if (within(from, 'src')) {
    if (within(from, 'src/quantity')) return 'quantity imports nothing'
    if (name.startsWith('node:')) return 'only src/cli runs in Node alone'
    return enginePackages.includes(name) ? undefined : 'the engine runs without packages'
  }
  if (within(from, 'web') && name.startsWith('node:')) return 'a browser has no Node'
  return undefined
}

/** Ways along the edges from `start` to `goal`, the first one found. */
function way(
  edges: ReadonlyMap<string, readonly Edge[]>,
  start: string,
  goal: (file: string) => boolean,
  follow: (edge: Edge) => boolean,
): string[] | undefined {
  const before = new Map<string, string | undefined>([[start, undefined]])
  for (const file of before.keys()) {
    if (file !== start && goal(file)) {
      const steps: string[] = []
      for (let step: string | undefined = file; step; step = before.get(step)) steps.unshift(step)
      return steps
    }
    for (const edge of edges.get(file) ?? []) {
      if (edge.file && follow(edge) && !before.has(edge.file)) before.set(edge.file, file)
    }
  }
  return undefined
}

/** One way round each knot of files that import each other. */
function cycles(edges: ReadonlyMap<string, readonly Edge[]>): string[][] {
  const found: string[][] = []
  const done = new Set<string>()
  const path: string[] = []
  const visit = (file: string): void => {
    if (done.has(file)) return
    const at = path.indexOf(file)
    if (at >= 0) {
      found.push([...path.slice(at), file])
      return
    }
    path.push(file)
    for (const edge of edges.get(file) ?? []) if (edge.file && !edge.apart) visit(edge.file)
    path.pop()
    done.add(file)
  }
  for (const file of edges.keys()) visit(file)
  return found
}

/**
 * What breaks the rules of imports, in words; empty in a sound tree.
 *
 * @param files text by path from the root of the tree, with '/' between folders
 */
export function importFaults(files: ReadonlyMap<string, string>): string[] {
  const faults: string[] = []
  const edges = new Map<string, Edge[]>()

  for (const [file, text] of files) {
    const ours = within(file, 'src') || within(file, 'web')
    if (ours && /\.[cm]?jsx?$/.test(file)) faults.push(`${file}: is not TypeScript`)
    if (!isCode(file)) continue
    if (/^src\/[^/]+$/.test(file) && !doors.includes(file)) {
      faults.push(`${file}: belongs to no layer`)
    }
    const reading = readImports(file, text)
    faults.push(...reading.faults.filter(() => ours))
    const list: Edge[] = []
    edges.set(file, list)
    for (const edge of reading.imports) {
      const { target } = edge
      if (!/^[./]/.test(target)) {
        const why = forbiddenPackage(file, target)
        if (why) faults.push(`${file} -> ${target}: ${why}`)
        continue
      }
      const to = target.startsWith('/')
        ? target.slice(1)
        : posix.normalize(posix.join(posix.dirname(file), target))
      if (posix.extname(to) === '' && !edge.apart) {
        faults.push(`${file} -> ${target}: write the extension`)
      }
      const why = forbidden(file, to, edge)
      if (why) faults.push(`${file} -> ${to}: ${why}`)
      list.push({ ...edge, file: to })
    }
  }

  for (const file of edges.keys()) {
    if (!isWindow(file)) continue
    const steps = way(
      edges,
      file,
      (reached) => reached === engine,
      (edge) => !edge.apart,
    )
    if (steps) faults.push(`${steps.join(' -> ')}: the solver loads in the worker alone`)
  }
  const toNewton = way(
    edges,
    document,
    (reached) => within(reached, 'src/equations/newton'),
    (edge) => !edge.typeOnly,
  )
  if (toNewton) faults.push(`${toNewton.join(' -> ')}: the solver loads in the worker alone`)
  for (const steps of cycles(edges)) faults.push(`${steps.join(' -> ')}: imports run in a circle`)
  return faults
}
