// src is for the page, its worklet, the command line and other people's programs, so it may lean on none of their worlds.
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import vm from 'node:vm'
import { build, type Rollup } from 'vite'
import { expect, it } from 'vitest'
import { readTree } from './readTree.ts'

const top = fileURLToPath(new URL('../..', import.meta.url))
const files = [...readTree(top).sources.keys()].filter((file) => file.startsWith('src/') && !file.startsWith('src/cli/'))

it('there is something to load', () => {
  expect(files.length).toBeGreaterThan(30)
})

it('every file of src loads in Node with no DOM', async () => {
  expect('document' in globalThis || 'window' in globalThis).toBe(false)
  for (const file of files) expect(await import(path.join(top, file)), file).toBeTypeOf('object')
})

/** Runs an entry's source, bundled with all it imports, in an engine that has the language and nothing else: no console, no process, no timers. */
async function runBare(source: string): Promise<unknown> {
  const entry = path.join(top, 'everything')
  const plugin = {
    name: 'everything',
    enforce: 'pre' as const,
    resolveId: (id: string) => (id === entry ? id : undefined),
    load: (id: string) => (id === entry ? source : undefined),
  }
  const result = (await build({
    configFile: false,
    root: top,
    logLevel: 'silent',
    publicDir: false,
    plugins: [plugin],
    build: { write: false, minify: false, target: 'es2023', lib: { entry, formats: ['iife'], name: 'bundle' } },
  })) as Rollup.RollupOutput[]
  const code = result[0]?.output.find((chunk) => chunk.type === 'chunk')?.code as string
  return vm.runInNewContext(`${code};bundle`, Object.create(null))
}

it('src as a whole runs in an engine with neither DOM nor Node', async () => {
  const everything = files.map((file, i) => `import * as m${i} from ${JSON.stringify(path.join(top, file))}`).join('\n')
  const count = await runBare(`${everything}\nexport const count = [${files.map((_, i) => `m${i}`).join()}].length`)
  expect((count as { count: number }).count).toBe(files.length)
})

it.each(['document.title', 'process.argv', 'setTimeout(() => 1, 0)', 'Buffer.alloc(1)', 'performance.now()'])(
  'that engine refuses %s',
  async (use) => {
    await expect(runBare(`export const count = ${use}`)).rejects.toThrow(/is not defined/)
  },
)
