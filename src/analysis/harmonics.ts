// What a shaper makes of a sine: its harmonics, exactly, before anything is sampled.
import { CHUNK } from '../dsp/line.ts'
import { applyShaper, createShaper } from '../dsp/shaper.ts'
import type { Shaper } from '../set/types.ts'
import { type Nodes, panelNodes } from './harmonicsPanels.ts'

export interface DrivenSine {
  /** [n], n ≥ 1: signed amplitude of cos nψ in the answer to a sine of the given amplitude; [0]: the mean, DC. */
  readonly amplitudes: Float64Array
  /** rms of all harmonics above the last of `amplitudes`. */
  readonly restRms: number
}

/**
 * Fourier coefficients of shaper(amplitude · cos ψ), harmonics 0 to `count`: c_n = (2/π) ∫₀^π shaper(A cos ψ) cos nψ dψ, c_0 half of that. For the rest
 * the known harmonics are taken away before squaring, so that a rest of 1e-15 of the output is still seen.
 *
 * With `radiansPerSample` ω > 0 and antialias `adaa1`: of the mean between neighbouring samples, ½ ∫ shaper(A cos(ω/2) cos ψ + u A sin(ω/2) sin ψ) du over u
 * from −1 to 1, ψ midway between them. It is as exact: what adaa1 puts out depends on ψ alone.
 *
 * amplitude > 0; count 1 to 4096; ω in [0, π). Errors about 1e-15 of the output's size (adaa1 of smooth curves 1e-13). Throws RangeError outside.
 */
export function drivenSine(p: Shaper, amplitude: number, count: number, radiansPerSample = 0): DrivenSine {
  if (!(amplitude > 0 && amplitude < Number.POSITIVE_INFINITY)) throw new RangeError(`amplitude must be above 0, got ${amplitude}`)
  if (!(Number.isInteger(count) && count >= 1 && count <= 4096))
    throw new RangeError(`count must be a whole number from 1 to 4096, got ${count}`)
  if (!(radiansPerSample >= 0 && radiansPerSample < Math.PI))
    throw new RangeError(`radiansPerSample must be in [0, π), got ${radiansPerSample}`)
  const spread = p.antialias === 'adaa1' ? radiansPerSample / 2 : 0
  // Halves alike: the second quarter is the first mirrored and negated, so even harmonics are exactly none.
  const odd = p.positive === p.negative
  const nodes = panelNodes(p, amplitude, spread, count, odd ? Math.PI / 2 : Math.PI)
  const values = spread > 0 ? means(p, amplitude, spread, nodes) : curveValues(p, amplitude, nodes)
  const amplitudes = new Float64Array(count + 1)
  const share = (odd ? 2 : 1) / Math.PI
  for (let n = odd ? 1 : 0; n <= count; n += odd ? 2 : 1) {
    let sum = 0
    for (let i = 0; i < values.length; i++) sum += nodes.weights[i]! * values[i]! * Math.cos(n * nodes.angles[i]!)
    amplitudes[n] = sum * share * (n === 0 ? 1 : 2)
  }
  let rest = 0
  for (let i = 0; i < values.length; i++) {
    let left = values[i]!
    for (let n = odd ? 1 : 0; n <= count; n += odd ? 2 : 1) left -= amplitudes[n]! * Math.cos(n * nodes.angles[i]!)
    rest += nodes.weights[i]! * left * left
  }
  return { amplitudes, restRms: Math.sqrt(rest * share) }
}

function curveValues(p: Shaper, amplitude: number, { angles }: Nodes): Float64Array {
  const values = angles.map((angle) => amplitude * Math.cos(angle))
  for (let at = 0; at < values.length; at += CHUNK) applyShaper(p, values, at, Math.min(CHUNK, values.length - at))
  return values
}

function means(p: Shaper, amplitude: number, spread: number, { angles }: Nodes): Float64Array {
  const { mean } = createShaper(p)
  return angles.map((angle) => mean(amplitude * Math.cos(angle - spread), amplitude * Math.cos(angle + spread)))
}

/** Level of a harmonic against the first, dB; null where it is nothing but rounding, or where there is no first. */
export function harmonicDb(sine: DrivenSine, n: number): number | null {
  return relativeDb(Math.abs(sine.amplitudes[n] ?? 0), Math.abs(sine.amplitudes[1] ?? 0), largestOf(sine))
}

/** √(Σ_{n ≥ 2} c_n²)/|c_1|, of all harmonics there are; null without a first. */
export function totalDistortion(sine: DrivenSine): number | null {
  const first = Math.abs(sine.amplitudes[1] ?? 0)
  if (!(first > LEAST * largestOf(sine))) return null
  let squares = 2 * sine.restRms * sine.restRms
  for (let n = 2; n < sine.amplitudes.length; n++) squares += sine.amplitudes[n]! * sine.amplitudes[n]!
  return Math.sqrt(squares) / first
}

/** Parts smaller than this of the whole are rounding. */
const LEAST = 1e-14

const largestOf = ({ amplitudes, restRms }: DrivenSine): number =>
  amplitudes.reduce((largest, c) => Math.max(largest, Math.abs(c)), restRms)

/** 20 log10(part/whole), null where either is only rounding of `size`. */
export function relativeDb(part: number, whole: number, size: number): number | null {
  return part > LEAST * size && whole > LEAST * size ? 20 * Math.log10(part / whole) : null
}
