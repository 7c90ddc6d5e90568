// Phrases without events: a held chord, pink noise, impulses. All fit a whole number of cycles into the circle, so that repeating them
// is the endless signal itself.
import { inverseRealFft } from '../signal/fft.ts'
import { createRandom } from '../signal/random.ts'
import { addDecayingSine } from './circular.ts'

const CHORD_SECONDS = 6
/** D major over its fifth, with ninth: A2 D3 F♯3 A3 E4, in Hz, each a few cents beside the other's harmonics as players are. */
const CHORD_HZ = [110, 146.9, 185.1, 220.3, 329.4] as const
const CHORD_TOP_HZ = 9000
const TOP_OF_RATE = 0.45
const CHORD_SEED = 5

/** Five saw-like notes that never change: what moves in the output is the effect. Harmonics fall as 1/k, phases are random. 6 s. */
export function heldChord(sampleRate: number): Float64Array {
  const frames = Math.round(CHORD_SECONDS * sampleRate)
  const circle = new Float64Array(frames)
  const random = createRandom(CHORD_SEED)
  for (const hz of CHORD_HZ) {
    for (let k = 1; k * hz < CHORD_TOP_HZ; k++) {
      const phase = 2 * Math.PI * random()
      if (k * hz >= TOP_OF_RATE * sampleRate) continue
      const angle = (2 * Math.PI * Math.round(k * hz * CHORD_SECONDS)) / frames
      addDecayingSine(circle, { start: 0, frames, angle, phase, amplitude: 1 / k, decay: 0 })
    }
  }
  return circle
}

const NOISE_LOW_HZ = 20
const NOISE_HIGH_HZ = 20000
const NOISE_SEED = 9

/**
 * Pink noise, equal power an octave from 20 Hz to 20 kHz (or 0.45 of the rate): every notch shows against it. Made from its spectrum, magnitude 1/√f exactly and
 * phases random, in the largest power of two of samples up to 8 s; so 4 to 8 s long.
 */
export function pinkNoise(sampleRate: number): Float64Array {
  const frames = 2 ** Math.floor(Math.log2(8 * sampleRate))
  const random = createRandom(NOISE_SEED)
  const re = new Float64Array(frames / 2 + 1)
  const im = new Float64Array(frames / 2 + 1)
  const top = Math.min(NOISE_HIGH_HZ, TOP_OF_RATE * sampleRate)
  for (let k = Math.ceil((NOISE_LOW_HZ * frames) / sampleRate); k <= (top * frames) / sampleRate; k++) {
    const phase = 2 * Math.PI * random()
    re[k] = Math.cos(phase) / Math.sqrt(k)
    im[k] = Math.sin(phase) / Math.sqrt(k)
  }
  return inverseRealFft({ re, im })
}

const IMPULSE_SECONDS = 4
/** Linear; −6 dB. */
export const IMPULSE_AMPLITUDE = 0.5

/** One sample of 0.5 a second, first after a quarter of a second: makes every echo visible in the scope. 4 s. */
export function impulses(sampleRate: number): Float64Array {
  const circle = new Float64Array(IMPULSE_SECONDS * Math.round(sampleRate))
  for (let second = 0; second < IMPULSE_SECONDS; second++) circle[Math.round((second + 0.25) * sampleRate)] = IMPULSE_AMPLITUDE
  return circle
}
