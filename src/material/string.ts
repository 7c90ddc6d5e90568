// A plucked string as the sum of its modes: partials of an ideal string pulled aside at one point and let go, each dying away by itself.
// Modes rather than a delay line, so that a phrase sounds the same at every sample rate.
//
// Partial k: f_k = k f0 √(1 + B k²) (stiffness), amplitude sin(kπp)/k (force on the bridge, plucked at the fraction p of the length), decay e^(−σt) with
// σ = s1 + s3 f_k² (air and inner friction). Sources, from memory: N. H. Fletcher, T. D. Rossing, "The Physics of Musical Instruments", ch. 2 (plucked string, stiffness);
// J. Bensa, S. Bilbao, R. Kronland-Martinet, J. O. Smith, "The simulation of piano string vibration", JASA 114, 2003 (the two loss terms).
import { addDecayingSine } from './circular.ts'

export interface PluckedString {
  /** Fundamental in Hz. */
  readonly hz: number
  readonly amplitude: number
  /** Where it is plucked, as a fraction of its length, in (0, 1). */
  readonly pluckAt: number
  /** Inharmonicity B. */
  readonly stiffness: number
  /** Decay of every partial, 1/s. */
  readonly loss: number
  /** Decay that grows with the square of the frequency, s. */
  readonly highLoss: number
  /** After so many seconds a hand damps it. */
  readonly heldSeconds: number
}

const DAMPED_LOSS = 40
const TOP_HZ = 14000
// Of the sample rate: no partial comes near half of it.
const TOP_OF_RATE = 0.45
// Linear, where the whole phrase peaks near 1 to 5.
const INAUDIBLE = 3e-5

/** Plucks the string at frame `start` of the circle, at `sampleRate` Hz. */
export function pluck(circle: Float64Array, sampleRate: number, start: number, string: PluckedString): void {
  const partials = pluckSteps(circle, sampleRate, start, string)
  while (!partials.next().done);
}

/** The same partial by partial: yields after each. */
export function* pluckSteps(circle: Float64Array, sampleRate: number, start: number, string: PluckedString): Generator<void, void> {
  const top = Math.min(TOP_HZ, TOP_OF_RATE * sampleRate)
  for (let k = 1; ; k++) {
    const hz = k * string.hz * Math.sqrt(1 + string.stiffness * k * k)
    if (hz > top) return
    const amplitude = (string.amplitude * Math.sin(Math.PI * k * string.pluckAt)) / k
    addPartial(circle, { sampleRate, start, hz, amplitude, loss: string.loss + string.highLoss * hz * hz, heldSeconds: string.heldSeconds })
    yield
  }
}

interface Partial {
  readonly sampleRate: number
  readonly start: number
  readonly hz: number
  readonly amplitude: number
  readonly loss: number
  readonly heldSeconds: number
}

function addPartial(circle: Float64Array, { sampleRate, start, hz, amplitude, loss, heldSeconds }: Partial): void {
  const held = Math.round(heldSeconds * sampleRate)
  const angle = (2 * Math.PI * hz) / sampleRate
  const audible = (level: number, decay: number) => Math.ceil((sampleRate * Math.log(Math.max(1, Math.abs(level) / INAUDIBLE))) / decay)
  const frames = Math.min(held, audible(amplitude, loss))
  addDecayingSine(circle, { start, frames, angle, phase: 0, amplitude, decay: loss / sampleRate })
  if (frames < held) return
  const left = amplitude * Math.exp((-loss * frames) / sampleRate)
  const damped = loss + DAMPED_LOSS
  addDecayingSine(circle, {
    start: start + frames,
    frames: audible(left, damped),
    angle,
    phase: angle * frames,
    amplitude: left,
    decay: damped / sampleRate,
  })
}
