import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { fillLoopDelays, loopMovement } from '../../src/analysis/movingRead.ts'
import { certifiedNorm } from '../../src/analysis/movingReadNorm.ts'
import { renderSet } from '../../src/dsp/render.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { anySet } from '../set/anySet.ts'
import { energy, loopSet, playLoop } from './loopSets.ts'

function loopDelays(set: ParameterSet, count: number, first = 0, channel = 0): Float64Array {
  const delays = new Float64Array(count)
  fillLoopDelays(set, set.sampleRate, { channel, first }, delays)
  return delays
}

function largestChange(delays: Float64Array): number {
  let largest = 0
  for (let n = 1; n < delays.length; n++) largest = Math.max(largest, Math.abs((delays[n] as number) - (delays[n - 1] as number)))
  return largest
}

describe('the delay read', () => {
  it.each([
    ['linear', { 'sweep.updateEvery': 1 }],
    ['lagrange3', { 'sweep.updateEvery': 16, 'sweep.shape': 'triangle' }],
    ['hermite4', { 'sweep.updateEvery': 64, 'sweep.between': 'hold', 'sweep.shape': 'square', 'sweep.edgeMs': 0 }],
    ['allpass1', { 'sweep.shape': 'drift', 'sweep.law': 'ratio', 'sweep.depthOctaves': 0.5 }],
    ['nearest', { 'sweep.shape': 'rampUp', 'sweep.startPhase': 0.3 }],
  ] as const)('%s: the loop played by its definition on these delays is the engine’s line', (kind, fields) => {
    const set = loopSet({
      'loop.interpolation': kind,
      'loop.feedback': 0.8,
      'line.baseMs': 4,
      'sweep.depthMs': 2,
      'sweep.rateHz': 9,
      'mix.dryTap': 'line',
      'mix.dry': 1,
      'mix.wet': 0,
      ...fields,
    })
    const frames = 12000
    const input = new Float64Array(frames)
    input[0] = 1
    const [engine] = renderSet(set, [input]) as [Float64Array]
    const own = playLoop(kind, loopDelays(set, frames), 0.8, input)
    // The same taps in another order of operations: rounding, passed round a few dozen times.
    expect(Math.max(...own.map((x, i) => Math.abs(x - (engine[i] as number))))).toBeLessThan(1e-12)
  })
})

describe('ε', () => {
  const shapes = ['sine', 'triangle', 'square', 'rampUp', 'rampDown', 'drawn'] as const
  const cases = shapes.flatMap((shape) =>
    (['ramp', 'hold'] as const).flatMap((between) => [1, 16, 64].map((every) => [shape, between, every] as const)),
  )
  it.each(cases)('%s, %s, every %i: no sample moves more, and one moves nearly as much', (shape, between, every) => {
    for (const law of ['time', 'ratio'] as const) {
      const set = loopSet({
        'sweep.shape': shape,
        'sweep.between': between,
        'sweep.updateEvery': every,
        'sweep.law': law,
        'sweep.rateHz': 2.3,
        'sweep.edgeMs': 7,
        'sweep.points': [
          [0.1, -1],
          [0.3, 0.5],
          [0.32, -0.2],
          [0.8, 1],
        ],
      })
      const { epsilon, minSamples, maxSamples, moves } = loopMovement(set)
      const delays = loopDelays(set, 200000)
      const largest = largestChange(delays)
      expect(moves).toBe(true)
      // Differences of delays of a thousand samples: 1e-13 each.
      expect(largest).toBeLessThanOrEqual(epsilon * (1 + 1e-9) + 1e-12)
      expect(largest).toBeGreaterThan(0.98 * epsilon)
      expect(delays.reduce((a, b) => Math.min(a, b))).toBeGreaterThanOrEqual(minSamples - 1e-9)
      expect(delays.reduce((a, b) => Math.max(a, b))).toBeLessThanOrEqual(maxSamples + 1e-9)
    }
  })

  it('drift stays below its bound', () => {
    const set = loopSet({ 'sweep.shape': 'drift', 'sweep.rateHz': 5 })
    const largest = largestChange(loopDelays(set, 400000))
    expect(largest).toBeLessThanOrEqual(loopMovement(set).epsilon)
    expect(largest).toBeGreaterThan(0.5 * loopMovement(set).epsilon)
  })

  it.each([
    ['a fixed loop delay', { 'loop.delay': 'fixed' }],
    ['rate 0', { 'sweep.rateHz': 0 }],
    ['depth 0', { 'sweep.depthMs': 0 }],
    [
      'a level drawn sweep',
      {
        'sweep.shape': 'drawn',
        'sweep.points': [
          [0, 0.4],
          [0.5, 0.4],
        ],
      },
    ],
  ])('%s does not move', (_, fields) => {
    expect(loopMovement(loopSet(fields))).toMatchObject({ moves: false, epsilon: 0 })
  })

  it('holds for any valid set, in every sample of its first half second', () => {
    // Phases nearer to each other than doubles next to 1 are not told apart by a closed form over the cycle.
    const apart = ({ sweep, ...set }: ParameterSet): ParameterSet => {
      const points = sweep.points.map(([, s], i, all) => [(i + 0.9 * ((0.618 * i) % 1)) / all.length, s] as const)
      return { ...set, sweep: { ...sweep, points, rateHz: sweep.rateHz < 1e-6 ? 0 : sweep.rateHz } }
    }
    fc.assert(
      fc.property(anySet.map(apart), (set) => {
        const { epsilon } = loopMovement(set)
        const largest = Math.max(...[0, 1].map((channel) => largestChange(loopDelays(set, 24000, 0, channel))))
        // D of up to 10⁶ samples: a difference of two is exact to 1e-9.
        return largest <= epsilon * (1 + 1e-6) + 1e-9
      }),
      { numRuns: 100, seed: 2 },
    )
  })
})

describe('certified norm over the sweep', () => {
  // Computed by an earlier, independent trial: (N − 1)/ε of a smooth sweep.
  it.each([
    ['linear', 0.57],
    ['lagrange3', 0.52],
    ['hermite4', 0.5],
  ] as const)('%s in a slow triangle: N = 1 + %d ε', (kind, slope) => {
    const set = loopSet({ 'loop.interpolation': kind, 'sweep.shape': 'triangle', 'sweep.rateHz': 1 })
    const norm = certifiedNorm(set) as NonNullable<ReturnType<typeof certifiedNorm>>
    const { epsilon } = loopMovement(set)
    expect(Math.abs((norm.measured - 1) / epsilon - slope)).toBeLessThan(0.01)
    expect(norm.norm).toBeGreaterThan(norm.measured)
    expect(norm.norm - 1).toBeLessThan(1.011 * (norm.measured - 1))
    expect(norm).toMatchObject({ method: 'cycles', repeats: true })
  })

  it('a nearest read repeats a sample at each hop: N = √2', () => {
    const norm = certifiedNorm(loopSet({ 'loop.interpolation': 'nearest' }))
    expect(norm?.measured).toBeCloseTo(Math.SQRT2, 7)
  })

  it('standing still it is 1', () => {
    expect(certifiedNorm(loopSet({ 'loop.delay': 'fixed', 'loop.interpolation': 'allpass1' }))).toMatchObject({ norm: 1 })
  })

  it('an all-pass read that runs backwards is not decided', () => {
    expect(certifiedNorm(loopSet({ 'loop.interpolation': 'allpass1', 'sweep.shape': 'square', 'sweep.edgeMs': 0 }))).toBeNull()
  })

  it('windows alone, where whole cycles are too long, agree with the cycle within the margin', () => {
    for (const kind of ['linear', 'lagrange3', 'allpass1'] as const) {
      const set = loopSet({ 'loop.interpolation': kind, 'sweep.rateHz': 0.7 })
      const cycles = certifiedNorm(set)
      const windows = certifiedNorm(set, 48000, { budget: 0 })
      expect(cycles?.method).toBe('cycles')
      expect(windows?.method).toBe('windows')
      expect(Math.abs((windows?.measured ?? 0) - (cycles?.measured ?? 0))).toBeLessThan(0.01 * ((cycles?.measured ?? 0) - 1))
    }
  })

  it.each(['linear', 'lagrange3', 'hermite4', 'nearest', 'allpass1'] as const)(
    '%s: no read of noise or of slow waves has more energy',
    (kind) => {
      const set = loopSet({ 'loop.interpolation': kind, 'sweep.rateHz': 6, 'sweep.depthMs': 1.5 })
      const norm = certifiedNorm(set)?.norm ?? 0
      const delays = loopDelays(set, 48000)
      for (const wave of [
        (n: number) => Math.cos(0.01 * n),
        (n: number) => (n % 2 ? 1 : -1) * Math.cos(0.001 * n),
        (n: number) => Math.sin(n * n),
      ]) {
        const input = Float64Array.from(delays, (_, n) => wave(n))
        // One pass of the read: the second line of a loop of gain 1 whose first line is the input.
        const read = readOnce(kind, delays, input)
        expect(energy(read)).toBeLessThanOrEqual(norm * norm * energy(input) * (1 + 1e-12))
      }
    },
  )
})

/** The read of a given line: a loop's first pass, input and all, less the input. */
function readOnce(kind: Parameters<typeof playLoop>[0], delays: Float64Array, line: Float64Array): Float64Array {
  const read = new Float64Array(line.length)
  // playLoop with gain g gives w = u + g R w; for small g the read of u is the part linear in g.
  const g = 1e-7
  const plus = playLoop(kind, delays, g, line)
  const minus = playLoop(kind, delays, -g, line)
  for (let n = 0; n < line.length; n++) read[n] = ((plus[n] as number) - (minus[n] as number)) / (2 * g)
  return read
}
