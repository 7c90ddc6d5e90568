// The stretches of the sweep on which artefacts are measured, with the reference read of each: made once a set, used for every interpolator and
// update interval that is tried.
//
// Every read's line holds the same noise (artefactNoise.ts), so the loop's past does not matter: what is judged is what one read adds to what is in
// the line. Whole samples are taken off each read's delay, so that a line of seconds costs no more than one of milliseconds.
import { LOOPS } from '../dsp/runs.ts'
import type { ParameterSet } from '../set/types.ts'
import { realFft, type Spectrum } from '../signal/fft.ts'
import { createMotion, type Motion, runMotion, type StretchLine, startMotion } from './artefactMotion.ts'
import { artefactNoise, noiseStretch } from './artefactNoise.ts'
import { artefactPlaces } from './artefactPlaces.ts'
import { addReferenceRead, REFERENCE_REACH } from './referenceRead.ts'

/** Samples read before a stretch counts: memory of the all-pass, whose pole is at most ⅓. */
export const LEAD = 64
/** Samples beyond a stretch for which its delays are known: reaches further than two update intervals. */
const BEYOND = 192

/** One read over one stretch. */
export interface Track {
  /** Which read of the motion: a voice, or LOOPS. */
  readonly read: number
  readonly line: StretchLine
  /** D evaluated at every sample. */
  readonly delays: Float64Array
  readonly reference: Float64Array
  /** Samples of the stretch, −BEYOND … length + BEYOND, before which D leaps by part of its whole range. */
  readonly leaps: readonly number[]
}

export interface Stretch {
  readonly group: 'cycle' | 'steepest'
  readonly phase: number
  readonly voices: readonly Track[]
  readonly loop: Track | null
  /** Windowed transforms of the references: the voices' sum with its V^(−1/2), the loop's read. */
  readonly wet: Spectrum
  readonly fed: Spectrum | null
}

export interface ArtefactStage {
  readonly set: ParameterSet
  readonly sampleRate: number
  /** Samples a stretch. */
  readonly length: number
  readonly window: Float64Array
  readonly stretches: readonly Stretch[]
  /** Whether the loop's read moves and is heard. */
  readonly loops: boolean
}

/**
 * Stretches of 85 ms at 48 kHz, 12 over the cycle and 12 at its steepest; 8 or 6 each where there are more voices, of which each adds its own. `material`: one period
 * of what is in the line instead of the noise, {@link NOISE_PERIOD} samples.
 */
export function* artefactStage(set: ParameterSet, sampleRate: number, material?: Float64Array): Generator<number, ArtefactStage> {
  const length = sampleRate <= 64000 || set.voices.count > 4 ? 4096 : 8192
  const loops = set.loop.feedback !== 0 && set.loop.delay === 'moving'
  const count = length * set.voices.count <= 8192 ? 12 : set.voices.count <= 4 ? 8 : 6
  const { cycle, steepest } = artefactPlaces(set, count)
  const places = [...cycle.map((phase) => ['cycle', phase] as const), ...steepest.map((phase) => ['steepest', phase] as const)]
  // D at every sample, exactly: what updates and interpolators are to come near.
  const motion = createMotion(set, sampleRate, { every: 1, between: 'ramp' }, loops)
  const window = hann(length)
  yield 0
  const noise = material ?? artefactNoise(sampleRate)
  yield 0
  const stretches: Stretch[] = []
  for (const [i, [group, middle]] of places.entries()) {
    const phase = middle - (length / 2 / sampleRate) * set.sweep.rateHz
    const reads = [...Array.from({ length: set.voices.count }, (_, v) => v), ...(loops ? [LOOPS] : [])]
    const delays = trueDelays(motion, phase, reads, length)
    yield i / places.length
    const tracks: Track[] = []
    for (const [k, read] of reads.entries()) {
      tracks.push(trackOf(set, read, delays[k] as Float64Array, { noise, base: i * 9973, length, sampleRate }))
      yield (i + (k + 1) / reads.length) / places.length
    }
    const voices = tracks.slice(0, set.voices.count)
    const loop = tracks[set.voices.count] ?? null
    const wet = windowed(window, sumOf(voices.map(({ reference }) => reference)))
    stretches.push({ group, phase, voices, loop, wet, fed: loop && windowed(window, loop.reference) })
  }
  return { set, sampleRate, length, window, stretches, loops }
}

function trueDelays(motion: Motion, phase: number, reads: readonly number[], length: number): Float64Array[] {
  const outs = reads.map(() => new Float64Array(length + 2 * BEYOND))
  startMotion(motion, phase)
  runMotion(
    motion,
    reads.map((r, k) => ({ r, kind: 'linear', line: null, out: outs[k] as Float64Array })),
    -BEYOND,
    length + 2 * BEYOND,
  )
  return outs
}

interface TrackPlace {
  readonly noise: Float64Array
  /** Sample of the noise that is written at sample 0 of the stretch. */
  readonly base: number
  readonly length: number
  readonly sampleRate: number
}

function trackOf(set: ParameterSet, read: number, all: Float64Array, { noise, base, length, sampleRate }: TrackPlace): Track {
  let [least, most] = [Number.POSITIVE_INFINITY, 0]
  for (const delay of all) {
    least = Math.min(least, delay)
    most = Math.max(most, delay)
  }
  const room = REFERENCE_REACH + LEAD + 8
  const shift = Math.floor(least) - 8
  const from = base - Math.ceil(most) - room
  const samples = noiseStretch(noise, from, length + Math.ceil(most - least) + 2 * room)
  const line = { samples, at: base - from - shift, shift }
  const delays = all.slice(BEYOND, BEYOND + length)
  return { read, line, delays, reference: readExactly(line, delays), leaps: leapsOf(set, all, sampleRate) }
}

/** The reference read of a line at these delays. */
export function readExactly({ samples, at, shift }: StretchLine, delays: Float64Array): Float64Array {
  const out = new Float64Array(delays.length)
  const shifted = delays.map((delay) => delay - shift)
  addReferenceRead(samples, at, shifted, out)
  return out
}

/** Sets to 0 what is near a leap, which comes up to an update interval sooner or later: that is no error of the updates. */
export function muteLeaps(x: Float64Array, leaps: readonly number[], every: number): void {
  for (const leap of leaps) x.fill(0, Math.max(0, Math.floor(leap - 1.5 * every - 8)), Math.max(0, Math.ceil(leap + 1.5 * every + 24)))
}

/** Where D changes in one sample by more than an eighth of its range: no update interval is meant to follow that. */
function leapsOf({ sweep }: ParameterSet, all: Float64Array, sampleRate: number): number[] {
  const leaps: number[] = []
  const ofRange = sweep.law === 'time' ? (0.25 * sweep.depthMs * sampleRate) / 1000 : 0
  for (let i = 1; i < all.length; i++) {
    const delay = all[i - 1] as number
    const part = sweep.law === 'time' ? ofRange : delay * (1 - 2 ** (-0.25 * sweep.depthOctaves))
    if (Math.abs((all[i] as number) - delay) > part) leaps.push(i - BEYOND)
  }
  return leaps
}

/** Σ / √(number), as the engine sums voices. */
export function sumOf(signals: readonly Float64Array[]): Float64Array {
  const out = new Float64Array((signals[0] as Float64Array).length)
  const scale = 1 / Math.sqrt(signals.length)
  for (const signal of signals) for (let j = 0; j < out.length; j++) out[j] = (out[j] as number) + scale * (signal[j] as number)
  return out
}

export function windowed(window: Float64Array, x: Float64Array): Spectrum {
  return realFft(x.map((sample, j) => sample * (window[j] as number)))
}

/** Periodic Hann window. */
const hann = (length: number): Float64Array => Float64Array.from({ length }, (_, j) => 0.5 - 0.5 * Math.cos((2 * Math.PI * j) / length))
