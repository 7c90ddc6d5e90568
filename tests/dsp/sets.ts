// Sets for the tests of the signal path: random ones from a seed, as different as the ranges allow, that read no closer than allowed.
import { defaultSet, defaultShaper } from '../../src/set/defaults.ts'
import type { Curve, Interpolation, Layout, ParameterSet, Shaper, SweepShape } from '../../src/set/types.ts'
import { createRandom } from '../../src/signal/random.ts'

type Deep<T> = { -readonly [K in keyof T]: T[K] extends readonly unknown[] ? T[K] : T[K] extends object | null ? Deep<T[K]> : T[K] }

/** The default set, changed by `change`. */
export function changedSet(change: (set: Deep<ParameterSet>) => void): ParameterSet {
  const set = defaultSet() as Deep<ParameterSet>
  change(set)
  return set as ParameterSet
}

export interface Random {
  /** In [0, 1). */
  next(): number
  between(low: number, high: number): number
  integer(low: number, high: number): number
  chance(p: number): boolean
  of<T>(list: readonly T[]): T
}

export function random(seed: number): Random {
  const next = createRandom(seed)
  const integer = (low: number, high: number) => low + Math.floor(next() * (high - low + 1))
  return {
    next,
    integer,
    between: (low, high) => low + next() * (high - low),
    chance: (p) => next() < p,
    of: (list) => list[integer(0, list.length - 1)]!,
  }
}

const SHAPES: readonly SweepShape[] = ['sine', 'triangle', 'square', 'rampUp', 'rampDown', 'drift', 'drawn']
const READS: readonly Interpolation[] = ['nearest', 'linear', 'lagrange3', 'hermite4', 'allpass1']
const LAYOUTS: readonly Layout[] = ['mono', 'stereo', 'monoToStereo']
const CURVES: readonly Curve[] = ['hardClip', 'arctan', 'tanh', 'cubic', 'diode', 'deadZone', 'drawn']

/** A shaper that is no steeper than 0.95, so that it bounds any loop it stands in. */
function randomShaper(r: Random): Shaper | null {
  if (r.chance(0.6)) return null
  const curve = r.of(CURVES)
  const drive = r.between(0.3, 4)
  return {
    ...defaultShaper(curve),
    drive,
    ceiling: 0.95 / drive,
    positive: r.between(0.3, 1.5),
    negative: r.between(0.3, 1.5),
    deadZone: curve === 'deadZone' ? r.between(0, 0.3) : 0,
    points:
      curve === 'drawn'
        ? [
            [0, 0],
            [0.5, 0.45],
            [r.between(0.6, 1.4), 0.6],
            [2, 0.7],
          ]
        : [],
    antialias: r.of(['none', 'adaa1'] as const),
  }
}

const maybe = (r: Random, low: number, high: number) => (r.chance(0.5) ? r.between(low, high) : null)

/** A valid random set. Everything audible varies; loops stay below 0.9. */
export function randomSet(seed: number): ParameterSet {
  const r = random(seed)
  return changedSet((s) => {
    s.sampleRate = r.of([8000, 44100, 48000, 96000])
    s.layout = r.of(LAYOUTS)
    s.input.gainDb = r.chance(0.5) ? 0 : r.between(-6, 3)
    s.input.shaper = randomShaper(r)
    const sample = 1000 / s.sampleRate
    s.line.baseMs = r.of([8, 40, 300]) * sample * r.between(1, 1.5)
    s.line.interpolation = r.of(READS)
    s.voices.count = r.of([1, 1, 2, 3, 4, 8])
    s.voices.phaseSpread = r.between(-360, 360)
    s.voices.spreadMs = r.chance(0.7) ? r.between(0, 0.5) * s.line.baseMs : 0
    const room = s.line.baseMs - s.voices.spreadMs / 2 - 3 * sample
    s.sweep.shape = r.of(SHAPES)
    s.sweep.rateHz = r.chance(0.1) ? 0 : 10 ** r.between(-1, 1.7)
    s.sweep.law = r.of(['time', 'ratio'] as const)
    s.sweep.depthMs = room * r.between(0.05, 0.98)
    s.sweep.depthOctaves = Math.min(6, Math.max(0, Math.log2((s.line.baseMs - s.voices.spreadMs / 2) / (3 * sample))) * r.between(0, 0.98))
    s.sweep.startPhase = r.next()
    s.sweep.stereoPhase = r.between(-360, 360)
    s.sweep.edgeMs = r.chance(0.2) ? 0 : r.between(1, 100)
    s.sweep.seed = r.integer(0, 2 ** 32 - 1)
    s.sweep.points =
      s.sweep.shape === 'drawn'
        ? [
            [0.1, r.between(-1, 1)],
            [0.4, r.between(-1, 1)],
            [0.8, r.between(-1, 1)],
          ]
        : []
    s.sweep.updateEvery = r.of([1, 2, 4, 8, 16, 32, 64])
    s.sweep.between = r.of(['ramp', 'hold'] as const)
    s.loop.feedback = r.chance(0.25) ? 0 : r.between(-0.9, 0.9)
    s.loop.delay = r.of(['moving', 'fixed'] as const)
    s.loop.interpolation = r.chance(0.5) ? 'linear' : r.of(READS)
    s.loop.dampingHz = maybe(r, 200, 20000)
    s.loop.lowCutHz = maybe(r, 5, 1000)
    s.loop.crossFeed = r.chance(0.5) ? 0 : r.next()
    s.loop.shaper = randomShaper(r)
    s.mix.dry = r.between(-1, 1)
    s.mix.wet = r.between(-1, 1)
    s.mix.dryTap = r.of(['input', 'line'] as const)
    s.mix.dryDelayMs = r.chance(0.6) ? 0 : r.between(0, 40) * sample
    s.mix.wetLowCutHz = maybe(r, 10, 1000)
    s.mix.wetHighCutHz = maybe(r, 1000, 20000)
    s.mix.invertRight = r.chance(0.3)
    s.mix.outputGainDb = r.chance(0.5) ? 0 : r.between(-6, 3)
    s.mix.shaper = randomShaper(r)
  })
}
