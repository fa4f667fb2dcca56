import type { Layout } from '../../src/document.ts'

/** One end of a stream: `h5.drain2` is port `drain2` of unit `h5`. */
export interface End {
  readonly unit: string
  readonly port: string
}

export function endOf(reference: string): End {
  const dot = reference.indexOf('.')
  return { unit: reference.slice(0, dot), port: reference.slice(dot + 1) }
}

/** Both ends of each stream, by its id. */
export type Ends = ReadonlyMap<string, { readonly from: End; readonly to: End }>

export function endsOf(layout: Layout): Ends {
  return new Map(
    layout.streams.map(({ id, from, to }) => [id, { from: endOf(from), to: endOf(to) }]),
  )
}
