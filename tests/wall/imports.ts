// Every way one file names another, found in its syntax tree: import, export from, import(), import types, import = require,
// require, new URL(…, import.meta.url), triple-slash references; query forms such as `?worker&url` name the file before the question mark.
import { parseSync } from 'oxc-parser'

export interface Reference {
  /** As written, query included; undefined when it is computed and cannot be judged. */
  readonly specifier: string | undefined
  readonly line: number
  /** Gone at run time: `import type`, `export type`, import types, every name marked `type`. */
  readonly typeOnly: boolean
  /** Begins a thread or a file of its own: `?worker`, `?url`, new URL. Its code does not run in this thread. */
  readonly apart: boolean
}

export interface ParsedFile {
  readonly references: readonly Reference[]
  readonly errors: readonly string[]
  readonly defaultExportLine: number | undefined
  /** Line of an `export * from`. */
  readonly exportAllLine: number | undefined
  /** Nothing but re-exports, and at least one. */
  readonly barrel: boolean
}

interface Node {
  readonly type: string
  readonly start: number
  readonly [key: string]: unknown
}

/** `source` read as the file `name`, whose ending tells TypeScript from TSX. */
export function parseFile(name: string, source: string): ParsedFile {
  const parsed = parseSync(name, source)
  const lineOf = (offset: number) => source.slice(0, offset).split('\n').length
  const references: Reference[] = []
  walk(parsed.program as unknown as Node, (node) => {
    for (const found of referencesOf(node)) references.push({ ...found, line: lineOf(node.start) })
  })
  for (const comment of parsed.comments) {
    const match = comment.type === 'Line' ? /^\/\s*<reference\s+(path|types)="([^"]+)"/.exec(comment.value) : null
    if (match) {
      const specifier = match[1] === 'path' && !match[2]?.startsWith('.') ? `./${match[2]}` : match[2]
      references.push({ specifier, line: lineOf(comment.start), typeOnly: true, apart: false })
    }
  }
  const body = parsed.program.body as unknown as readonly Node[]
  const lineOfFirst = (type: string) => {
    const node = body.find((n) => n.type === type)
    return node && lineOf(node.start)
  }
  return {
    references,
    errors: parsed.errors.map((e) => e.message),
    defaultExportLine: lineOfFirst('ExportDefaultDeclaration') ?? defaultByName(body, lineOf),
    exportAllLine: lineOfFirst('ExportAllDeclaration'),
    barrel: body.length > 0 && body.every(isReExport),
  }
}

function referencesOf(node: Node): Omit<Reference, 'line'>[] {
  switch (node.type) {
    case 'ImportDeclaration':
      return [named(node.source, node.importKind === 'type' || allTypes(node.specifiers))]
    case 'ExportAllDeclaration':
      return [named(node.source, node.exportKind === 'type')]
    case 'ExportNamedDeclaration':
      return node.source ? [named(node.source, node.exportKind === 'type' || allTypes(node.specifiers))] : []
    case 'ImportExpression':
      return [named(node.source, false)]
    case 'TSImportType':
      return [named(node.source, true)]
    case 'TSExternalModuleReference':
      return [named(node.expression, false)]
    case 'CallExpression':
      return callReferences(node)
    case 'NewExpression': {
      const [first, second] = node.arguments as readonly Node[]
      const isUrl = isIdentifier(node.callee, 'URL') && isImportMeta(second, 'url')
      return isUrl ? [{ ...named(first, false), apart: true }] : []
    }
    default:
      return []
  }
}

function callReferences(node: Node): Omit<Reference, 'line'>[] {
  const [first] = node.arguments as readonly Node[]
  if (isIdentifier(node.callee, 'require')) return [named(first, false)]
  // A glob names files by pattern: which ones cannot be judged here.
  if (isImportMeta(node.callee as Node, 'glob')) return [{ specifier: undefined, typeOnly: false, apart: false }]
  return []
}

function named(source: unknown, typeOnly: boolean): Omit<Reference, 'line'> {
  const node = source as Node | undefined
  const specifier = node?.type === 'Literal' && typeof node.value === 'string' ? node.value : undefined
  return { specifier, typeOnly, apart: specifier !== undefined && /\?(.*&)?(worker|sharedworker|url)\b/.test(specifier) }
}

/** Every name of `import { type A, type B }` is a type; `import './x.ts'` has no names and runs. */
function allTypes(specifiers: unknown): boolean {
  const list = specifiers as readonly { importKind?: string; exportKind?: string }[]
  return list.length > 0 && list.every((s) => (s.importKind ?? s.exportKind) === 'type')
}

function isReExport(node: Node): boolean {
  return node.type === 'ExportAllDeclaration' || (node.type === 'ExportNamedDeclaration' && node.source !== null)
}

/** `export { x as default }`, with or without a source. */
function defaultByName(body: readonly Node[], lineOf: (offset: number) => number): number | undefined {
  const node = body.find((n) => {
    const specifiers = n.type === 'ExportNamedDeclaration' ? (n.specifiers as readonly { exported: { name?: string } }[]) : []
    return specifiers.some((s) => s.exported.name === 'default')
  })
  return node && lineOf(node.start)
}

function isIdentifier(node: unknown, name: string): boolean {
  const n = node as Node | undefined
  return n?.type === 'Identifier' && n.name === name
}

function isImportMeta(node: Node | undefined, property: string): boolean {
  return node?.type === 'MemberExpression' && (node.object as Node).type === 'MetaProperty' && isIdentifier(node.property, property)
}

function walk(value: unknown, visit: (node: Node) => void): void {
  if (Array.isArray(value)) {
    for (const item of value) walk(item, visit)
  } else if (value !== null && typeof value === 'object') {
    if (typeof (value as Node).type === 'string') visit(value as Node)
    for (const child of Object.values(value)) walk(child, visit)
  }
}
