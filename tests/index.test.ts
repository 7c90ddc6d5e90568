// The library as another program meets it: by its name, with README's example as it is printed.
import { mkdirSync, readFileSync, symlinkSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { afterAll, expect, it } from 'vitest'
import * as library from '../src/index.ts'
import { typed, workFolder } from './cli/typed.ts'

const top = fileURLToPath(new URL('..', import.meta.url))
const { folder, clear } = workFolder()
afterAll(clear)

it('every name stands for something', () => {
  expect(Object.keys(library).length).toBeGreaterThan(40)
  expect(Object.entries(library).filter(([, value]) => value === undefined || value === null)).toEqual([])
})

it("README's example runs in a project of its own, in plain Node through tsx", async () => {
  const example = /```ts\n(.*?)```/s.exec(readFileSync(path.join(top, 'README.md'), 'utf8'))?.[1] as string
  const at = (...names: string[]) => path.join(folder, ...names)
  mkdirSync(at('node_modules'))
  symlinkSync(top, at('node_modules', 'combwright'), 'dir')
  writeFileSync(at('package.json'), '{ "type": "module" }')
  writeFileSync(at('example.ts'), example)
  const set = library.startingSet('comb')
  // Dry and wet equal, no loop, 1 ms: the first notch is at 1/(2τ) = 500 Hz (closed form).
  const comb = {
    ...set,
    line: { ...set.line, baseMs: 1 },
    loop: { ...set.loop, feedback: 0 },
    mix: { ...set.mix, dry: 0.5, wet: 0.5 },
    panel: [],
  }
  writeFileSync(at('my.set.json'), library.writeSet(comb))
  const command = [path.join(top, 'node_modules', 'tsx', 'dist', 'cli.mjs'), 'example.ts']
  const { code, stdout, stderr } = await typed(folder, [], { command })
  expect({ code, stderr }).toEqual({ code: 0, stderr: '' })
  const [verdict, notchHz] = stdout.trim().split(' ')
  expect(verdict).toBe('holds')
  expect(Number(notchHz)).toBeCloseTo(500, 2)
  const sound = library.readWav(readFileSync(at('plucked.wav')))
  if (!sound.ok) throw new Error(sound.reason)
  expect(sound.value).toMatchObject({ sampleRate: 48000, channelCount: 1, format: 'float32' })
  expect(sound.value.totalFrames).toBe(library.phrase('pluckedChords', 48000).length + 48000)
})
