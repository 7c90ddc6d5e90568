// The sweep: phase of a voice, shape of the cycle, and the delay that comes of both. Everything is a closed form of the
// absolute sample index; nothing accumulates, so block cuts and long runs change nothing.
import type { ParameterSet, Point, SweepShape } from '../set/types.ts'
import { driftValue } from './drift.ts'

export type Sweep = ParameterSet['sweep']

/** Part of the cycle, e in [0, ½], that a square or ramp takes over its jump: min(edgeMs · rateHz/1000, ½). */
export function edge(sweep: Pick<Sweep, 'edgeMs' | 'rateHz'>): number {
  return Math.min((sweep.edgeMs * sweep.rateHz) / 1000, 0.5)
}

/** φ = Φ − floor Φ, in [0, 1]. */
export function wrapPhase(phase: number): number {
  return phase - Math.floor(phase)
}

/**
 * Unwrapped phase Φ of voice `v` of output channel `c` at absolute sample `n`, in cycles:
 * n · rate/fs + startPhase + v · phaseSpread/(360 V) + c · stereoPhase/360, summed in that order.
 */
export function sweepPhase(set: Pick<ParameterSet, 'sweep' | 'voices'>, n: number, c: number, v: number, fs: number): number {
  const { rateHz, startPhase, stereoPhase } = set.sweep
  const { count, phaseSpread } = set.voices
  return (n * rateHz) / fs + startPhase + (v * phaseSpread) / (360 * count) + (c * stereoPhase) / 360
}

/** Triangle T(φ), φ in [0, 1]: 0 at 0 rising, 1 at ¼, −1 at ¾. */
export function triangle(phi: number): number {
  if (phi < 0.25) return 4 * phi
  return phi < 0.75 ? 2 - 4 * phi : 4 * phi - 4
}

/** Square with edges of `e` cycles centred on φ = 0 and ½: clamp(T/(2e), −1, 1); e = 0: +1 below ½, −1 from there. */
export function square(phi: number, e: number): number {
  if (e === 0) return phi < 0.5 ? 1 : -1
  return Math.min(1, Math.max(-1, triangle(phi) / (2 * e)))
}

/** Rising ramp that falls back over `e` cycles centred on φ = 0; e = 0: 2φ − 1. */
export function rampUp(phi: number, e: number): number {
  if (e === 0) return 2 * phi - 1
  const psi = phi >= 0.5 ? phi - 1 : phi
  return Math.abs(psi) < e / 2 ? (-2 * psi) / e : (2 * phi - 1) / (1 - e)
}

/** Straight lines through the first `count` points [φ, s] (phases ascending in [0, 1)), closed: the last joins the first one cycle later. */
export function drawnSweep(points: readonly Point[], count: number, phi: number): number {
  if (count === 0) return 0
  let right = 0
  while (right < count && (points[right] as Point)[0] <= phi) right++
  const [x1, y1] = points[right === 0 ? count - 1 : right - 1] as Point
  const [x2, y2] = points[right === count ? 0 : right] as Point
  const start = right === 0 ? x1 - 1 : x1
  const end = right === count ? x2 + 1 : x2
  return end > start ? y1 + ((y2 - y1) * (phi - start)) / (end - start) : y1
}

/** What a shape needs to know: a `Sweep`, or the engine's copy of one, whose points stand in a longer array. */
export interface ShapeParameters {
  readonly shape: SweepShape
  readonly edgeMs: number
  readonly rateHz: number
  readonly seed: number
  readonly points: readonly Point[]
}

/**
 * s in [−1, 1] at unwrapped phase `phase` (Φ, cycles). `voice` only matters to `drift`, whose levels differ by voice.
 * `count` is how many of the points are in use. Shapes: DESIGN 3.
 */
export function sweepShapeValue(sweep: ShapeParameters, phase: number, voice = 0, count = sweep.points.length): number {
  const phi = wrapPhase(phase)
  switch (sweep.shape) {
    case 'sine':
      return Math.sin(2 * Math.PI * phi)
    case 'triangle':
      return triangle(phi)
    case 'square':
      return square(phi, edge(sweep))
    case 'rampUp':
      return rampUp(phi, edge(sweep))
    case 'rampDown':
      return -rampUp(phi, edge(sweep))
    case 'drift':
      return driftValue(sweep.seed, voice, phase)
    case 'drawn':
      return drawnSweep(sweep.points, count, phi)
  }
}

/** s at position φ of a frozen view: as the shape, but `drift`, which has no position of its own, counts as sin 2πφ. */
export function frozenShapeValue(sweep: ShapeParameters, phi: number): number {
  return sweep.shape === 'drift' ? Math.sin(2 * Math.PI * wrapPhase(phi)) : sweepShapeValue(sweep, phi)
}

/** Offset of voice `v` of `count` in ms: evenly from −spreadMs/2 to +spreadMs/2; 0 for one voice. */
export function voiceOffsetMs(spreadMs: number, count: number, v: number): number {
  return count > 1 ? spreadMs * (v / (count - 1) - 0.5) : 0
}

/** Delay in samples where the sweep stands at `s`, around a centre of `centreMs` (base and offset): the time or the ratio law. */
export function delayAtShape(sweep: Pick<Sweep, 'law' | 'depthMs' | 'depthOctaves'>, centreMs: number, s: number, fs: number): number {
  const tauMs = sweep.law === 'time' ? centreMs + sweep.depthMs * s : centreMs * 2 ** (sweep.depthOctaves * s)
  return (tauMs * fs) / 1000
}

/** D in samples of voice `v` at unwrapped phase Φ (cycles), before any limit holds it. Laws: DESIGN 3. */
export function delaySamples(set: Pick<ParameterSet, 'line' | 'sweep' | 'voices'>, phase: number, v: number, fs: number): number {
  const centreMs = set.line.baseMs + voiceOffsetMs(set.voices.spreadMs, set.voices.count, v)
  return delayAtShape(set.sweep, centreMs, sweepShapeValue(set.sweep, phase, v), fs)
}

/**
 * D in samples at which the loop of a channel reads: `moving` at voice 0's phase without its spread offset, `fixed` at base;
 * half a sample less where a loop shaper with `adaa1` adds that half itself. `phase`: Φ of voice 0 of the channel.
 */
export function loopDelaySamples(set: Pick<ParameterSet, 'line' | 'sweep' | 'loop'>, phase: number, fs: number): number {
  const { baseMs } = set.line
  const less = set.loop.shaper?.antialias === 'adaa1' ? 0.5 : 0
  if (set.loop.delay === 'fixed') return (baseMs * fs) / 1000 - less
  return delayAtShape(set.sweep, baseMs, sweepShapeValue(set.sweep, phase, 0), fs) - less
}
