import {
  type Application,
  type Expression,
  type Operation,
  Outcome,
  type Rows,
} from './operation.ts'

/**
 * Expressions lowered into rows of typed arrays. A slot holds one number: first the variables, then
 * constants and rows as they came. Row r applies `operations[r]` to the slots
 * `operands[first[r]] .. operands[first[r + 1] - 1]`, writes `values[slotOf(r)]` and, in parallel
 * with the operands, the partials. Evaluating allocates nothing.
 */
export class Tape implements Rows {
  readonly values: Float64Array
  readonly operations: readonly Operation[]
  readonly first: Int32Array
  readonly operands: Int32Array
  readonly partials: Float64Array
  readonly slots: Int32Array
  readonly memory: Float64Array
  readonly memoryAt: Int32Array
  /** How many of the slots are variables. */
  readonly variableCount: number
  /** The row whose evaluation was refused last. */
  failedRow = -1
  /** Rows evaluated so far, and what else costs as much: a measure of time that is always the same. */
  work = 0

  constructor(parts: {
    values: readonly number[]
    operations: readonly Operation[]
    first: readonly number[]
    operands: readonly number[]
    slots: readonly number[]
    memoryAt: readonly number[]
    memorySize: number
    variableCount: number
  }) {
    this.variableCount = parts.variableCount
    this.values = Float64Array.from(parts.values)
    this.operations = parts.operations
    this.first = Int32Array.from(parts.first)
    this.operands = Int32Array.from(parts.operands)
    this.partials = new Float64Array(parts.operands.length)
    this.slots = Int32Array.from(parts.slots)
    this.memory = new Float64Array(parts.memorySize)
    this.memoryAt = Int32Array.from(parts.memoryAt)
  }

  slotOf(row: number): number {
    return this.slots[row]!
  }

  /** Evaluates rows in order; returns the first outcome that is not fine. */
  evaluate(rows: Int32Array): number {
    const { operations } = this
    this.work += rows.length
    for (let k = 0; k < rows.length; k++) {
      const row = rows[k]!
      const outcome = operations[row]!.evaluate(this, row)
      if (outcome !== Outcome.fine) {
        this.failedRow = row
        return outcome
      }
    }
    return Outcome.fine
  }
}

/** Hands a value on, to a variable that is assigned and not iterated. */
const copyOperation: Operation = {
  name: 'copy',
  evaluate(tape, row) {
    const k = tape.first[row]!
    tape.values[tape.slotOf(row)] = tape.values[tape.operands[k]!]!
    tape.partials[k] = 1
    return Outcome.fine
  },
  degree: ([degree]) => degree!,
  print: ([operand]) => operand!,
}

/** Lowers expressions into a tape; what is shared by identity becomes one row. */
export class TapeBuilder {
  readonly variableCount: number
  private readonly values: number[]
  private readonly operations: Operation[] = []
  private readonly first: number[] = [0]
  private readonly operands: number[] = []
  private readonly slots: number[] = []
  private readonly memoryAt: number[] = []
  /** By row: the row whose working memory it reads, or -1. */
  private readonly sources: number[] = []
  private memorySize = 0
  private slotOfExpression = new Map<Expression, number>()
  private readonly constants = new Map<number, number>()
  /** Rows of operations that others read, by operation and operands. */
  private shared = new Map<Operation, Map<number, number>>()
  /** By slot: the degree in the variables that the caller calls active. */
  private readonly degrees: number[]
  private readonly rowOfSlot: number[]
  /** By row: the walk that met it last. */
  private rowMarks = new Int32Array(0)
  private mark = 0

  constructor(variableCount: number) {
    this.variableCount = variableCount
    this.values = new Array(variableCount).fill(0)
    this.degrees = new Array(variableCount).fill(0)
    this.rowOfSlot = new Array(variableCount).fill(-1)
  }

  /** From now on these variables count as active (degree 1); earlier rows keep their degree 0. */
  activate(variables: readonly number[]): void {
    for (const index of variables) this.degrees[index] = 1
  }

  /** Ends the activity of variables and of all rows from `row` on. */
  deactivate(variables: readonly number[], row: number): void {
    for (const index of variables) this.degrees[index] = 0
    for (let r = row; r < this.slots.length; r++) this.degrees[this.slots[r]!] = 0
  }

  get rowCount(): number {
    return this.operations.length
  }

  degreeOf(slot: number): number {
    return this.degrees[slot]!
  }

  /** The row that computes a slot, or -1 for a variable or constant. */
  rowOf(slot: number): number {
    return this.rowOfSlot[slot]!
  }

  slotOfRow(row: number): number {
    return this.slots[row]!
  }

  operandsOf(row: number): readonly number[] {
    return this.operands.slice(this.first[row]!, this.first[row + 1]!)
  }

  firstOperand(row: number): number {
    return this.first[row]!
  }

  /** Lowers with rows of its own: nothing is shared with what was lowered before or comes after. */
  apart<T>(lowering: () => T): T {
    const { slotOfExpression, shared } = this
    this.slotOfExpression = new Map()
    this.shared = new Map()
    try {
      return lowering()
    } finally {
      this.slotOfExpression = slotOfExpression
      this.shared = shared
    }
  }

  /** Appends a row that gives a variable the value of a slot; returns the row. */
  assign(variable: number, source: number): number {
    const row = this.operations.length
    this.operations.push(copyOperation)
    this.operands.push(source)
    this.first.push(this.operands.length)
    this.slots.push(variable)
    this.sources.push(-1)
    this.memoryAt.push(this.memorySize)
    this.degrees[variable] = this.degrees[source]!
    return row
  }

  /**
   * Every row that the slots need, in an order in which they can be evaluated. `assigned` names
   * the rows that give variables their values.
   */
  rowsBehind(slots: readonly number[], assigned?: ReadonlyMap<number, number>): Int32Array {
    if (this.rowMarks.length < this.slots.length) {
      this.rowMarks = new Int32Array(2 * this.slots.length)
      this.mark = 0
    }
    const { rowMarks, rowOfSlot, first, operands, sources } = this
    const mark = ++this.mark
    const rows: number[] = []
    const stack = [...slots]
    while (stack.length > 0) {
      const slot = stack.pop()!
      const row = assigned?.get(slot) ?? rowOfSlot[slot]!
      if (row < 0 || rowMarks[row] === mark) continue
      rowMarks[row] = mark
      rows.push(row)
      for (let k = first[row]!; k < first[row + 1]!; k++) stack.push(operands[k]!)
      // Working memory is filled before it is read.
      const source = sources[row]!
      if (source >= 0 && rowMarks[source] !== mark) {
        rowMarks[source] = mark
        rows.push(source)
      }
    }
    return Int32Array.from(rows).sort()
  }

  /** The slot that will hold the expression's value. */
  lower(expression: Expression): number {
    if (expression.kind === 'variable') return expression.index
    if (expression.kind === 'constant') return this.lowerConstant(expression.value)
    const known = this.slotOfExpression.get(expression)
    if (known !== undefined) return known
    const operandSlots: number[] = []
    for (const operand of expression.operands) operandSlots.push(this.lower(operand))
    const slot = this.append(expression, operandSlots)
    this.slotOfExpression.set(expression, slot)
    return slot
  }

  private lowerConstant(value: number): number {
    const known = this.constants.get(value)
    if (known !== undefined) return known
    const slot = this.newSlot(value, -1)
    this.constants.set(value, slot)
    return slot
  }

  private append(expression: Application, operandSlots: readonly number[]): number {
    const { operation } = expression
    const source = operation.reads
    return this.appendRow(
      operation,
      operandSlots,
      source === undefined ? -1 : this.sharedRow(source, operandSlots),
    )
  }

  private sharedRow(operation: Operation, operandSlots: readonly number[]): number {
    const key = operandSlots[0]! * 0x4000000 + (operandSlots[1] ?? 0)
    let rows = this.shared.get(operation)
    if (rows === undefined) {
      rows = new Map()
      this.shared.set(operation, rows)
    }
    let row = rows.get(key)
    if (row === undefined) {
      row = this.operations.length
      this.appendRow(operation, operandSlots, -1)
      rows.set(key, row)
    }
    return row
  }

  private appendRow(operation: Operation, operandSlots: readonly number[], source: number): number {
    const row = this.operations.length
    this.operations.push(operation)
    let highest = 0
    for (const operand of operandSlots) {
      this.operands.push(operand)
      if (this.degrees[operand]! > highest) highest = this.degrees[operand]!
    }
    this.first.push(this.operands.length)
    const slot = this.newSlot(0, row)
    this.slots.push(slot)
    this.sources.push(source)
    if (source >= 0) this.memoryAt.push(this.memoryAt[source]!)
    else {
      this.memoryAt.push(this.memorySize)
      this.memorySize += operation.memory ?? 0
    }
    if (highest > 0) {
      this.degrees[slot] =
        operation.degree?.(operandSlots.map((operand) => this.degrees[operand]!)) ?? 2
    }
    return slot
  }

  private newSlot(value: number, row: number): number {
    const slot = this.values.length
    this.values.push(value)
    this.degrees.push(0)
    this.rowOfSlot.push(row)
    return slot
  }

  finish(): Tape {
    return new Tape({
      values: this.values,
      operations: this.operations,
      first: this.first,
      operands: this.operands,
      slots: this.slots,
      memoryAt: this.memoryAt,
      memorySize: this.memorySize,
      variableCount: this.variableCount,
    })
  }
}
