// Discrete Fourier transforms of real signals, on fft.js (radix 4). Plans are kept: one a size, 31 at most.
import FFT from 'fft.js'

/** Bins 0 … N/2 of the transform of N real samples; the rest is their mirror. */
export interface Spectrum {
  readonly re: Float64Array
  readonly im: Float64Array
}

const MAX_SIZE = 2 ** 27
const plans = new Map<number, FFT>()

/** The smallest power of two ≥ n, n in [1, 2^27]. */
export function nextPowerOfTwo(n: number): number {
  if (!(n >= 1 && n <= MAX_SIZE)) throw new RangeError(`a transform has 1 to ${MAX_SIZE} points, got ${n}`)
  return 2 ** Math.ceil(Math.log2(n))
}

/**
 * X[k] = Σ x[n] e^(−2πi kn/N), k = 0 … N/2, not scaled. x: real samples, padded with zeros to N = `size`, a power of two in [2, 2^27],
 * by default the smallest that holds x. Throws RangeError when `size` is none or x is longer.
 */
export function realFft(x: Float64Array | Float32Array, size = Math.max(2, nextPowerOfTwo(Math.max(1, x.length)))): Spectrum {
  const plan = planOf(size)
  if (x.length > size) throw new RangeError(`${x.length} samples do not fit a transform of ${size} points`)
  const data = new Float64Array(size)
  data.set(x)
  const out = new Float64Array(2 * size)
  plan.realTransform(out, data)
  const half = size / 2
  const re = new Float64Array(half + 1)
  const im = new Float64Array(half + 1)
  for (let k = 0; k <= half; k++) {
    re[k] = out[2 * k] as number
    im[k] = out[2 * k + 1] as number
  }
  return { re, im }
}

/** The N = 2 (bins − 1) real samples of a {@link realFft}: x[n] = 1/N Σ X[k] e^(2πi kn/N). N must be a power of two ≥ 2. */
export function inverseRealFft({ re, im }: Spectrum): Float64Array {
  if (re.length !== im.length) throw new RangeError(`re has ${re.length} bins, im has ${im.length}`)
  const size = 2 * (re.length - 1)
  const plan = planOf(size)
  const spectrum = new Float64Array(2 * size)
  for (let k = 0; k < re.length; k++) {
    spectrum[2 * k] = re[k] as number
    spectrum[2 * k + 1] = im[k] as number
  }
  plan.completeSpectrum(spectrum)
  const out = new Float64Array(2 * size)
  plan.inverseTransform(out, spectrum)
  const x = new Float64Array(size)
  for (let n = 0; n < size; n++) x[n] = out[2 * n] as number
  return x
}

function planOf(size: number): FFT {
  if (!(size >= 2 && size <= MAX_SIZE && Number.isInteger(Math.log2(size)))) {
    throw new RangeError(`a transform needs a power of two from 2 to ${MAX_SIZE} points, got ${size}`)
  }
  let plan = plans.get(size)
  if (!plan) {
    plan = new FFT(size)
    plans.set(size, plan)
  }
  return plan
}
