// The rules that hold between files. A tree goes in, what breaks a rule comes out; reading the tree from a disk is readTree.ts.
import { builtinModules } from 'node:module'
import path from 'node:path'
import { type ParsedFile, parseFile, type Reference } from './imports.ts'
import { CLOSURES, type Closure, LAYERS, type Layer } from './layers.ts'

export interface Tree {
  /** TypeScript and JavaScript by path from the top of the project, '/' between folders. */
  readonly sources: ReadonlyMap<string, string>
  /** Every other file that may be named: styles, JSON. */
  readonly others: ReadonlySet<string>
}

export type Rule =
  | 'syntax'
  | 'folder'
  | 'direction'
  | 'package'
  | 'node'
  | 'missing'
  | 'computed'
  | 'defaultExport'
  | 'barrel'
  | 'closure'
  | 'cycle'

export interface Violation {
  readonly rule: Rule
  readonly file: string
  readonly line: number
  readonly message: string
}

/** Everything in `tree` that breaks a rule, in the order of its files. */
export function violations(tree: Tree): Violation[] {
  const files = new Map([...tree.sources].map(([file, source]) => [file, parseFile(file, source)]))
  const found = [...files].flatMap(([file, parsed]) => fileViolations(tree, file, parsed))
  const graph = runtimeGraph(files)
  for (const closure of CLOSURES) found.push(...closureViolations(closure, files, graph))
  found.push(...cycleViolations(graph))
  return found
}

export function describe(v: Violation): string {
  return `${v.file}:${v.line} ${v.rule}: ${v.message}`
}

function fileViolations(tree: Tree, file: string, parsed: ParsedFile): Violation[] {
  const layer = layerOf(file)
  if (!layer) return [{ rule: 'folder', file, line: 1, message: 'lies in no folder of the table' }]
  const found: Violation[] = []
  const add = (rule: Rule, line: number, message: string) => found.push({ rule, file, line, message })
  for (const error of parsed.errors) add('syntax', 1, error)
  if (parsed.defaultExportLine) add('defaultExport', parsed.defaultExportLine, 'names are exported by name')
  if (!layer.barrel) {
    if (parsed.exportAllLine) add('barrel', parsed.exportAllLine, 'export * hides where a name comes from')
    if (parsed.barrel) add('barrel', 1, 'a file of nothing but re-exports')
  }
  for (const reference of parsed.references) {
    const problem = referenceProblem(tree, file, layer, reference)
    if (problem) add(problem.rule, reference.line, problem.message)
  }
  return found
}

function referenceProblem(tree: Tree, file: string, layer: Layer, reference: Reference): { rule: Rule; message: string } | undefined {
  const { specifier } = reference
  if (specifier === undefined) return { rule: 'computed', message: 'a computed import cannot be judged' }
  if (!specifier.startsWith('.')) return packageProblem(layer, specifier)
  const target = targetOf(file, specifier)
  if (!tree.sources.has(target) && !tree.others.has(target))
    return { rule: 'missing', message: `${specifier} is no file (endings are written out)` }
  const to = layerOf(target)?.folder ?? target
  if (to === layer.folder || layer.may.includes(to) || layer.may.includes(target)) return undefined
  const typed = layer.types?.some((entry) => isWithin(target, entry)) ?? false
  if (typed && reference.typeOnly) return undefined
  return { rule: 'direction', message: `${layer.folder} may not import ${to}${typed ? ' but for its types' : ''} (${specifier})` }
}

function packageProblem(layer: Layer, specifier: string): { rule: Rule; message: string } | undefined {
  if (specifier.startsWith('node:') || builtinModules.includes(specifier)) {
    return layer.node ? undefined : { rule: 'node', message: `${layer.folder} runs without Node (${specifier})` }
  }
  if (layer.packages?.some((name) => isWithin(specifier, name))) return undefined
  return { rule: 'package', message: `${layer.folder} may not use ${specifier}` }
}

/** What runs when a file runs: imports in its own thread that are more than types. */
type Graph = ReadonlyMap<string, readonly string[]>

function runtimeGraph(files: ReadonlyMap<string, ParsedFile>): Graph {
  const runs = (r: Reference) => !r.typeOnly && !r.apart && r.specifier?.startsWith('.')
  return new Map(
    [...files].map(([file, parsed]) => [
      file,
      parsed.references
        .filter(runs)
        .map((r) => targetOf(file, r.specifier as string))
        .filter((target) => files.has(target)),
    ]),
  )
}

function closureViolations(closure: Closure, files: ReadonlyMap<string, ParsedFile>, graph: Graph): Violation[] {
  const found: Violation[] = []
  for (const entry of [...files.keys()].filter((file) => closure.entry.test(file))) {
    const seen = new Set([entry])
    for (const file of seen) {
      for (const next of graph.get(file) ?? []) {
        if (closure.within.some((folder) => isWithin(next, folder))) seen.add(next)
        else found.push({ rule: 'closure', file, line: 1, message: `${entry} would load ${next}` })
      }
      for (const { specifier, typeOnly } of files.get(file)?.references ?? []) {
        if (typeOnly || specifier === undefined || specifier.startsWith('.')) continue
        if (!closure.packages.some((name) => isWithin(specifier, name))) {
          found.push({ rule: 'closure', file, line: 1, message: `${entry} would load the package ${specifier}` })
        }
      }
    }
  }
  return found
}

/** Files that load each other in a ring; each ring is told once, from its first file. */
function cycleViolations(graph: Graph): Violation[] {
  const done = new Set<string>()
  const found: Violation[] = []
  const visit = (file: string, trail: readonly string[]) => {
    const at = trail.indexOf(file)
    if (at >= 0) {
      found.push({ rule: 'cycle', file, line: 1, message: [...trail.slice(at), file].join(' → ') })
    } else if (!done.has(file)) {
      for (const next of graph.get(file) ?? []) visit(next, [...trail, file])
      done.add(file)
    }
  }
  for (const file of graph.keys()) visit(file, [])
  return found
}

function layerOf(file: string): Layer | undefined {
  return LAYERS.filter((layer) => isWithin(file, layer.folder)).sort((a, b) => b.folder.length - a.folder.length)[0]
}

function targetOf(file: string, specifier: string): string {
  return path.posix.normalize(path.posix.join(path.posix.dirname(file), specifier.split('?')[0] as string))
}

function isWithin(name: string, folder: string): boolean {
  return name === folder || name.startsWith(`${folder}/`)
}
