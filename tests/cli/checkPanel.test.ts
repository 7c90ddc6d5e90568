// `check --panel`: panel.box beside the other checks, in the shape others script against, and in the exit code.
import { writeFileSync } from 'node:fs'
import path from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { defaultSet } from '../../src/set/defaults.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { writeSet } from '../../src/set/write.ts'
import { knob, move, withPanel } from '../checks/panelSets.ts'
import { compiledCommand, type Typed, typed, workFolder } from './typed.ts'

const { folder, clear } = workFolder()
let command: readonly string[]
const run = (...words: string[]): Promise<Typed> => typed(folder, words, { command })

const still: ParameterSet = {
  ...defaultSet(),
  layout: 'mono',
  line: { baseMs: 5, interpolation: 'linear' },
  sweep: { ...defaultSet().sweep, rateHz: 0, depthMs: 0 },
  voices: { count: 1, phaseSpread: 0, spreadMs: 0 },
}
const howls = withPanel(still, [knob('Feedback', [move('loop.feedback', 0, -1.05)], 0.2)])

beforeAll(async () => {
  command = await compiledCommand(folder)
  writeFileSync(path.join(folder, 'howls.set.json'), writeSet(howls))
  writeFileSync(path.join(folder, 'still.set.json'), writeSet(still))
}, 60_000)
afterAll(clear)

describe('check --panel', () => {
  it('names the knob that howls, and fails', async () => {
    const without = await run('check', 'howls.set.json', '--json')
    expect(without.code).toBe(0)
    const { code, stdout } = await run('check', 'howls.set.json', '--panel', '--json')
    expect(code).toBe(1)
    const { verdict, checks } = JSON.parse(stdout)
    expect(verdict).toBe('fails')
    expect(checks.slice(0, -1)).toEqual(JSON.parse(without.stdout).checks)
    const box = checks.at(-1)
    expect(Object.keys(box).slice(0, 7)).toEqual(['id', 'status', 'value', 'limit', 'unit', 'text', 'working'])
    expect(box).toMatchObject({ id: 'panel.box', status: 'fails', value: 'loop.stability' })
    expect(box.worst[0]).toMatchObject({ id: 'loop.stability', status: 'fails', value: 'diverges', at: { 'loop.feedback': -1.05 } })
  }, 60_000)

  it('says so in words, with the end that would hold', async () => {
    const { code, stdout } = await run('check', 'howls.set.json', '--panel')
    expect(code).toBe(1)
    expect(stdout).toMatch(/fails\s+panel\.box\s+Feedback at 1: diverges/)
    expect(stdout).toMatch(/Feedback: feedback up to −0\.9\d* \(panel\[0\]\.moves\[0\]\.max -0\.9/)
  }, 60_000)

  it('holds without a panel', async () => {
    const { code, stdout } = await run('check', 'still.set.json', '--panel', '--json')
    expect(code).toBe(0)
    expect(JSON.parse(stdout).checks.at(-1)).toMatchObject({ id: 'panel.box', status: 'holds', value: null, worst: [] })
  }, 60_000)
})
