// Whatever is called proven or computed never grows: random sets are set to just inside their certificate, played by the engine on an impulse, and held against the
// inequality the certificate states. Source of the counterexample: FACTS 5, computed (a cubic loop of 0.81 hopping by one sample at fs/2 grows).
import { describe, expect, it } from 'vitest'
import { addRows, createGramTest, finishGramTest } from '../../src/analysis/movingReadGram.ts'
import { loopGains, stability } from '../../src/analysis/stability.ts'
import { renderSet } from '../../src/dsp/render.ts'
import { withAt } from '../../src/set/path.ts'
import type { Interpolation, ParameterSet } from '../../src/set/types.ts'
import { setProblems } from '../../src/set/validity.ts'
import { createRandom } from '../../src/signal/random.ts'
import { energy, loopSet, playLoop, shaper } from './loopSets.ts'

const SECONDS = 1

type Random = () => number
const pick = <T>(random: Random, from: readonly T[]): T => from[Math.floor(random() * from.length)] as T
const logUniform = (random: Random, low: number, high: number) => low * (high / low) ** random()

/** A set with a loop worth judging: every shape, interpolator, filter, update and layout; shapers one time in three. */
function drawnSet(random: Random): ParameterSet {
  const base = logUniform(random, 0.4, 30)
  const shapers = [
    shaper('tanh'),
    shaper('hardClip', { drive: 1.7 }),
    shaper('cubic', { antialias: 'adaa1' }),
    shaper('deadZone', { deadZone: 0.01 }),
    shaper('arctan', { drive: 3, negative: 0.4 }),
  ]
  return loopSet({
    layout: pick(random, ['mono', 'stereo', 'stereo']),
    'line.baseMs': base,
    'sweep.shape': pick(random, ['sine', 'triangle', 'square', 'rampUp', 'rampDown', 'drift', 'drawn']),
    'sweep.points': [
      [0, -1],
      [random() * 0.5 + 0.01, 2 * random() - 1],
      [0.55, 2 * random() - 1],
      [0.56, 2 * random() - 1],
    ],
    'sweep.rateHz': logUniform(random, 0.1, 100),
    'sweep.law': pick(random, ['time', 'ratio']),
    'sweep.depthMs': (base - 0.1) * random() ** 2,
    'sweep.depthOctaves': random(),
    'sweep.edgeMs': pick(random, [0, 1, 30]),
    'sweep.stereoPhase': pick(random, [0, 90, 137]),
    'sweep.updateEvery': pick(random, [1, 16, 64]),
    'sweep.between': pick(random, ['ramp', 'hold']),
    'sweep.seed': Math.floor(1000 * random()),
    'loop.feedback': (random() < 0.5 ? -1 : 1) * (0.3 + 0.8 * random()),
    'loop.interpolation': pick(random, ['nearest', 'linear', 'lagrange3', 'hermite4', 'allpass1']),
    'loop.dampingHz': random() < 0.4 ? logUniform(random, 200, 20000) : null,
    'loop.lowCutHz': random() < 0.4 ? logUniform(random, 5, 2000) : null,
    'loop.crossFeed': random() < 0.5 ? 0 : random(),
    'loop.shaper': random() < 0.35 ? pick(random, shapers) : null,
    'mix.dryTap': 'line',
    'mix.dry': 1,
    'mix.wet': 0,
  })
}

/** The same set with its feedback just inside whichever certificate reaches furthest: γ = 0.999. */
function atTheEdge(set: ParameterSet): ParameterSet {
  const now = stability(set)
  const gain = Math.min(now.gammaInfinity, now.gamma2 ?? Number.POSITIVE_INFINITY, now.gammaN ?? Number.POSITIVE_INFINITY)
  return withAt(set, 'loop.feedback', Math.max(-2, Math.min(2, (0.999 * set.loop.feedback) / gain)))
}

const peak = (x: Float64Array, from = 0, to = x.length): number => x.subarray(from, to).reduce((most, v) => Math.max(most, Math.abs(v)), 0)

function playImpulse(set: ParameterSet): Float64Array[] {
  const input = new Float64Array(1)
  input[0] = 1
  return renderSet(set, [input], { tailSeconds: SECONDS })
}

describe('random sets and sweeps', () => {
  const random = createRandom(31)
  const sets = Array.from({ length: 130 }, () => drawnSet(random)).filter((set) => setProblems(set).length === 0)
  const cases = sets.flatMap((set) => [set, atTheEdge(set)]).map((set) => ({ set, found: stability(set) }))
  const certified = cases.filter(({ found }) => found.word === 'proven' || found.word === 'computed')

  it('are of every word, and are certified in every way', () => {
    expect(sets.length).toBeGreaterThan(70)
    expect(new Set(cases.map(({ found }) => found.word))).toEqual(new Set(['proven', 'computed', 'frozen', 'bounded', 'diverges']))
    expect([...new Set(certified.map(({ found }) => found.proof))]).toEqual(expect.arrayContaining(['peak', 'energy', 'sweep']))
    expect(certified.filter(({ found }) => found.proof === 'sweep').length).toBeGreaterThan(10)
  })

  it('certified, the line has no more peak or energy than the certificate says, and does not grow', () => {
    for (const { set, found } of certified) {
      const lines = playImpulse(set)
      const input = Math.sqrt(lines.length)
      const gamma = found.certified?.value ?? 0
      const label = JSON.stringify({ gamma, proof: found.proof, loop: set.loop, sweep: set.sweep })
      const total = lines.reduce((sum, line) => sum + energy(line), 0)
      expect(Number.isFinite(total), label).toBe(true)
      const third = Math.floor((lines[0] as Float64Array).length / 3)
      if (found.certified?.name === 'γ∞') {
        // Peaks are what is proven: a read that moves away repeats samples, so energy may rise for a while before it dies away.
        for (const line of lines) {
          expect(peak(line), label).toBeLessThanOrEqual((1 + 1e-9) / (1 - gamma))
          expect(peak(line, 2 * third), label).toBeLessThanOrEqual(peak(line, 1, third) * (1 + 1e-9))
        }
        continue
      }
      expect(Math.sqrt(total), label).toBeLessThanOrEqual((input * (1 + 1e-9)) / (1 - gamma))
      // The last third against the first: a loop that grows does so every time round.
      for (const line of lines) expect(energy(line, 2 * third), label).toBeLessThanOrEqual(energy(line, 0, third) * (1 + 1e-9))
    }
  })

  it('bounded, the line stays below the level stated, for an impulse of full scale', () => {
    for (const { set, found } of cases) {
      if (found.level === null) continue
      for (const line of playImpulse(set)) expect(peak(line)).toBeLessThanOrEqual(found.level * (1 + 1e-9))
    }
  })

  it('diverging without a shaper at a standstill, it grows', () => {
    for (const g of [1.001, -1.01]) {
      const set = loopSet({ 'loop.feedback': g, 'loop.delay': 'fixed', 'line.baseMs': 2, 'mix.dryTap': 'line', 'mix.dry': 1, 'mix.wet': 0 })
      expect(stability(set).word).toBe('diverges')
      const [line] = playImpulse(set) as [Float64Array]
      expect(energy(line, line.length - 4800)).toBeGreaterThan(energy(line, 0, 4800))
    }
  })
})

describe('one-sample hops at fs/2', () => {
  const FRAMES = 60000
  // Two half-sample positions one sample apart, a loop of about 100 samples, struck at fs/4: pairs of rows read the same four points,
  // and what they write comes round in step with the next.
  const delays = Float64Array.from({ length: FRAMES }, (_, n) => 101.5 + (n % 2))
  const struck = Float64Array.from({ length: 400 }, (_, n) => Math.cos((Math.PI / 2) * n + 0.3))
  const grows = (kind: Interpolation, path: Float64Array, g: number) => {
    const w = playLoop(kind, path, g, struck)
    return energy(w, FRAMES - 6000) > energy(w, 6000, 12000)
  }
  const below = (kind: 'linear' | 'lagrange3' | 'hermite4', path: Float64Array, t: number) => {
    const test = createGramTest(kind, t, { shortest: 90, longest: 120 })
    return addRows(test, 0, path) && finishGramTest(test, FRAMES)
  }

  it.each(['lagrange3', 'hermite4'] as const)('%s: 0.79 decays and 0.81 grows; no certificate is given above 0.8', (kind) => {
    expect(grows(kind, delays, 0.79)).toBe(false)
    expect(grows(kind, delays, 0.81)).toBe(true)
    expect(below(kind, delays, 1 / 0.81)).toBe(false)
    expect(below(kind, delays, 1.25 / 0.995)).toBe(true)
  })

  it('linear: 0.99 decays, as γ∞ proves', () => {
    expect(grows('linear', delays, 0.99)).toBe(false)
    expect(
      loopGains(loopSet({ 'loop.feedback': 0.99, 'sweep.shape': 'square', 'sweep.edgeMs': 0, 'sweep.rateHz': 100 })).gammaInfinity,
    ).toBe(0.99)
  })

  it.each(['linear', 'lagrange3', 'hermite4'] as const)(
    '%s: random hops of up to a sample never grow inside their own certificate',
    (kind) => {
      const random = createRandom(8)
      for (let i = 0; i < 12; i++) {
        const hop = random()
        const path = Float64Array.from({ length: FRAMES }, (_, n) => 100 + (n % 2 === 0 ? 0 : hop) + (i % 3 === 0 ? 0 : random()))
        let low = 1
        let high = 4
        for (let k = 0; k < 30; k++) {
          const middle = (low + high) / 2
          if (below(kind, path, middle)) high = middle
          else low = middle
        }
        expect(grows(kind, path, 0.999 / high)).toBe(false)
      }
    },
  )
})
