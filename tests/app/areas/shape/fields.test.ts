import { describe, expect, it } from 'vitest'
import { fieldNotes } from '../../../../app/areas/shape/fields/notes.ts'
import { ringNote } from '../../../../app/areas/shape/fields/ringNote.ts'
import { solveWidth } from '../../../../app/areas/shape/fields/solveWidth.ts'
import { sweepDetune } from '../../../../src/analysis/detune.ts'
import { defaultSet } from '../../../../src/set/defaults.ts'
import { withAt } from '../../../../src/set/path.ts'
import type { ParameterSet } from '../../../../src/set/types.ts'
import { usualRange } from '../../../../src/set/usualRanges.ts'

const base = defaultSet()
const notes = (path: string, set: ParameterSet = base, tempoBpm = 110) => fieldNotes(path, set, { tempoBpm })
const spaced = (lines: readonly string[]) => lines.map((line) => line.replaceAll('\u00a0', ' '))

describe('what follows from a value', () => {
  it('a rate: the cycle, and its beats at the tempo', () => {
    // Oracle: 1/0.23 Hz = 4.348 s; at 110 beats a minute 7.97 beats.
    expect(spaced(notes('sweep.rateHz', withAt(base, 'sweep.rateHz', 0.23)))).toEqual(['a cycle in 4.35 s · 7.97 beats at 110'])
    expect(spaced(notes('sweep.rateHz', withAt(base, 'sweep.rateHz', 2), 120))).toEqual(['a cycle in 500 ms · 1 beat at 120'])
    expect(notes('sweep.rateHz', withAt(base, 'sweep.rateHz', 0))).toEqual(['stands still at the start position'])
  })

  it('a base delay: what is usual for the intent', () => {
    expect(notes('line.baseMs', { ...base, intent: 'flanger' })).toEqual(['usual for a flanger 0 to 10 ms'])
    expect(notes('line.baseMs', { ...base, intent: 'other' })).toEqual([])
  })

  it('a depth: the swept range of all voices', () => {
    // Oracle: 12 ms, ± 2 ms spread, ± 2.5 ms depth.
    expect(notes('sweep.depthMs')).toEqual(['7.50 to 16.50 ms'])
  })

  it('a damping: its true −3 dB point', () => {
    // Oracle: cos ω = (4a − 1 − a²)/(2a), a = exp(−2π 6500/48000), computed: 6933 Hz.
    expect(spaced(notes('loop.dampingHz', withAt(base, 'loop.dampingHz', 6500)))).toEqual(['true −3 dB point 6933 Hz'])
    expect(notes('loop.dampingHz')).toEqual([])
  })

  it('gains: decibels, and the factor of decibels', () => {
    expect(spaced(notes('mix.dry', { ...base, intent: 'other' }))).toEqual(['−3.01 dB'])
    expect(spaced(notes('mix.wet', withAt({ ...base, intent: 'other' }, 'mix.wet', -1)))).toEqual(['0.00 dB, inverted'])
    expect(notes('mix.outputGainDb', withAt(base, 'mix.outputGainDb', 20))).toEqual(['× 10'])
  })

  it('a dry delay: whole samples, rounded half up', () => {
    expect(notes('mix.dryDelayMs', withAt(base, 'mix.dryDelayMs', 0.0104167))).toEqual(['1 whole sample'])
    expect(notes('mix.dryDelayMs', withAt(base, 'mix.dryDelayMs', 10))).toEqual(['480 whole samples'])
  })

  it('a feedback: one pass, and the ring it allows', () => {
    // Oracle: T60 = 60 τ/(−20 log10 |g|) at τ = 5 ms, g = 0.9: 0.328 s (FACTS 1, computed).
    const fixed: ParameterSet = { ...base, line: { ...base.line, baseMs: 5 }, loop: { ...base.loop, feedback: 0.9, delay: 'fixed' } }
    expect(ringNote(fixed).replaceAll('\u00a0', ' ')).toBe('one pass −0.9 dB · rings 0.33 s at most')
    expect(ringNote(base)).toBe('no loop')
    expect(ringNote(withAt(fixed, 'loop.feedback', 1.05))).toContain('grows')
  })
})

describe('width in cents', () => {
  it.each([5, 20, 150])('%d cents gives a depth that bends by as much', (cents) => {
    for (const law of ['time', 'ratio'] as const) {
      const set = withAt(base, 'sweep.law', law)
      const depth = solveWidth(set, cents)
      const solved = withAt(set, law === 'time' ? 'sweep.depthMs' : 'sweep.depthOctaves', depth)
      expect(sweepDetune(solved).maxCents).toBeCloseTo(cents, 3)
    }
  })

  it('a standing sweep has no width to set', () => {
    expect(solveWidth(withAt(base, 'sweep.rateHz', 0), 10)).toBeNull()
  })

  it('no width is no depth; one out of reach is none', () => {
    expect(solveWidth(base, 0)).toBe(0)
    expect(solveWidth(withAt(base, 'sweep.rateHz', 0.001), 4000)).toBeNull()
  })
})

describe('usual ranges', () => {
  it.each([
    // Source: J. Dattorro, "Effect Design, Part 2", Table 7 (FACTS 2a, read).
    ['vibrato', 0, 5],
    ['flanger', 0, 10],
    ['chorus', 1, 30],
    ['doubler', 10, 100],
  ] as const)('of a %s’s delay are %d to %d ms', (intent, low, high) => {
    expect(usualRange(intent, 'line.baseMs')).toMatchObject({ low, high, mark: 'read' })
  })

  it('every range names its source, and runs upwards', () => {
    for (const intent of ['chorus', 'flanger', 'vibrato', 'doubler', 'comb'] as const)
      for (const path of ['line.baseMs', 'sweep.depthMs', 'sweep.rateHz', 'loop.feedback', 'mix.dry', 'mix.wet']) {
        const range = usualRange(intent, path)
        if (!range) continue
        expect(range.low).toBeLessThanOrEqual(range.high)
        expect(range.source.length).toBeGreaterThan(10)
      }
  })
})
