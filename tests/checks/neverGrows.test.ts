// Whatever loop.stability calls proven or computed never grows: sets drawn at random with the movements that break frozen proofs (hops of one sample, steps between updates,
// edges without width, ramps at full speed), played by the engine on an impulse and on bursts of random signs, which no certificate may depend on.
// Source of the danger: FACTS 5, computed (a cubic loop of 0.81 whose delay hops by one sample grows, though every frozen filter is stable).
import { describe, expect, it } from 'vitest'
import { stabilityWord } from '../../src/analysis/stability.ts'
import { closedFigure } from '../../src/checks/closedFigures.ts'
import { CHECKS, checkInput } from '../../src/checks/registry.ts'
import type { CheckEntry } from '../../src/checks/types.ts'
import { renderSet } from '../../src/dsp/render.ts'
import { withAt } from '../../src/set/path.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { setProblems } from '../../src/set/validity.ts'
import { createRandom } from '../../src/signal/random.ts'
import { energy, loopSet, shaper } from '../analysis/loopSets.ts'

type Random = () => number
const pick = <T>(random: Random, from: readonly T[]): T => from[Math.floor(random() * from.length)] as T

const SECONDS = 0.3
const BURST = 2000

/** ms of so many samples at the rate of the set. */
const samples = (count: number, sampleRate: number) => (count * 1000) / sampleRate

/** A loop whose delay hops by about a sample, once a few samples or every few hundred. */
function hoppingSet(random: Random): ParameterSet {
  const sampleRate = pick(random, [44100, 48000, 96000])
  const every = pick(random, [1, 2, 16, 64])
  const movement = pick(random, [
    // ± half a sample at once, twice a cycle.
    () => ({ 'sweep.shape': 'square', 'sweep.edgeMs': 0, 'sweep.depthMs': samples(0.5, sampleRate), 'sweep.rateHz': 30 + 70 * random() }),
    // About a sample at every update of a fast sweep that steps.
    () => ({
      'sweep.shape': 'triangle',
      'sweep.between': 'hold',
      'sweep.rateHz': 100,
      'sweep.depthMs': samples(sampleRate / 400 / every, sampleRate),
    }),
    // A ramp that falls back at once.
    () => ({
      'sweep.shape': pick(random, ['rampUp', 'rampDown']),
      'sweep.edgeMs': 0,
      'sweep.rateHz': 5 + 95 * random(),
      'sweep.depthMs': 3 * random(),
    }),
    () => ({ 'sweep.shape': 'drift', 'sweep.between': 'hold', 'sweep.rateHz': 20 + 80 * random(), 'sweep.depthMs': 4 * random() ** 2 }),
    // Steep for its length, at the edge of what stays below a sample a sample.
    () => ({
      'sweep.shape': 'sine',
      'sweep.rateHz': 100 * random(),
      'sweep.depthMs': 1.4 * random(),
      'sweep.between': pick(random, ['hold', 'ramp']),
    }),
    // Slow, so that the narrow proofs are met too.
    () => ({ 'sweep.shape': pick(random, ['sine', 'triangle']), 'sweep.rateHz': 0.3 + 2 * random(), 'sweep.depthMs': 0.2 + 2 * random() }),
  ])()
  return loopSet({
    sampleRate,
    layout: pick(random, ['mono', 'stereo', 'stereo']),
    'voices.count': 1,
    'line.baseMs': 4.5 * (1 + random()),
    'sweep.updateEvery': every,
    'sweep.stereoPhase': pick(random, [0, 90, 180]),
    'sweep.seed': Math.floor(1000 * random()),
    ...movement,
    'loop.feedback': random() < 0.5 ? -0.9 : 0.9,
    'loop.interpolation': pick(random, ['nearest', 'linear', 'lagrange3', 'lagrange3', 'hermite4', 'allpass1']),
    'loop.dampingHz': random() < 0.3 ? 1000 + 9000 * random() : null,
    'loop.lowCutHz': random() < 0.4 ? 20 + 400 * random() : null,
    'loop.crossFeed': random() < 0.5 ? 0 : random(),
    'loop.shaper': random() < 0.2 ? pick(random, [shaper('tanh'), shaper('cubic', { antialias: 'adaa1' }), shaper('hardClip')]) : null,
    'mix.dryTap': 'line',
    'mix.dry': 1,
    'mix.wet': 0,
  })
}

/** The largest feedback in hundredths that is still called proven or computed: what is said at the very edge of the claim. */
function atTheEdge(set: ParameterSet): { set: ParameterSet; word: string } | null {
  for (const size of [1.1, 1, 0.99, 0.98, 0.96, 0.93, 0.9, 0.85, 0.8, 0.75, 0.7, 0.6, 0.5, 0.4, 0.3]) {
    const tried = withAt(set, 'loop.feedback', size * Math.sign(set.loop.feedback))
    const word = closedFigure(entry, checkInput(tried)).value as string
    if (word === 'proven' || word === 'computed') return { set: tried, word }
  }
  return null
}

const entry = CHECKS.find(({ id }) => id === 'loop.stability') as CheckEntry

function impulse(): Float64Array {
  const input = new Float64Array(1)
  input[0] = 1
  return input
}

const burst = (random: Random): Float64Array => Float64Array.from({ length: BURST }, () => (random() < 0.5 ? -1 : 1))

const peak = (x: Float64Array, from = 0, to = x.length): number => x.subarray(from, to).reduce((most, v) => Math.max(most, Math.abs(v)), 0)

describe('proven or computed at the very edge', () => {
  const random = createRandom(2024)
  const cases = Array.from({ length: 120 }, () => hoppingSet(random))
    .filter((set) => setProblems(set).length === 0)
    .flatMap((set) => atTheEdge(set) ?? [])

  it('meets both words, every interpolator, and movements of a sample a sample and more', () => {
    expect(cases.length).toBeGreaterThan(80)
    expect(new Set(cases.map(({ word }) => word))).toEqual(new Set(['proven', 'computed']))
    expect(new Set(cases.map(({ set }) => set.loop.interpolation)).size).toBe(5)
    expect(cases.filter(({ set }) => stabilityWord(set).movement.epsilon >= 0.99).length).toBeGreaterThan(20)
    expect(cases.filter(({ word }) => word === 'computed').length).toBeGreaterThan(15)
  })

  it.each([
    ['an impulse', impulse],
    ['a burst of random signs', burst],
  ])('%s never grows', (_, strike) => {
    for (const { set, word } of cases) {
      const input = strike(random)
      const lines = renderSet(set, [input], { tailSeconds: SECONDS })
      const { certified } = stabilityWord(set)
      const gamma = certified?.value ?? 0
      const label = JSON.stringify({ word, certified, loop: set.loop, sweep: set.sweep })
      const rest = input.length
      const frames = (lines[0] as Float64Array).length
      const third = Math.floor((frames - rest) / 3)
      const total = lines.reduce((sum, line) => sum + energy(line), 0)
      expect(Number.isFinite(total), label).toBe(true)
      if (certified?.name === 'γ∞') {
        for (const line of lines) {
          expect(peak(line), label).toBeLessThanOrEqual((1 + 1e-9) / (1 - gamma))
          // Every time round is at most γ of the largest before: what rings at the end is below what rang at first.
          expect(peak(line, frames - third), label).toBeLessThanOrEqual(peak(line, 0, rest + third) * (1 + 1e-9))
        }
      } else {
        const put = lines.length * energy(input)
        expect(Math.sqrt(total), label).toBeLessThanOrEqual((Math.sqrt(put) * (1 + 1e-9)) / (1 - gamma))
        const sum = (from: number, to: number) => lines.reduce((all, line) => all + energy(line, from, to), 0)
        expect(sum(frames - third, frames), label).toBeLessThanOrEqual(sum(0, rest + third) * (1 + 1e-9))
      }
    }
  })

  it('the same sets called none of these do grow now and then: the test can tell', () => {
    // 1.3 times the feedback at the edge, where nothing is claimed.
    const louder = cases
      .filter(({ set }) => set.loop.shaper === null)
      .map(({ set }) => withAt(set, 'loop.feedback', 1.3 * set.loop.feedback))
    const grown = louder.filter((set) => {
      const [line] = renderSet(set, [impulse()], { tailSeconds: SECONDS }) as [Float64Array]
      return energy(line, line.length - 4000) > energy(line, 0, 4000)
    })
    expect(grown.length).toBeGreaterThan(5)
  })
})
