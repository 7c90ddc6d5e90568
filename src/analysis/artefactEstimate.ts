// What interpolators and updates leave by formula, without a read: good to a decibel or two, and good enough to say what is worth measuring.
//
// Interpolator: the delay runs over every fraction alike, so a tone's gain R(ω, f) = A(ω, D) e^{jωD} against a true delay takes every value, and what
// moves is its variance: Σ S Var_f R / Σ S. Updates: D misses by δ, and e ≈ δ x′, so δ̄² · Σ ω² S / Σ S.
import { LOOPS } from '../dsp/runs.ts'
import type { Interpolation } from '../set/types.ts'
import type { ArtefactWeights } from './artefactLevels.ts'
import { createMotion, type MotionRead, runMotion, startMotion, type Updates } from './artefactMotion.ts'
import { noisePower, noiseTopHz } from './artefactNoise.ts'
import { type ArtefactStage, muteLeaps } from './artefactStage.ts'
import { type FrozenRead, frozenRead } from './frozenRead.ts'

/** Powers against the wet signal: of the voices' reads, and of the loop's with all its passes. */
export interface EstimatedPower {
  readonly voices: number
  readonly loop: number
}

/** One frequency of the noise: ω, and its share of the wet signal, as it is and after the loop's passes. */
interface Tone {
  readonly omega: number
  readonly voices: number
  readonly loop: number
}

const STEP_BINS = 8
const FRACTIONS = 32
/** Of the stretches of a group, one in so many is looked at. */
const EVERY_STRETCH = 3

export function tonesOf({ stage: { sampleRate, length }, weights }: { stage: ArtefactStage; weights: ArtefactWeights }): Tone[] {
  const tones: Tone[] = []
  let all = 0
  for (let k = 1; (k * sampleRate) / length < noiseTopHz(sampleRate); k += STEP_BINS) {
    const power = noisePower((k * sampleRate) / length) * (weights.wet[k] as number)
    all += power
    tones.push({ omega: (2 * Math.PI * k) / length, voices: power, loop: power * (weights.loop[k] as number) })
  }
  return tones.map(({ omega, voices, loop }) => ({ omega, voices: voices / all, loop: loop / all }))
}

/** What `kind` leaves, read as voices and as loop, where the delay meets every fraction. */
export function interpolatorPower(kind: Interpolation, tones: readonly Tone[]): EstimatedPower {
  const power = { voices: 0, loop: 0 }
  const delays = Array.from({ length: FRACTIONS }, (_, i) => 8 + (i + 0.5) / FRACTIONS)
  const reads = delays.map((delay) => frozenRead(kind, delay))
  for (const { omega, voices, loop } of tones) {
    let [re, im, square] = [0, 0, 0]
    const [c, s] = [Math.cos(omega), Math.sin(omega)]
    for (let i = 0; i < FRACTIONS; i++) {
      const { first, taps, pole } = reads[i] as FrozenRead
      const phase = omega * ((delays[i] as number) - first)
      // The phasor of each tap is the last one's, turned back by ω.
      let [pr, pi, nr, ni] = [Math.cos(phase), Math.sin(phase), 0, 0]
      for (let k = 0; k < taps.length; k++) {
        nr += (taps[k] as number) * pr
        ni += (taps[k] as number) * pi
        ;[pr, pi] = [pr * c + pi * s, pi * c - pr * s]
      }
      const [dr, di] = [1 + pole * c, -pole * s]
      const d2 = dr * dr + di * di
      re += (nr * dr + ni * di) / d2
      im += (ni * dr - nr * di) / d2
      square += (nr * nr + ni * ni) / d2
    }
    const variance = Math.max(0, square / FRACTIONS - (re / FRACTIONS) ** 2 - (im / FRACTIONS) ** 2)
    power.voices += variance * voices
    power.loop += variance * loop
  }
  return power
}

/** What `updates` leave, on the worse group of stretches. */
export function* updatesPower(stage: ArtefactStage, tones: readonly Tone[], updates: Updates): Generator<number, EstimatedPower> {
  if (updates.every === 1) return { voices: 0, loop: 0 }
  const windowPower = stage.window.reduce((sum, w) => sum + w * w, 0)
  const misses = { cycle: { voices: 0, loop: 0 }, steepest: { voices: 0, loop: 0 } }
  const motion = createMotion(stage.set, stage.sampleRate, updates, stage.loops)
  const stretches = stage.stretches.filter((_, i) => i % EVERY_STRETCH === 0)
  for (const { group, phase, voices, loop } of stretches) {
    const tracks = loop ? [...voices, loop] : voices
    const reads = tracks.map(({ read }): MotionRead => ({ r: read, kind: 'linear', line: null, out: new Float64Array(stage.length) }))
    startMotion(motion, phase)
    runMotion(motion, reads, 0, stage.length)
    for (const [k, { out }] of reads.entries()) {
      const { delays, leaps, read } = tracks[k] as (typeof tracks)[number]
      const power =
        missPower(out, delays, stage.window, leaps.length > 0 ? { leaps, every: updates.every } : null) / windowPower / stretches.length
      if (read === LOOPS) misses[group].loop += 2 * power
      else misses[group].voices += (2 * power) / voices.length
    }
    yield 0
  }
  const { cycle, steepest } = misses
  const squares = (part: 'voices' | 'loop') => tones.reduce((sum, tone) => sum + tone.omega ** 2 * tone[part], 0)
  return {
    voices: Math.max(cycle.voices, steepest.voices) * squares('voices'),
    loop: Math.max(cycle.loop, steepest.loop) * squares('loop'),
  }
}

/** Σ ((D − true D) · window)², without what is near leaps. Overwrites `out`, which holds D. */
function missPower(
  out: Float64Array,
  delays: Float64Array,
  window: Float64Array,
  near: { readonly leaps: readonly number[]; readonly every: number } | null,
): number {
  for (let j = 0; j < out.length; j++) out[j] = ((out[j] as number) - (delays[j] as number)) * (window[j] as number)
  if (near) muteLeaps(out, near.leaps, near.every)
  let power = 0
  for (let j = 0; j < out.length; j++) power += (out[j] as number) ** 2
  return power
}
