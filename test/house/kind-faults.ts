import { literalString, walkSyntax } from './read-imports.ts'

/** Where a unit kind may be named: its physics and its drawing. */
const homes = ['src/units/', 'web/canvas/symbols/']

/**
 * Where code asks which unit kind it has in hand, instead of asking the kind for what it declares:
 * comparisons, switch cases and membership tests with a kind's name. Empty in a sound tree.
 *
 * @param files text by path from the root of the tree
 * @param names the names of the kinds
 */
export function kindFaults(files: ReadonlyMap<string, string>, names: readonly string[]): string[] {
  const faults: string[] = []
  for (const [file, text] of files) {
    if (!/^(src|web)\/.*\.tsx?$/.test(file) || homes.some((home) => file.startsWith(home))) continue
    const ask = (value: unknown): void => {
      const name = literalString(value)
      if (name !== undefined && names.includes(name)) faults.push(`${file}: asks for '${name}'`)
    }
    walkSyntax(file, text, (node) => {
      if (node.type === 'BinaryExpression' && /^[!=]==?$/.test(String(node.operator))) {
        ask(node.left)
        ask(node.right)
      } else if (node.type === 'SwitchCase') {
        ask(node.test)
      } else if (node.type === 'CallExpression') {
        const callee = node.callee as {
          property?: { name?: string }
          object?: { type: string; elements?: unknown[] }
        }
        const { property, object } = callee
        if (
          /^(includes|indexOf)$/.test(property?.name ?? '') &&
          object?.type === 'ArrayExpression'
        ) {
          object.elements?.forEach(ask)
        }
      }
    })
  }
  return faults
}
