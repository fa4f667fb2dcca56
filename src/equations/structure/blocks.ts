import type { Incidence, Matching } from './matching.ts'

/**
 * The strongly connected blocks of a square system in solving order (R. E. Tarjan, SIAM J. Comput.
 * 1, 1972, 146-160): each block needs only columns of earlier blocks and its own. `member` tells
 * which rows take part; their columns are the matched ones. Without recursion; rows of a block
 * keep their order.
 */
export function blocksInOrder(
  graph: Incidence,
  matching: Matching,
  member: (row: number) => boolean,
): number[][] {
  const { rows, first, columns } = graph
  const index = new Int32Array(rows).fill(-1)
  const low = new Int32Array(rows)
  const onStack = new Uint8Array(rows)
  const next = new Int32Array(rows)
  const stack: number[] = []
  const call: number[] = []
  const blocks: number[][] = []
  let counter = 0
  for (let start = 0; start < rows; start++) {
    if (index[start]! >= 0 || !member(start)) continue
    call.push(start)
    index[start] = low[start] = counter++
    next[start] = first[start]!
    stack.push(start)
    onStack[start] = 1
    while (call.length > 0) {
      const r = call[call.length - 1]!
      if (next[r]! < first[r + 1]!) {
        const other = matching.rowOfColumn[columns[next[r]!++]!]!
        if (other < 0 || other === r || !member(other)) continue
        if (index[other]! < 0) {
          index[other] = low[other] = counter++
          next[other] = first[other]!
          stack.push(other)
          onStack[other] = 1
          call.push(other)
        } else if (onStack[other] && index[other]! < low[r]!) low[r] = index[other]!
        continue
      }
      call.pop()
      const parent = call[call.length - 1]
      if (parent !== undefined && low[r]! < low[parent]!) low[parent] = low[r]!
      if (low[r] === index[r]) {
        const block: number[] = []
        for (;;) {
          const member = stack.pop()!
          onStack[member] = 0
          block.push(member)
          if (member === r) break
        }
        blocks.push(block.sort((a, b) => a - b))
      }
    }
  }
  return blocks
}
