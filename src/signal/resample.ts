// Sample rate conversion by band-limited interpolation: a Kaiser-windowed sinc, one set of taps a phase.
//
// y[m] = Σ_n x[n] h(m·from/to − n), h(t) = c sinc(c t) w(t/T) for |t| < T, in samples of the slower rate; w is the Kaiser window I0(β √(1 − u²))/I0(β).
// The ratio L/M of the two rates makes L different fractions of m·from/to, so L sets of taps. Samples before the first and after the last are 0.
//
// Why our own: in plain JavaScript the registry has wave-resampler, which leaves images 4 to 30 dB down and shifts by half a sample; the rest is
// WebAssembly or 16-bit streams.
//
// Sources: J. O. Smith, "Digital Audio Resampling Home Page", CCRMA (method; from memory); J. F. Kaiser, "Nonrecursive Digital Filter Design Using the
// I0-sinh Window Function", Proc. IEEE ISCAS 1974 (β = 0.1102 (A − 8.7), length (A − 7.95)/(2.285 Δω); from memory).
//
// Design: stop-band A = 120 dB from the slower rate's Nyquist frequency on, so nothing folds; transition from 0.9 to 1 of it, c in its middle.

import { cubicWeights, kaiserWindow } from './kaiser.ts'

const STOP_DB = 120
const CUTOFF = 0.95
const TRANSITION = 0.1
const BETA = 0.1102 * (STOP_DB - 8.7)
/** Taps reach this many samples of the slower rate to each side: half of (A − 7.95)/(2.285 Δω), Δω = TRANSITION · π. */
export const RESAMPLE_REACH = Math.ceil((STOP_DB - 7.95) / (2.285 * TRANSITION * Math.PI) / 2)

export const MIN_RESAMPLE_RATE = 1000
export const MAX_RESAMPLE_RATE = 768_000
/** Samples a channel that one conversion may give: 2 GiB of doubles. */
export const MAX_RESAMPLED_FRAMES = 2 ** 28
// Ratios of larger whole numbers than this share a grid of phases instead of having each its own.
const MAX_RATIO = 4096
// Phases a sample of the slower rate. Cubic interpolation between them misses the taps by about (π/512)⁴/40, below −180 dB.
const GRID = 512
// Rates are taken to a thousandth of a hertz, so that their ratio is a ratio of whole numbers.
const RATE_STEPS = 1000

type Channel = Float64Array | Float32Array

/**
 * The channels at another rate, aligned: sample m of the result is the band-limited signal at time m/toHz, with no delay. Length ceil(n · toHz/fromHz). fromHz, toHz: {@link MIN_RESAMPLE_RATE} to
 * {@link MAX_RESAMPLE_RATE}, whole thousandths of a hertz. Up to 0.9 of the slower Nyquist frequency the gain is 1 within 0.01 dB; what would fold lies 100 dB down or lower. Equal
 * rates give copies. Deterministic. Throws RangeError for rates out of range and for more than {@link MAX_RESAMPLED_FRAMES}.
 */
export function resampleTo(channels: readonly Channel[], fromHz: number, toHz: number): Float64Array[] {
  const [up, down] = ratio(fromHz, toHz)
  if (up === down) return channels.map((x) => Float64Array.from(x))
  for (const x of channels) {
    const frames = resampledLength(x.length, fromHz, toHz)
    if (frames > MAX_RESAMPLED_FRAMES)
      throw new RangeError(`${x.length} samples make ${frames} at ${toHz} Hz, at most ${MAX_RESAMPLED_FRAMES} are made`)
  }
  const taps = tapSource(up, down)
  return channels.map((x) => convert(x, { up, down }, taps))
}

/** Samples that n samples at fromHz become at toHz: ceil(n · toHz/fromHz), in whole numbers. */
export function resampledLength(frames: number, fromHz: number, toHz: number): number {
  const [up, down] = ratio(fromHz, toHz)
  return lengthOf(frames, up, down)
}

function lengthOf(frames: number, up: number, down: number): number {
  return Number((BigInt(frames) * BigInt(up) + BigInt(down) - 1n) / BigInt(down))
}

/** Taps of one phase: h at the distances phase/up − k for k = −reach + 1 … reach. */
type TapSource = { readonly reach: number; taps(phase: number): Float64Array }

function convert(x: Channel, { up, down }: { up: number; down: number }, source: TapSource): Float64Array {
  const { reach } = source
  const out = new Float64Array(lengthOf(x.length, up, down))
  // Position of output m in the input: whole + phase/up.
  let whole = 0
  let phase = 0
  const step = Math.floor(down / up)
  const stepPhase = down % up
  for (let m = 0; m < out.length; m++) {
    const taps = source.taps(phase)
    const first = whole - reach + 1
    const from = Math.max(0, -first)
    const to = Math.min(taps.length, x.length - first)
    let sum = 0
    for (let i = from; i < to; i++) sum += (taps[i] as number) * (x[first + i] as number)
    out[m] = sum
    whole += step
    phase += stepPhase
    if (phase >= up) {
      phase -= up
      whole++
    }
  }
  return out
}

let kaiser: ((u: number) => number) | undefined

function tapSource(up: number, down: number): TapSource {
  // In input samples: downwards the sinc stretches with the slower output rate.
  const stretch = Math.max(1, down / up)
  const reach = Math.ceil(RESAMPLE_REACH * stretch) + 1
  kaiser ??= kaiserWindow(BETA)
  const window = kaiser
  const tapsAt = (fraction: number): Float64Array => {
    const taps = new Float64Array(2 * reach)
    let sum = 0
    for (let i = 0; i < taps.length; i++) {
      const t = (fraction + reach - 1 - i) / stretch
      const value = sinc(CUTOFF * t) * window(Math.abs(t) / RESAMPLE_REACH)
      taps[i] = value
      sum += value
    }
    // Every phase passes 0 Hz exactly: otherwise their differences would put a tone of their own under a constant.
    return taps.map((value) => value / sum)
  }
  return Math.max(up, down) <= MAX_RATIO
    ? exactPhases(up, reach, tapsAt)
    : griddedPhases({ up, reach, grid: Math.ceil(GRID / stretch) }, tapsAt)
}

function exactPhases(up: number, reach: number, tapsAt: (fraction: number) => Float64Array): TapSource {
  const kept: (Float64Array | undefined)[] = new Array(up)
  return {
    reach,
    taps: (phase) => {
      kept[phase] ??= tapsAt(phase / up)
      return kept[phase]
    },
  }
}

function griddedPhases(
  { up, reach, grid }: { up: number; reach: number; grid: number },
  tapsAt: (fraction: number) => Float64Array,
): TapSource {
  const sets = Array.from({ length: grid + 3 }, (_, i) => tapsAt((i - 1) / grid))
  const taps = new Float64Array(2 * reach)
  return {
    reach,
    taps: (phase) => {
      const at = (phase / up) * grid
      const i = Math.floor(at)
      const [wa, wb, wc, wd] = cubicWeights(at - i)
      const [a, b, c, d] = [sets[i] as Float64Array, sets[i + 1] as Float64Array, sets[i + 2] as Float64Array, sets[i + 3] as Float64Array]
      for (let k = 0; k < taps.length; k++) {
        taps[k] = wa * (a[k] as number) + wb * (b[k] as number) + wc * (c[k] as number) + wd * (d[k] as number)
      }
      return taps
    },
  }
}

function ratio(fromHz: number, toHz: number): [up: number, down: number] {
  const [from, to] = [wholeSteps('fromHz', fromHz), wholeSteps('toHz', toHz)]
  let [a, b] = [from, to]
  while (b > 0) [a, b] = [b, a % b]
  return [to / a, from / a]
}

function wholeSteps(name: string, hz: number): number {
  const steps = Math.round(hz * RATE_STEPS)
  if (!(hz >= MIN_RESAMPLE_RATE && hz <= MAX_RESAMPLE_RATE) || Math.abs(steps / RATE_STEPS - hz) > 1e-9 * hz) {
    throw new RangeError(`${name} must be ${MIN_RESAMPLE_RATE} to ${MAX_RESAMPLE_RATE} Hz in steps of ${1 / RATE_STEPS} Hz, got ${hz}`)
  }
  return steps
}

function sinc(x: number): number {
  return x === 0 ? 1 : Math.sin(Math.PI * x) / (Math.PI * x)
}
