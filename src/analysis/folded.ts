// What a sampled shaper folds back: harmonics above half the rate, which come back as tones that belong to nothing that was played.
import type { Shaper } from '../set/types.ts'
import { drivenSine, relativeDb } from './harmonics.ts'

/** The tone that shaper.alias asks with: 5 kHz, or 0.4 fs where that is lower. */
export const aliasToneHz = (sampleRate: number): number => Math.min(5000, 0.4 * sampleRate)

export interface Folded {
  readonly toneHz: number
  /** Amplitude of the tone that comes out: what the folded energy is compared with. */
  readonly toneAmplitude: number
  /** rms of all that folds. */
  readonly foldedRms: number
  /** 20 log10 of the folded rms against the tone's; null when no tone comes out, −400 when nothing folds. */
  readonly db: number | null
  /** Harmonics that stay below half the rate, 1 (the tone) to this. */
  readonly kept: number
}

/** Nothing folds: the floor of levels. */
const FLOOR_DB = -400

/**
 * Energy of every harmonic n with n · f > fs/2, Σ c_n²/2, against the tone's, c_1²/2, of a sine of `amplitude` at the shaper's input. Each harmonic counts by
 * itself wherever it folds to: what a sampled tone gives when its frequency and the rate share no small ratio, and on average over where its samples fall
 * otherwise (at 48 kHz the 47th and 49th harmonic of 5 kHz fold onto 5 kHz). No sum is cut off: the rest is one integral. With `adaa1` the harmonics are those of its means.
 */
export function foldedEnergy(p: Shaper, amplitude: number, sampleRate: number, toneHz = aliasToneHz(sampleRate)): Folded {
  if (!(toneHz > 0 && toneHz < sampleRate / 2)) throw new RangeError(`toneHz must lie between 0 and ${sampleRate / 2} Hz, got ${toneHz}`)
  const kept = Math.floor((sampleRate / 2 / toneHz) * (1 + 1e-12))
  const sine = drivenSine(p, amplitude, kept, (2 * Math.PI * toneHz) / sampleRate)
  const tone = Math.abs(sine.amplitudes[1] as number)
  const size = Math.max(tone, sine.restRms)
  const comesOut = relativeDb(tone, tone, size) !== null
  return {
    toneHz,
    toneAmplitude: tone,
    foldedRms: sine.restRms,
    db: comesOut ? (relativeDb(Math.SQRT2 * sine.restRms, tone, size) ?? FLOOR_DB) : null,
    kept,
  }
}
