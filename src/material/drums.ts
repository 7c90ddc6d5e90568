// Two bars of drums, synthesised: kick, snare, hat. Common practice, no source: a kick is a sine that falls in pitch, a snare two membrane
// modes under a burst of noise, a hat a short burst of the highest noise.
import { createRandom } from '../signal/random.ts'
import { addToCircle } from './circular.ts'

const SIXTEENTH_SECONDS = 0.15
const STEPS = 32
const KICKS = [0, 7, 10, 16, 23, 26, 29] as const
const SNARES = [4, 12, 20, 28] as const
const OPEN_HATS = [14, 30] as const
const SEED = 20
// White noise is made as at 48 kHz: of the same density whatever the rate, and above 20 kHz no more than there.
const REFERENCE_RATE = 48000
const NOISE_TOP_HZ = 20000

/** Two bars of 4/4 at 100 beats a minute: sharp attacks, silence between them, noise up to the top of the band. 4.8 s. */
export function drumBar(sampleRate: number): Float64Array {
  const circle = new Float64Array(Math.round(STEPS * SIXTEENTH_SECONDS * sampleRate))
  const at = (step: number) => Math.round(step * SIXTEENTH_SECONDS * sampleRate)
  const random = createRandom(SEED)
  const dull = sampleRate > REFERENCE_RATE ? lowPass(sampleRate, NOISE_TOP_HZ) : (x: number) => x
  const noise = () => dull(Math.sqrt(sampleRate / REFERENCE_RATE) * (2 * random() - 1))
  for (const step of KICKS) kick(circle, sampleRate, at(step))
  for (const step of SNARES) snare(circle, sampleRate, at(step), noise)
  for (let step = 0; step < STEPS; step += 2) {
    const open = (OPEN_HATS as readonly number[]).includes(step)
    hat(circle, sampleRate, at(step), { noise, decay: open ? 9 : 60, amplitude: step % 4 === 0 ? 0.22 : 0.3 })
  }
  return circle
}

function kick(circle: Float64Array, sampleRate: number, start: number): void {
  let phase = 0
  addToCircle(circle, start, Math.round(0.5 * sampleRate), (i) => {
    const t = i / sampleRate
    phase += (48 + 130 * Math.exp(-t * 38)) / sampleRate
    return 0.9 * Math.sin(2 * Math.PI * phase) * Math.exp(-t * 9) * fadeOut(t, 0.5)
  })
}

function snare(circle: Float64Array, sampleRate: number, start: number, noise: () => number): void {
  const cut = highPass(sampleRate, 900)
  addToCircle(circle, start, Math.round(0.3 * sampleRate), (i) => {
    const t = i / sampleRate
    const membrane = Math.sin(2 * Math.PI * 186 * t) + 0.6 * Math.sin(2 * Math.PI * 331 * t)
    return (0.4 * membrane * Math.exp(-t * 24) + 0.45 * cut(noise()) * Math.exp(-t * 19)) * fadeOut(t, 0.3)
  })
}

interface Hat {
  readonly noise: () => number
  /** 1/s. */
  readonly decay: number
  readonly amplitude: number
}

function hat(circle: Float64Array, sampleRate: number, start: number, { noise, decay, amplitude }: Hat): void {
  // Below 20 kHz sampling there is little band left above the usual 7 kHz.
  const hz = Math.min(7000, 0.3 * sampleRate)
  const [first, second] = [highPass(sampleRate, hz), highPass(sampleRate, hz)]
  addToCircle(circle, start, Math.round(0.4 * sampleRate), (i) => {
    const t = i / sampleRate
    return amplitude * second(first(noise())) * Math.exp(-t * decay) * fadeOut(t, 0.4)
  })
}

/** First-order high-pass: what the low-pass of the same frequency leaves. */
function highPass(sampleRate: number, hz: number): (x: number) => number {
  const low = lowPass(sampleRate, hz)
  return (x) => x - low(x)
}

/** First-order low-pass, bilinear: y[n] = g (x[n] + x[n−1]) + p y[n−1], k = tan(π f/fs), g = k/(1 + k), p = (1 − k)/(1 + k). */
function lowPass(sampleRate: number, hz: number): (x: number) => number {
  const k = Math.tan((Math.PI * hz) / sampleRate)
  const g = k / (1 + k)
  const p = (1 - k) / (1 + k)
  let [x1, y1] = [0, 0]
  return (x) => {
    y1 = g * (x + x1) + p * y1
    x1 = x
    return y1
  }
}

/** 1, falling to 0 over the last tenth of `seconds`, so that no event ends on a step. */
function fadeOut(t: number, seconds: number): number {
  return Math.min(1, Math.max(0, (10 * (seconds - t)) / seconds))
}
