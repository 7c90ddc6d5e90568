// What is in the line while artefacts are measured: noise with the long-term spectrum of the built-in plucked chords, the same every time.
//
// S(f) ∝ 1/(1 + (f/600)²)², f up to min(20 kHz, 0.45 fs), where the reference read is exact: two low-passes of the first order at 600 Hz. It lies
// within 2.5 dB of the plucked chords in every octave from 125 Hz on (tested). Noise, because every place of the sweep must meet the same material; of
// this spectrum, because an interpolator's errors grow by 12 to 24 dB an octave: what they come to depends on how much there is up there.
import { inverseRealFft } from '../signal/fft.ts'
import { createRandom } from '../signal/random.ts'

/** Samples after which the noise repeats. */
export const NOISE_PERIOD = 16384
/** Corner of both low-passes, Hz. */
export const NOISE_CORNER_HZ = 600
const SEED = 20260

/** Highest frequency in the noise, Hz. */
export const noiseTopHz = (sampleRate: number): number => Math.min(20000, 0.45 * sampleRate)

/** Power of the noise at f, Hz, against 0 Hz. */
export const noisePower = (f: number): number => 1 / (1 + (f / NOISE_CORNER_HZ) ** 2) ** 2

let kept: { readonly sampleRate: number; readonly samples: Float64Array } | undefined

/** One period at `sampleRate`, Hz: magnitudes exact in every bin, phases from a seed, rms 1, no DC. */
export function artefactNoise(sampleRate: number): Float64Array {
  if (kept?.sampleRate === sampleRate) return kept.samples
  const random = createRandom(SEED)
  const half = NOISE_PERIOD / 2
  const re = new Float64Array(half + 1)
  const im = new Float64Array(half + 1)
  const top = noiseTopHz(sampleRate)
  let power = 0
  for (let k = 1; k < half; k++) {
    const hz = (k * sampleRate) / NOISE_PERIOD
    if (hz > top) break
    const angle = 2 * Math.PI * random()
    const magnitude = Math.sqrt(noisePower(hz))
    re[k] = magnitude * Math.cos(angle)
    im[k] = magnitude * Math.sin(angle)
    power += 2 * magnitude * magnitude
  }
  const scale = NOISE_PERIOD / Math.sqrt(power)
  const samples = inverseRealFft({ re, im }).map((x) => x * scale)
  kept = { sampleRate, samples }
  return samples
}

/** `length` samples of the noise from sample `from` on, which may be negative. */
export function noiseStretch(noise: Float64Array, from: number, length: number): Float64Array {
  const out = new Float64Array(length)
  for (let i = 0; i < length; ) {
    const at = (((from + i) % NOISE_PERIOD) + NOISE_PERIOD) % NOISE_PERIOD
    const n = Math.min(length - i, NOISE_PERIOD - at)
    out.set(noise.subarray(at, at + n), i)
    i += n
  }
  return out
}
