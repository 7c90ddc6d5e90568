// What stands beneath a shaper's fields. Oracle: the equations of DESIGN 4, by hand; FACTS 7 for DC.
import { expect, it } from 'vitest'
import { shaperNotes } from '../../../../../app/areas/shape/fields/shaperNotes.ts'
import { defaultSet, defaultShaper } from '../../../../../src/set/defaults.ts'
import { withAt } from '../../../../../src/set/path.ts'
import type { Shaper } from '../../../../../src/set/types.ts'

function notes(change: Partial<Shaper>, owner: 'loop.shaper' | 'mix.shaper' = 'mix.shaper') {
  const shaper = { ...defaultShaper('tanh'), ...change }
  return shaperNotes(withAt(defaultSet(), owner, shaper), owner, shaper)
}

it('drive: the gain of small signals, and the harmonics of −6 dBFS', () => {
  expect(notes({ drive: 4, ceiling: 0.5 }).drive[0]).toBe('small signals × 2 (6.0 dB)')
  expect(notes({ drive: 4 }).drive[1]).toBe('−6 dBFS: 3rd −15.4 dB')
  expect(notes({ curve: 'deadZone', deadZone: 0.1 }).drive[0]).toBe('small signals do not pass')
  expect(notes({ curve: 'hardClip' }).drive[1]).toBe('−6 dBFS stays clean')
})

it('ceiling and limits: where the curve ends', () => {
  expect(notes({ ceiling: 0.5 }).ceiling).toEqual(['never above −6.0 dBFS'])
  expect(notes({ curve: 'diode' }).ceiling).toEqual(['no limit: this curve has no end'])
  expect(notes({ curve: 'hardClip', drive: 4, positive: 0.8 }).positive).toEqual(['ends at 0.8, from 0.2 in on'])
  expect(notes({ curve: 'cubic', drive: 3 }).positive).toEqual(['ends at 1, from 0.5 in on'])
})

it('unlike halves leave DC: 0.117 of the sine’s peak at +0.4 and −0.8 of it', () => {
  const peak = 10 ** (-6 / 20)
  expect(notes({ curve: 'hardClip', positive: 0.4 * peak, negative: 0.8 * peak }).negative[1]).toBe(
    'unlike halves: DC −24.6 dBFS of −6 dBFS',
  )
  expect(20 * Math.log10(0.117 * peak)).toBeCloseTo(-24.6, 1)
  expect(notes({}).negative[1]).toBe('halves alike: no DC')
})

it('anti-aliasing: what folds with and without, and where its half sample goes', () => {
  expect(notes({ drive: 4 }).antialias).toEqual([
    '5 kHz folds −28.0 dB',
    expect.stringMatching(/^antiderivative: −3\d\.\d dB, 0\.0104\d?\sms later$/),
  ])
  const [level, delay] = notes({ drive: 4, antialias: 'adaa1' }, 'loop.shaper').antialias
  expect(level).toMatch(/^5 kHz folds −3\d\.\d dB; without −28\.0 dB$/)
  expect(delay).toBe('loop read ½ sample shorter: pitch stays')
})

it('table: its error and bound, its step, what held ends lose', () => {
  // h²/8 · 4/(3√3), h = 2/64: 9.4e−5.
  const { tableSize, tableRange } = notes({ tableSize: 64 })
  expect(tableSize[1]).toBe('bound h²/8 · max|f″| −80.5 dB')
  expect(tableRange).toEqual(['a point every 0.0313 in, drive included', 'past ±1 held: off by up to 0.24'])
  expect(notes({ curve: 'hardClip' }).tableSize[0]).toBe('the table is exact')
  expect(notes({ curve: 'diode' }).tableRange[1]).toBe('past ±1 held: the curve goes on')
  expect(notes({ curve: 'hardClip' }).tableRange[1]).toBe('past ±1 nothing is lost')
})
