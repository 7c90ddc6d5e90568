import { describe, expect, it } from 'vitest'
import { defaultSet } from '../../src/set/defaults.ts'
import { followField, parted, takeFromKnob, turnToField, widenToField } from '../../src/set/panelSettle.ts'
import { withAt } from '../../src/set/path.ts'
import type { Knob, Move, ParameterSet } from '../../src/set/types.ts'

const move = (parameter: string, min: number, max: number, taper: Move['taper'] = 'linear'): Move => ({
  parameter,
  min,
  max,
  taper,
  points: [],
})
const knob = (moves: Move[], position = 0.5, steps = 0): Knob => ({ knob: 'K', position, steps, smoothMs: 30, moves })
/** Rate 0.1 to 10 Hz, the knob in its middle: 1 Hz. */
const withRate = (rateHz: number, steps = 0): ParameterSet => ({
  ...withAt(defaultSet(), 'sweep.rateHz', rateHz),
  panel: [knob([move('sweep.rateHz', 0.1, 10, 'log')], 0.5, steps)],
})
/** Wet and dry against each other, both in the middle. */
const blend: ParameterSet = {
  ...withAt(withAt(defaultSet(), 'mix.wet', 0.5), 'mix.dry', 0.5),
  panel: [knob([move('mix.wet', 0, 1), move('mix.dry', 1, 0)])],
}
const position = (set: ParameterSet | null) => set?.panel[0]?.position

describe('a field and its knob', () => {
  it('are one where the knob gives the value, or no knob moves the field', () => {
    expect(parted(withRate(1), 'sweep.rateHz')).toBeNull()
    expect(parted(withRate(2), 'mix.wet')).toBeNull()
  })

  it('part where it gives another', () => {
    expect(parted(withRate(2), 'sweep.rateHz')).toMatchObject({ knob: 'K', stored: 2, betweenSteps: false })
    expect(parted(withRate(2), 'sweep.rateHz')?.gives).toBeCloseTo(1, 12)
  })

  it('part by less than a step where the value lies between two', () => {
    // Oracle: three steps of 0.1 to 10 Hz are 0.1, 1 and 10 Hz; 1.2 Hz is at 0.5 + log10(1.2)/2 of the turn, nearest to 1.
    const set = followField(withRate(1.2, 3), 'sweep.rateHz')
    expect(position(set)).toBeCloseTo(0.5 + Math.log10(1.2) / 2, 12)
    expect(parted(set, 'sweep.rateHz')).toMatchObject({ betweenSteps: true, gives: 1 })
  })
})

describe('a value typed', () => {
  it('turns the knob that moves nothing else, and changes nothing but its position', () => {
    const set = followField(withRate(10 ** 0.5), 'sweep.rateHz')
    expect(position(set)).toBeCloseTo(0.75, 12)
    expect(set.sweep.rateHz).toBe(10 ** 0.5)
    expect(parted(set, 'sweep.rateHz')).toBeNull()
  })

  it('past the knob’s end leaves the knob where it is', () => {
    const set = withRate(12)
    expect(followField(set, 'sweep.rateHz')).toBe(set)
  })

  it('leaves a knob that would take other fields along', () => {
    const set = withAt(blend, 'mix.wet', 0.25)
    expect(followField(set, 'mix.wet')).toBe(set)
    // Where the others already are what the turned knob gives, it is turned.
    expect(position(followField(withAt(set, 'mix.dry', 0.75), 'mix.wet'))).toBe(0.25)
  })
})

describe('ways to make both one again', () => {
  const reached = (set: ParameterSet, path: string) => {
    const found = parted(set, path)
    if (!found) throw new Error('not parted')
    return found
  }

  it('the field takes what the knob gives', () => {
    const set = withRate(12)
    const taken = takeFromKnob(set, reached(set, 'sweep.rateHz'))
    expect(taken.sweep.rateHz).toBeCloseTo(1, 12)
    expect(parted(taken, 'sweep.rateHz')).toBeNull()
  })

  it('the knob is turned there with everything it moves', () => {
    const set = withAt(blend, 'mix.wet', 0.25)
    const turned = turnToField(set, reached(set, 'mix.wet'))
    expect([position(turned), turned?.mix.wet, turned?.mix.dry]).toEqual([0.25, 0.25, 0.75])
    const far = withRate(12)
    expect(turnToField(far, reached(far, 'sweep.rateHz'))).toBeNull()
  })

  it('the nearer end is widened to the value and the knob turned to it', () => {
    for (const [rateHz, end, at] of [
      [12, 'max', 1],
      [0.05, 'min', 0],
    ] as const) {
      const set = withRate(rateHz)
      const widened = widenToField(set, reached(set, 'sweep.rateHz'))
      expect(widened?.panel[0]?.moves[0]?.[end]).toBe(rateHz)
      expect(position(widened)).toBe(at)
      expect(widened && parted(widened, 'sweep.rateHz')).toBeNull()
    }
  })

  it('nothing is widened where the knob reaches, or where ratios end: a log knob has no zero', () => {
    const between = withAt(blend, 'mix.wet', 0.25)
    expect(widenToField(between, reached(between, 'mix.wet'))).toBeNull()
    const zero = withRate(0)
    expect(widenToField(zero, reached(zero, 'sweep.rateHz'))).toBeNull()
  })
})
