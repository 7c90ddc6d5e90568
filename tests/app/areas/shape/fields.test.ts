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
    expect(notes('line.baseMs', withAt({ ...base, intent: 'flanger' }, 'line.baseMs', 3.5))).toEqual(['usual for a flanger 0 to 10 ms'])
    expect(notes('line.baseMs', { ...base, intent: 'other' })).toEqual([])
  })

  it('a depth: the swept range of all voices', () => {
    // Oracle: 12 ms, ± 2 ms spread, ± 2.5 ms depth.
    expect(notes('sweep.depthMs')).toEqual(['7.50 to 16.50 ms'])
  })

  it('a damping: its true −3 dB point', () => {
    // Oracle: cos ω = (4a − 1 − a²)/(2a), a = exp(−2π 6500/48000), computed: 6933 Hz.
    expect(spaced(notes('loop.dampingHz', withAt(base, 'loop.dampingHz', 6500)))).toEqual(['true −3 dB point 6\u2009933 Hz'])
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

describe('a value outside its usual range', () => {
  const flanger = { ...base, intent: 'flanger' } as const

  it('has a note with the range, where it is from and how sure that is; a usual one has not', () => {
    expect(notes('line.baseMs', withAt(flanger, 'line.baseMs', 12))).toEqual([
      '· unusual: flanger 0 to 10 ms (Dattorro 1997, Table 7; read in the paper)',
    ])
    expect(notes('sweep.depthMs', withAt(flanger, 'sweep.depthMs', 2.5)).at(-1)).toBe(
      '· unusual: flanger 0 to 2 ms (DAFX, chapter "Delays"; second-hand)',
    )
    expect(notes('sweep.rateHz', withAt(flanger, 'sweep.rateHz', 8)).at(-1)).toBe(
      '· unusual: flanger 0.1 to 5 Hz (DAFX, chapter "Delays"; transcriptions disagree)',
    )
    expect(notes('sweep.rateHz', withAt(flanger, 'sweep.rateHz', 0.25))).toHaveLength(1)
    expect(notes('line.baseMs', withAt({ ...base, intent: 'comb' }, 'line.baseMs', 25))).toEqual([
      '· unusual: comb 0 to 20 ms (DAFX 2002, Table 3.1; from memory)',
    ])
    expect(notes('sweep.stereoPhase', withAt({ ...flanger, layout: 'stereo' }, 'sweep.stereoPhase', 90)).at(-1)).toBe(
      '· unusual: flanger 0° (Dattorro 1997, section 6; read in the paper)',
    )
    expect(notes('mix.wet', withAt({ ...base, intent: 'vibrato' }, 'mix.dry', 0.5))).toHaveLength(2)
  })

  it('is not unusual by rounding: 0.7 is 0.7071', () => {
    expect(notes('mix.dry', withAt(flanger, 'mix.dry', 0.7))[0]).toMatch(/^−3.10.dB · usual for a flanger 0.71$/)
    expect(notes('mix.dry', withAt(flanger, 'mix.dry', 0.6)).at(-1)).toContain('unusual')
  })

  it('says nothing of a field without effect', () => {
    expect(notes('sweep.stereoPhase', withAt({ ...flanger, layout: 'mono' }, 'sweep.stereoPhase', 90))).toHaveLength(1)
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

  it.each([
    // Source: the same, Table 6, read; its feedback with the other sign (FACTS 2a, sign trap).
    ['vibrato', [0, 0], [1, 1], [0, 0]],
    ['flanger', [0.7071, 0.7071], [0.7071, 0.7071], [0, 0.7071]],
    ['chorus', [0.7071, 1], [0.7071, 1], [-0.7071, 0]],
    ['doubler', [0.7071, 0.7071], [0.7071, 0.7071], [0, 0]],
  ] as const)('of a %s’s gains are those of the knob settings', (intent, dry, wet, feedback) => {
    const range = (path: string) => [usualRange(intent, path)?.low, usualRange(intent, path)?.high]
    expect([range('mix.dry'), range('mix.wet'), range('loop.feedback')]).toEqual([dry, wet, feedback])
  })

  it.each([
    // Source: a university laboratory's table after DAFX, second-hand; where it and the book as remembered differ, unsettled (FACTS 2b).
    ['vibrato', 'sweep.depthMs', 0, 3, 'second-hand'],
    ['vibrato', 'sweep.rateHz', 0.1, 5, 'second-hand'],
    ['flanger', 'sweep.depthMs', 0, 2, 'second-hand'],
    ['flanger', 'sweep.rateHz', 0.1, 5, 'unsettled'],
    ['chorus', 'sweep.depthMs', 1, 30, 'second-hand'],
    ['doubler', 'sweep.depthMs', 1, 100, 'unsettled'],
    // DAFX Table 3.1, from memory: a resonator, 0 to 20 ms, no modulation.
    ['comb', 'line.baseMs', 0, 20, 'memory'],
    ['comb', 'sweep.rateHz', 0, 0, 'memory'],
  ] as const)('of a %s’s %s are %d to %d, %s', (intent, path, low, high, mark) => {
    expect(usualRange(intent, path)).toMatchObject({ low, high, mark })
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
