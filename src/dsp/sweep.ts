// The sweep: phase of a voice, and the delay that its shape makes of it. Everything is a closed form of the absolute sample
// index; nothing accumulates, so block cuts and long runs change nothing. The shapes themselves stand with the set.
import { delayMs, voiceOffsetMs } from '../set/delayRange.ts'
import { sweepShapeValue } from '../set/sweepShape.ts'
import type { ParameterSet } from '../set/types.ts'

export { sweepEdge as edge, sweepShapeValue } from '../set/sweepShape.ts'

type Sweep = ParameterSet['sweep']

/** φ = Φ − floor Φ, in [0, 1). */
export function wrapPhase(phase: number): number {
  return phase - Math.floor(phase)
}

/** Phase of voice `v` of output channel `c` against voice 0 of channel 0, in cycles: v · phaseSpread/(360 V) + c · stereoPhase/360. */
export function phaseOffset(set: Pick<ParameterSet, 'sweep' | 'voices'>, c: number, v: number): number {
  return (v * set.voices.phaseSpread) / (360 * set.voices.count) + (c * set.sweep.stereoPhase) / 360
}

/**
 * Unwrapped phase Φ of voice `v` of output channel `c` at absolute sample `n`, in cycles:
 * n · rate/fs + startPhase + v · phaseSpread/(360 V) + c · stereoPhase/360, summed in that order, so that jumps fall on the
 * same sample wherever the formula is used.
 */
export function sweepPhase(set: Pick<ParameterSet, 'sweep' | 'voices'>, n: number, c: number, v: number, fs: number): number {
  const { rateHz, startPhase, stereoPhase } = set.sweep
  return (n * rateHz) / fs + startPhase + (v * set.voices.phaseSpread) / (360 * set.voices.count) + (c * stereoPhase) / 360
}

/** s at position φ of a frozen view: as the shape, but `drift`, which has no position of its own, counts as sin 2πφ. */
export function frozenShapeValue(sweep: Sweep, phi: number): number {
  return sweep.shape === 'drift' ? Math.sin(2 * Math.PI * wrapPhase(phi)) : sweepShapeValue(sweep, phi)
}

/** D in samples of voice `v` at unwrapped phase Φ (cycles), before any limit holds it. Laws: DESIGN 3. */
export function delaySamples(set: ParameterSet, phase: number, v: number, fs: number): number {
  return delayAtShape(set, v, sweepShapeValue(set.sweep, phase, v), fs)
}

/** D in samples of voice `v` where the shape stands at `s`. */
export function delayAtShape(set: ParameterSet, v: number, s: number, fs: number): number {
  return (delayMs(set, { offsetMs: voiceOffsetMs(set.voices, v), sweep: s }) * fs) / 1000
}

/**
 * D in samples at which the loop of a channel reads: `moving` at voice 0's sweep without its spread offset, `fixed` at base;
 * half a sample less where a loop shaper with `adaa1` adds that half itself. `phase`: Φ of voice 0 of the channel.
 */
export function loopDelaySamples(set: ParameterSet, phase: number, fs: number): number {
  return loopDelayAtShape(set, sweepShapeValue(set.sweep, phase, 0), fs)
}

/** The loop's D in samples where voice 0's shape stands at `s`. */
export function loopDelayAtShape(set: ParameterSet, s: number, fs: number): number {
  const ms = set.loop.delay === 'fixed' ? set.line.baseMs : delayMs(set, { offsetMs: 0, sweep: s })
  return (ms * fs) / 1000 - (set.loop.shaper?.antialias === 'adaa1' ? 0.5 : 0)
}
