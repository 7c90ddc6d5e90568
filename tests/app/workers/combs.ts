// Sets with a closed form, for tests: one voice, no loop, a delay of whole samples that stands still or sweeps.
import { defaultSet } from '../../../src/set/defaults.ts'
import type { ParameterSet } from '../../../src/set/types.ts'

/** y[n] = dry · x[n] + wet · x[n − baseMs]: |H|² = dry² + wet² + 2 dry wet cos(2π f τ). */
export function comb({ baseMs = 1, depthMs = 0, dry = 0.5, wet = 0.5 } = {}): ParameterSet {
  const set = defaultSet()
  return {
    ...set,
    layout: 'mono',
    line: { baseMs, interpolation: 'nearest' },
    sweep: { ...set.sweep, shape: 'sine', depthMs, rateHz: 0.5 },
    voices: { count: 1, phaseSpread: 0, spreadMs: 0 },
    mix: { ...set.mix, dry, wet },
  }
}

/** Level of that comb in dB. Oracle: J. O. Smith, PASP, "Feedforward Comb Filters". */
export function combDb(hz: number, { baseMs = 1, dry = 0.5, wet = 0.5 } = {}): number {
  return 10 * Math.log10(dry ** 2 + wet ** 2 + 2 * dry * wet * Math.cos((2 * Math.PI * hz * baseMs) / 1000))
}
