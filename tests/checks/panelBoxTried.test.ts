// Planted places of what is only tried or rendered: a choice, a bend of a taper, a knob that follows nothing else.
import { describe, expect, it } from 'vitest'
import { runChecks } from '../../src/checks/registry.ts'
import { shaper } from '../analysis/loopSets.ts'
import { changedSet } from '../dsp/sets.ts'
import { knob, move, panelBox, turned, withPanel, worstOf } from './panelSets.ts'

const one = changedSet((s) => {
  s.layout = 'mono'
  s.voices.count = 1
  s.voices.spreadMs = 0
})
const bulge = {
  taper: 'drawn',
  points: [
    [0, 0],
    [0.3, 0],
    [0.4, 1],
    [0.47, 0],
    [1, 0],
  ],
} as const
const statusAt = (set: typeof one, positions: readonly number[], id: string) =>
  runChecks(turned(set, positions)).find((check) => check.id === id)?.status

describe('what is tried', () => {
  it('a drive that bulges between the ends folds most at the bend', () => {
    const bent = { ...one, mix: { ...one.mix, shaper: shaper('hardClip') } }
    const set = withPanel(bent, [knob('Dirt', [move('mix.shaper.drive', 0.5, 20, bulge)], 0)])
    for (const end of [0, 0.5, 1]) expect(statusAt(set, [end], 'shaper.alias')).toBe('holds')
    expect(worstOf(panelBox(set), 'shaper.alias')).toMatchObject({ status: 'fails', positions: [0.4], at: { 'mix.shaper.drive': 20 } })
  })

  it('a switch that is on for a part of the turn only', () => {
    const wet = changedSet((s) => {
      s.layout = 'monoToStereo'
      s.sweep.stereoPhase = 0
      s.mix.dry = 0
    })
    const set = withPanel(wet, [knob('Width', [move('mix.invertRight', false, true, bulge)], 0)])
    for (const end of [0, 0.5, 1]) expect(statusAt(set, [end], 'level.mono')).toBe('holds')
    expect(worstOf(panelBox(set), 'level.mono')).toMatchObject({ status: 'fails', value: 400, at: { 'mix.invertRight': true } })
  })
})

describe('what is rendered', () => {
  it('a read on a knob: the coarsest is rendered, wherever the knob stands', () => {
    const set = withPanel(one, [knob('Read', [move('line.interpolation', 'nearest', 'lagrange3')], 1)])
    expect(statusAt(set, [1], 'sweep.steps')).toBe('holds')
    expect(worstOf(panelBox(set, {}), 'sweep.steps')).toMatchObject({ status: 'fails', at: { 'line.interpolation': 'nearest' } })
  })

  it('unequal limits on a knob leave DC, though no gain changes', () => {
    const bent = { ...one, input: { ...one.input, shaper: shaper('hardClip', { drive: 10 }) } }
    const set = withPanel(bent, [knob('Bias', [move('input.shaper.negative', 1, 0.2)], 0)])
    expect(statusAt(set, [0], 'level.dc')).toBe('holds')
    expect(worstOf(panelBox(set, {}), 'level.dc')).toMatchObject({ status: 'fails', at: { 'input.shaper.negative': 0.2 } })
  })

  it('is never said to be better than where the knobs stand', () => {
    const set = withPanel({ ...one, sweep: { ...one.sweep, rateHz: 2, depthMs: 4 } }, [knob('Depth', [move('sweep.depthMs', 0.5, 4)], 1)])
    const own = runChecks(set).find(({ id }) => id === 'sweep.steps')?.value as number
    expect(worstOf(panelBox(set, {}), 'sweep.steps').value).toBeGreaterThanOrEqual(own)
  })
})
