/** Reads steam-states.bin, the states that steam-states.py wrote by an independent implementation. */
import { readFileSync } from 'node:fs'

const PRESSURE_STEP = 0.025
const FINE_STEP = 1e-6
const PART_STEP = 1e-9

/** Blocks in the order of the file: records, the steps of the inputs, the bytes of the outputs. */
const layout = {
  region1: { count: 14000, inputs: [PRESSURE_STEP, FINE_STEP], outputs: [6, 6, 6, 5, 5] },
  region2: { count: 16000, inputs: [PRESSURE_STEP, FINE_STEP], outputs: [6, 6, 6, 5, 5] },
  region5: { count: 4000, inputs: [PRESSURE_STEP, FINE_STEP], outputs: [6, 6, 6, 5, 5] },
  region3: { count: 10000, inputs: [FINE_STEP, FINE_STEP], outputs: [6, 6, 6, 5, 5] },
  wet: { count: 6500, inputs: [PRESSURE_STEP, PART_STEP], outputs: [6, 6, 6, 6] },
  denseSaturation: { count: 300, inputs: [PRESSURE_STEP], outputs: [6, 6, 6] },
  scientific: { count: 1500, inputs: [PRESSURE_STEP, FINE_STEP], outputs: [6, 6, 6, 5, 5] },
} as const

/**
 * Regions 1, 2, 5 and scientific (IAPWS-95): p, T, then h, s, v, cp, w. Region 3: rho, T, then p, h, s,
 * cp, w. Wet: p, x, then T, h, s, v. Dense saturation: p, then T, v', v''. SI units.
 */
export type Block = keyof typeof layout

const file = readFileSync(new URL('./steam-states.bin', import.meta.url))
const bits = new DataView(new ArrayBuffer(8))

function double(at: number, size: number): number {
  bits.setBigUint64(0, 0n)
  // leading bytes of a little-endian double
  for (let i = 0; i < size; i++) bits.setUint8(8 - size + i, file[at + i] as number)
  return bits.getFloat64(0, true)
}

/** The records of a block: inputs and outputs of each, in the order of `Block`. */
export function referenceStates(block: Block): number[][] {
  let at = 0
  for (const [name, { count, inputs, outputs }] of Object.entries(layout)) {
    const size = 4 * inputs.length + outputs.reduce((sum: number, bytes) => sum + bytes, 0)
    if (name !== block) {
      at += count * size
      continue
    }
    const records: number[][] = []
    for (let i = 0; i < count; i++) {
      const record: number[] = []
      for (const step of inputs) {
        record.push(file.readUInt32LE(at) * step)
        at += 4
      }
      for (const bytes of outputs) {
        record.push(double(at, bytes))
        at += bytes
      }
      records.push(record)
    }
    return records
  }
  return []
}
