import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { expect, describe as group, it } from 'vitest'
import { parseFile } from './imports.ts'
import { LAYERS } from './layers.ts'
import { readTree } from './readTree.ts'
import { describe, type Rule, type Tree, violations } from './wall.ts'

const top = fileURLToPath(new URL('../..', import.meta.url))

/** A made-up tree; files that are only imported come by themselves, empty. */
function tree(sources: Record<string, string>, others: readonly string[] = []): Tree {
  const all = new Map(Object.entries(sources))
  for (const [file, source] of Object.entries(sources)) {
    for (const [, specifier] of source.matchAll(/'(\.[^'?]+)[^']*'/g)) {
      const target = path.posix.join(path.posix.dirname(file), specifier as string)
      if (!all.has(target) && !others.includes(target)) all.set(target, 'export const made = 1')
    }
  }
  return { sources: all, others: new Set(others) }
}
const broken = (sources: Record<string, string>, others?: readonly string[]) =>
  violations(tree(sources, others)).map((v) => [v.rule, v.file])
const clean = (sources: Record<string, string>, others?: readonly string[]) => expect(violations(tree(sources, others))).toEqual([])

it('the project keeps every rule', () => {
  const project = readTree(top)
  expect(project.sources.size).toBeGreaterThan(30)
  expect(violations(project).map(describe)).toEqual([])
})

group('directions', () => {
  it.each([
    ['src/set/a.ts', '../signal/b.ts'],
    ['src/signal/a.ts', '../set/b.ts'],
    ['src/media/a.ts', '../set/result.ts'],
    ['src/material/a.ts', '../dsp/b.ts'],
    ['src/dsp/a.ts', '../analysis/b.ts'],
    ['src/dsp/a.ts', '../material/b.ts'],
    ['src/analysis/a.ts', '../checks/b.ts'],
    ['src/firmware/a.ts', '../analysis/b.ts'],
    ['src/checks/a.ts', '../media/b.ts'],
    ['src/checks/a.ts', '../handover/b.ts'],
    ['src/capture/a.ts', '../checks/b.ts'],
    ['src/set/a.ts', '../cli/b.ts'],
    ['src/set/a.ts', '../index.ts'],
    ['src/dsp/a.ts', '../../app/state/b.ts'],
    ['src/cli/a.ts', '../../app/state/b.ts'],
    ['src/cli/a.ts', '../../tests/b.ts'],
    ['app/state/a.ts', '../shell/b.ts'],
    ['app/state/a.ts', '../audio/b.ts'],
    ['app/state/a.ts', '../../src/cli/b.ts'],
    ['app/plots/a.ts', '../audio/b.ts'],
    ['app/plots/a.ts', '../areas/shape/b.ts'],
    ['app/plots/a.ts', '../workers/analysis.worker.ts'],
    ['app/fields/a.tsx', '../plots/b.ts'],
    ['app/audio/a.ts', '../fields/b.ts'],
    ['app/audio/a.ts', '../shell/App.tsx'],
    ['app/workers/a.ts', '../state/b.ts'],
    ['app/areas/shape/a.tsx', '../ship/b.ts'],
    ['app/areas/ship/a.tsx', '../bench/b.ts'],
    ['app/areas/bench/a.tsx', '../shape/b.ts'],
    ['app/areas/shape/a.tsx', '../../shell/App.tsx'],
    ['app/shell/messages.ts', '../audio/b.ts'],
    ['app/audio/worklet/a.ts', '../b.ts'],
    ['app/audio/worklet/a.ts', '../../../src/analysis/b.ts'],
    ['app/audio/worklet/a.ts', '../../../src/material/phrases.ts'],
  ])('%s may not import %s', (file, specifier) => {
    expect(broken({ [file]: `import { made } from '${specifier}'\nexport const a = made` })).toContainEqual(['direction', file])
  })

  it.each([
    ['src/material/a.ts', '../signal/b.ts'],
    ['src/checks/a.ts', '../analysis/b.ts'],
    ['src/handover/a.ts', '../media/b.ts'],
    ['src/cli/a.ts', '../capture/b.ts'],
    ['app/shell/a.tsx', '../areas/ship/b.tsx'],
    ['app/areas/shape/a.tsx', '../../plots/b.ts'],
    ['app/areas/shape/a.tsx', '../../workers/analysisClient.ts'],
    ['app/audio/a.ts', './worklet/messages.ts'],
    ['app/audio/worklet/a.ts', '../../../src/dsp/engine.ts'],
    ['src/dsp/deep/a.ts', '../b.ts'],
  ])('%s may import %s', (file, specifier) => {
    clean({ [file]: `import { made } from '${specifier}'\nexport const a = made` })
  })

  it.each([
    ["import type { made } from '../dsp/b.ts'"],
    ["import { type made } from '../dsp/b.ts'"],
    ["import '../dsp/b.ts'"],
    ["export type { made } from '../dsp/b.ts'\nexport const a = 1"],
    ["export { made } from '../dsp/b.ts'\nexport const a = 1"],
    ["export const a = () => import('../dsp/b.ts')"],
    ["export type A = import('../dsp/b.ts').made"],
    ["export type A = typeof import('../dsp/b.ts')"],
    ["import b = require('../dsp/b.ts')\nexport const a = b"],
    ["export const a = require('../dsp/b.ts')"],
    ["import url from '../dsp/b.ts?worker&url'\nexport const a = url"],
    ["import Worker from '../dsp/b.ts?worker'\nexport const a = Worker"],
    ["export const a = new URL('../dsp/b.ts', import.meta.url)"],
    ["export const a = new Worker(new URL('../dsp/b.ts', import.meta.url), { type: 'module' })"],
    ['/// <reference path="../dsp/b.ts" />\nexport const a = 1'],
  ])('counts %s', (source) => {
    expect(broken({ 'src/set/a.ts': source, 'src/dsp/b.ts': 'export const made = 1' })).toEqual([['direction', 'src/set/a.ts']])
  })

  it('lets types pass where the table says types, and nothing else', () => {
    const session = { 'app/state/session.ts': 'export const made = 1\nexport type Made = 1' }
    clean({ 'app/audio/worklet/a.ts': "import type { Made } from '../../state/session.ts'\nexport type A = Made", ...session })
    clean({ 'app/audio/worklet/a.ts': "import { type Made } from '../../state/session.ts'\nexport type A = Made", ...session })
    const mixed = {
      'app/audio/worklet/a.ts': "import { made, type Made } from '../../state/session.ts'\nexport const a: Made = made",
      ...session,
    }
    expect(broken(mixed)).toEqual([['direction', 'app/audio/worklet/a.ts']])
  })
})

group('packages and Node', () => {
  it.each([
    ['src/dsp/a.ts', 'react', 'package'],
    ['src/dsp/a.ts', 'fft.js', 'package'],
    ['src/signal/a.ts', 'fft.js-other', 'package'],
    ['src/set/a.ts', 'zustand', 'package'],
    ['src/signal/a.ts', 'node:fs', 'node'],
    ['src/media/a.ts', 'buffer', 'node'],
    ['src/media/a.ts', 'fs/promises', 'node'],
    ['app/state/a.ts', 'node:path', 'node'],
    ['app/audio/a.ts', 'react', 'package'],
    ['app/audio/worklet/a.ts', 'zustand', 'package'],
    ['app/workers/a.ts', 'react', 'package'],
    ['app/fields/a.tsx', 'uplot', 'package'],
    ['src/cli/a.ts', 'react', 'package'],
  ] as const)('%s may not use %s', (file, specifier, rule: Rule) => {
    expect(broken({ [file]: `import type * as x from '${specifier}'\nexport type X = typeof x` })).toEqual([[rule, file]])
  })

  it.each([
    ['src/signal/a.ts', 'fft.js'],
    ['src/set/a.ts', 'zod/mini'],
    ['src/cli/a.ts', 'node:fs'],
    ['app/plots/a.ts', 'uplot/dist/uPlot.min.css'],
    ['app/shell/a.tsx', '@base-ui/react/menu'],
  ])('%s may use %s', (file, specifier) => {
    clean({ [file]: `import * as x from '${specifier}'\nexport const a = x` })
  })
})

group('what a thread loads', () => {
  const processor = 'app/audio/worklet/processor.ts'

  it('the processor may not reach a package or a foreign folder over any number of steps', () => {
    const far = {
      [processor]: "import { a } from '../../../src/set/a.ts'\nregisterProcessor(a)",
      'src/set/a.ts': "import { z } from 'zod'\nexport const a = z",
    }
    expect(broken(far)).toEqual([['closure', 'src/set/a.ts']])
    const viaBuildId = {
      [processor]: "import '../buildId.ts'",
      'app/audio/buildId.ts': "import { say } from '../shell/messages.ts'\nexport const id = say",
    }
    expect(broken(viaBuildId)).toEqual([['closure', 'app/audio/buildId.ts']])
  })

  it('types do not load', () => {
    clean({
      [processor]: "import type { Session } from '../../state/session.ts'\nexport type S = Session",
      'app/state/session.ts': "import { create } from 'zustand'\nexport type Session = 1\nexport const s = create()",
    })
  })

  it('a worker may not reach the page, nor React', () => {
    const entry = 'app/workers/analysis.worker.ts'
    const far = {
      [entry]: "import '../plots/columns.ts'",
      'app/plots/columns.ts': "import { css } from '../state/theme.ts'\nimport 'react'\nexport const a = css",
    }
    expect(broken(far)).toEqual([
      ['closure', 'app/plots/columns.ts'],
      ['closure', 'app/plots/columns.ts'],
    ])
  })

  it('an address of a worker is not loaded, only named', () => {
    clean({
      'app/workers/analysisClient.ts': "import Analysis from './analysis.worker.ts?worker'\nexport const start = () => new Analysis()",
      'app/workers/analysis.worker.ts': "import { reply } from './analysisClient.ts'\nreply()",
    })
  })
})

group('files', () => {
  it('rings are told once, with their path', () => {
    const found = violations(
      tree({
        'src/dsp/a.ts': "import { b } from './b.ts'\nexport const a = b",
        'src/dsp/b.ts': "import { c } from './c.ts'\nexport const b = c",
        'src/dsp/c.ts': "import { a } from './a.ts'\nexport const c = a",
      }),
    )
    expect(found.map(describe)).toEqual(['src/dsp/a.ts:1 cycle: src/dsp/a.ts → src/dsp/b.ts → src/dsp/c.ts → src/dsp/a.ts'])
  })

  it('a ring of types is none', () => {
    clean({
      'src/dsp/a.ts': "import type { b } from './b.ts'\nexport const a = 1 as unknown as b",
      'src/dsp/b.ts': "import type { a } from './a.ts'\nexport type b = a",
    })
  })

  it.each([
    ['src/new/a.ts', 'export const a = 1', 'folder'],
    ['app/a.ts', 'export const a = 1', 'folder'],
    ['src/dsp/a.ts', 'export const = 1', 'syntax'],
    ['src/dsp/a.ts', "export const a = import('../' + 'x.ts')", 'computed'],
    ['src/dsp/a.ts', "export const a = import.meta.glob('./*.ts')", 'computed'],
    ['src/dsp/a.ts', 'export default 1', 'defaultExport'],
    ['app/shell/a.tsx', 'const a = 1\nexport { a as default }', 'defaultExport'],
    ['src/dsp/a.ts', "export * from './b.ts'\nexport const a = 1", 'barrel'],
    ['src/dsp/a.ts', "export { made } from './b.ts'", 'barrel'],
    ['src/dsp/a.ts', "export type { made } from './b.ts'", 'barrel'],
  ] as const)('%s with %s breaks its rule', (file, source, rule) => {
    expect(broken({ [file]: source })).toContainEqual([rule, file])
  })

  it.each(["import './nothing.ts'", "import { a } from './nothing'", "import './style.css'"])('%s names no file', (source) => {
    expect(violations({ sources: new Map([['src/dsp/a.ts', source]]), others: new Set() }).map((v) => v.rule)).toEqual(['missing'])
  })

  it('the index of src may re-export, styles may be imported', () => {
    clean({ 'src/index.ts': "export { made } from './dsp/a.ts'" })
    clean({ 'app/shell/a.tsx': "import '../styles/tokens.css'\nimport './a.css'\nexport const a = 1" }, [
      'app/styles/tokens.css',
      'app/shell/a.css',
    ])
  })

  it('tells the line', () => {
    const [found] = violations(tree({ 'src/set/a.ts': "\n\nimport { made } from '../dsp/b.ts'\nexport const a = made" }))
    expect(found?.line).toBe(3)
  })
})

it('the table names every folder once and only folders it knows', () => {
  const folders = LAYERS.map((layer) => layer.folder)
  expect(new Set(folders).size).toBe(folders.length)
  for (const layer of LAYERS) {
    for (const entry of [...layer.may, ...(layer.types ?? [])]) {
      expect(folders.includes(entry) || /\.(ts|tsx|json)$/.test(entry), `${layer.folder}: ${entry}`).toBe(true)
    }
  }
})

it('reads TSX as TSX', () => {
  expect(parseFile('a.tsx', 'export const A = () => <b>{x}</b>').errors).toEqual([])
  expect(parseFile('a.ts', 'export const A = <T,>(x: T) => x').errors).toEqual([])
})
