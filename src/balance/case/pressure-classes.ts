import type { System } from '../system.ts'

/** Sets of quantities that the equations hold at one pressure. */
export class PressureClasses {
  private readonly parent: Int32Array
  private readonly system: System

  constructor(system: System) {
    this.system = system
    this.parent = Int32Array.from({ length: system.variables.length }, (_, k) => k)
    for (const { equation } of system.equations) {
      const { left, right } = equation
      if (left.kind !== 'variable' || right.kind !== 'variable') continue
      if (system.variables[left.index]!.description.dimension !== 'pressure') continue
      if (system.variables[right.index]!.description.dimension !== 'pressure') continue
      this.join(left.index, right.index)
    }
  }

  private find(k: number): number {
    let root = k
    while (this.parent[root] !== root) root = this.parent[root]!
    this.parent[k] = root
    return root
  }

  private join(a: number, b: number): void {
    const rootA = this.find(a)
    const rootB = this.find(b)
    this.parent[Math.max(rootA, rootB)] = Math.min(rootA, rootB)
  }

  /** A number for the set that a quantity belongs to; -1 where there is no such quantity. */
  of(path: string): number {
    const index = this.system.indexOf.get(path)
    return index === undefined ? -1 : this.find(index)
  }

  /** Every given quantity of a set. */
  givensOf(members: ReadonlySet<number>): string[] {
    const { variables, given, curved } = this.system
    return variables
      .filter((_, index) => members.has(this.find(index)))
      .filter(({ path }) => {
        const index = this.system.indexOf.get(path)!
        return !Number.isNaN(given[index]!) || curved[index] === 1
      })
      .map(({ path }) => path)
  }
}
