/** A handbook example, or a part of one, that needs kinds of units which are not built yet. */
export interface Waiting {
  readonly id: string
  readonly kinds: readonly string[]
  /** The answers that wait; absent: all. */
  readonly answers?: readonly string[]
}

export const waiting: readonly Waiting[] = [
  { id: 'MS-8.6', kinds: ['surfaceHeater'] },
  { id: 'CB-10-6', kinds: ['surfaceHeater'] },
  {
    id: 'CB-10-8',
    kinds: ['heatUser'],
    answers: ['h5', 'h7', 'a_Q_process_kW', 'c_Q_process_MW', 'c_W_turb_kW', 'h10'],
  },
  { id: 'OS-8.8', kinds: ['surfaceHeater'] },
  { id: 'OS-8.9', kinds: ['surfaceHeater'] },
  { id: 'OS-8.11', kinds: ['surfaceHeater'] },
  { id: 'OS-8.12', kinds: ['surfaceHeater'] },
  { id: 'OS-8.15', kinds: ['separator', 'heatUser'] },
  { id: 'OS-8.18', kinds: ['surfaceHeater'] },
]
