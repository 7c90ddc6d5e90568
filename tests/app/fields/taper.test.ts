import { describe, expect, it } from 'vitest'
import { positionOf, stepped, trackHigh, trackLow, valueAt } from '../../../app/fields/taper.ts'
import { type NumberParameter, PARAMETERS, parameter } from '../../../src/set/parameters.ts'

const numbers = PARAMETERS.filter((p): p is NumberParameter => p.kind === 'number' || p.kind === 'integer')
const row = (path: string) => parameter(path) as NumberParameter

describe('a track', () => {
  it.each(numbers.map((p) => [p.path, p] as const))('%s: a value put on the track is read off it again', (_, p) => {
    for (const position of [0.1, 0.37, 0.5, 0.81, 1]) {
      const value = valueAt(p, position)
      expect(value).toBeGreaterThanOrEqual(p.min)
      expect(value).toBeLessThanOrEqual(p.max)
      // Oracle: the map is its own inverse up to the rounding of the value, which the next reading must not move again.
      expect(valueAt(p, positionOf(p, value))).toBeCloseTo(value, 9)
    }
  })

  it('a logarithmic one goes by equal ratios: half way between 0.02 and 20 Hz lies near their geometric mean', () => {
    const rate = row('sweep.rateHz')
    // Oracle: sqrt(0.02 * 20) = 0.632; the zone kept for 0 moves it by half of its 3 %.
    expect(valueAt(rate, 0.515)).toBeCloseTo(Math.sqrt(0.02 * 20), 2)
  })

  it('its low end stands for zero where the field reaches it', () => {
    expect(valueAt(row('sweep.depthMs'), 0)).toBe(0)
    expect(positionOf(row('sweep.depthMs'), 0)).toBe(0)
  })

  it('values off the track stand at its ends', () => {
    expect(positionOf(row('loop.feedback'), 2)).toBe(1)
    expect(positionOf(row('loop.feedback'), -2)).toBe(0)
  })

  it('a position past the ends means the ends', () => {
    expect(valueAt(row('mix.dry'), -3)).toBe(trackLow(row('mix.dry')))
    expect(valueAt(row('mix.dry'), 7)).toBe(trackHigh(row('mix.dry')))
  })
})

describe('a step', () => {
  it.each([
    ['loop.feedback', 0.62, 1, false, 0.63],
    ['loop.feedback', 0.62, -1, true, 0.6],
    ['loop.feedback', 0.005, -1, false, 0],
    ['line.baseMs', 3.5, 1, false, 3.55],
    ['line.baseMs', 1, -1, false, 0.99],
    ['line.baseMs', 0.99, 1, false, 1],
    ['line.baseMs', 3.5, 1, true, 4],
    ['voices.count', 3, 1, false, 4],
    ['voices.count', 7, 1, true, 8],
    ['sweep.updateEvery', 16, 1, false, 32],
    ['sweep.updateEvery', 64, 1, false, 64],
    ['sweep.rateHz', 0.02, -1, false, 0],
    ['sweep.rateHz', 0, 1, false, 0.02],
    ['mix.outputGainDb', -6, 1, false, -5.8],
  ] as const)('%s from %d by %d (big %s) goes to %d', (path, from, direction, big, to) => {
    expect(stepped(row(path), from, direction, big)).toBe(to)
  })

  it.each(numbers.filter((p) => !p.values).map((p) => [p.path, p] as const))('%s: up and down again comes back, on the grid', (_, p) => {
    const start = stepped(p, valueAt(p, 0.6), 1, false)
    expect(stepped(p, stepped(p, start, 1, false), -1, false)).toBeCloseTo(start, 9)
  })

  it('never leaves the range', () => {
    for (const p of numbers) {
      expect(stepped(p, p.max, 1, true)).toBeLessThanOrEqual(p.max)
      expect(stepped(p, p.min, -1, true)).toBeGreaterThanOrEqual(p.min)
    }
  })
})
