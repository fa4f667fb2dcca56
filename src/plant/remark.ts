/** Something worth telling that stops nothing. It has the shape of a finding. */
export interface Remark {
  readonly severity: 'remark'
  readonly code: string
  /** Ids of units, streams and shafts. */
  readonly where: readonly string[]
  readonly quantities: readonly string[]
  readonly message: string
}

/** Notes a repair: what was missing at a place, and what stands there now. */
export type NoteRepair = (place: string, what: string, where?: readonly string[]) => void
