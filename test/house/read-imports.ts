import { parseSync } from 'vite'

export interface Import {
  /** As written: './pump.ts', 'zod', 'node:fs'. A query such as `?worker` is left out. */
  readonly target: string
  /** Whether it is gone at run time: `import type`, `import { type ... }`, `import('...').T`. */
  readonly typeOnly: boolean
  /** Whether the target starts apart, in a worker, instead of being loaded into this file. */
  readonly apart: boolean
}

export interface Reading {
  readonly imports: readonly Import[]
  /** What keeps the file from being judged, in words. */
  readonly faults: readonly string[]
}

interface Node {
  readonly type: string
  readonly [key: string]: unknown
}

const isNode = (value: unknown): value is Node =>
  typeof value === 'object' && value !== null && typeof (value as Node).type === 'string'

/** Calls `visit` with each node of the syntax tree of a TypeScript file. Throws where it has none. */
export function walkSyntax(file: string, text: string, visit: (node: Node) => void): void {
  const { program, errors } = parseSync(file, text)
  if (errors.length > 0) throw new Error(`${file}: ${errors[0]?.message}`)
  const walk = (value: unknown): void => {
    if (Array.isArray(value)) value.forEach(walk)
    else if (isNode(value)) {
      visit(value)
      for (const key in value) walk(value[key])
    }
  }
  walk(program)
}

/** The string that an expression is, or undefined where it must be worked out. */
export function literalString(value: unknown): string | undefined {
  if (!isNode(value)) return undefined
  if (value.type === 'Literal' && typeof value.value === 'string') return value.value
  if (value.type !== 'TemplateLiteral') return undefined
  const quasis = value.quasis as readonly { value: { cooked: string } }[]
  return quasis.length === 1 ? quasis[0]?.value.cooked : undefined
}

/** `import.meta.name` */
function isMeta(value: unknown, name: string): boolean {
  if (!isNode(value) || value.type !== 'MemberExpression') return false
  const { object, property } = value as unknown as { object: Node; property: { name?: string } }
  return object.type === 'MetaProperty' && property.name === name
}

/** Everything that a TypeScript file brings in, in whatever form it says so. */
export function readImports(file: string, text: string): Reading {
  const imports: Import[] = []
  const faults: string[] = []

  const add = (source: unknown, typeOnly: boolean, apart = false): void => {
    const written = literalString(source)
    if (written === undefined) {
      faults.push(`${file}: imports something whose name is not written out`)
      return
    }
    const [target = '', query = ''] = written.split('?')
    imports.push({ target, typeOnly, apart: apart || /^(shared)?worker\b/.test(query) })
  }

  const onlyTypes = (kind: unknown, specifiers: unknown, key: string): boolean => {
    if (kind === 'type') return true
    const list = specifiers as readonly Node[]
    return list.length > 0 && list.every((specifier) => specifier[key] === 'type')
  }

  walkSyntax(file, text, (node) => {
    switch (node.type) {
      case 'ImportDeclaration':
        add(node.source, onlyTypes(node.importKind, node.specifiers, 'importKind'))
        break
      case 'ExportNamedDeclaration':
        if (node.source) {
          add(node.source, onlyTypes(node.exportKind, node.specifiers, 'exportKind'))
        }
        break
      case 'ExportAllDeclaration':
        add(node.source, node.exportKind === 'type')
        break
      case 'ImportExpression':
        add(node.source, false)
        break
      case 'TSImportType':
        add(node.source, true)
        break
      case 'TSExternalModuleReference':
        add(node.expression, false)
        break
      case 'NewExpression': {
        const [source, base] = node.arguments as readonly unknown[]
        const isAddress = isNode(node.callee) && node.callee.name === 'URL'
        if (isAddress && isMeta(base, 'url')) add(source, false, true)
        break
      }
      case 'CallExpression': {
        const { callee } = node
        const called = isNode(callee) && callee.type === 'Identifier' ? callee.name : undefined
        const [source] = node.arguments as readonly unknown[]
        if (called === 'require') add(source, false)
        if (isMeta(callee, 'glob')) {
          faults.push(`${file}: import.meta.glob hides what is imported; name the files`)
        }
        break
      }
    }
  })

  if (/^\s*\/\/\/\s*<reference\b/m.test(text)) {
    faults.push(`${file}: a reference comment lets in what tsconfig.json keeps out`)
  }
  return { imports, faults }
}
