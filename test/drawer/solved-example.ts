import { readFileSync } from 'node:fs'
import { type Plant, readPlant } from '../../src/document.ts'
import { type AskedBalance, balanceOf, createEngine } from '../../src/engine.ts'
import type { BalanceMessage, NamesMessage } from '../../src/messages.ts'
import type { TableSource } from '../../web/drawer/tables/table.ts'

/** A plant file as the window gets it solved, and as the command line prints it. */
export function solvedExample(path: string): {
  readonly plant: Plant
  readonly source: TableSource & {
    readonly names: NamesMessage
    readonly balance: BalanceMessage
  }
  readonly asked: AskedBalance
} {
  const read = readPlant(readFileSync(new URL(`../../${path}`, import.meta.url), 'utf8'))
  if (read.outcome !== 'plant') throw new Error(read.message)
  const { plant } = read
  const layout = plant.layouts[0]
  if (!layout) throw new Error('No layout.')
  const answers = createEngine().answer({
    type: 'solve',
    sequence: 1,
    plant,
    layout: layout.id,
    case: null,
  })
  const names = answers.find((one) => one.type === 'names') as NamesMessage
  const balance = answers.find((one) => one.type === 'balance') as BalanceMessage
  return { plant, source: { layout, names, balance }, asked: balanceOf(layout) }
}
