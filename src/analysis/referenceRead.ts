// A read of a line between its samples that is as good as exact: what cheaper reads are measured against. Offline only: it needs samples to
// both sides, so it reads no closer to the newest sample than REFERENCE_REACH.
//
// y(t) = Σ_m x[m] h(t − m), h(t) = sinc(t) w(t/R), |t| < R = REFERENCE_REACH; w is the Kaiser window I0(β √(1 − u²))/I0(β).
// R = 48 (96 taps), β = 14.9: a stop-band of 144 dB over a transition of 0.1 fs about fs/2, so gain and phase are right to −140 dB up to 0.45 fs.
// Sources: A. V. Oppenheim, R. W. Schafer, "Discrete-Time Signal Processing", band-limited interpolation; J. F. Kaiser 1974, β = 0.1102 (A − 8.7),
// length (A − 7.95)/(2.285 Δω) (both from memory; the test holds the read against sines and against numpy).

/** Samples that a read takes to each side. */
export const REFERENCE_REACH = 48

const TAPS = 2 * REFERENCE_REACH
const BETA = 14.9
/** Sets of taps a sample, straight lines between: they miss by ω²/(8 · 4096²), −144 dB at 0.45 fs. */
const PHASES = 4096

let table: Float64Array | undefined
let made: Uint8Array | undefined

/**
 * Adds `scale` · the read of `line` at samples `at` + j − delays[j] to out[j], j = 0 … out.length − 1. Delays in samples, any fraction; the line
 * must reach {@link REFERENCE_REACH} samples further on both sides, or RangeError.
 */
export function addReferenceRead(line: Float64Array, at: number, delays: Float64Array, out: Float64Array, scale = 1): void {
  table ??= new Float64Array((PHASES + 1) * TAPS)
  made ??= new Uint8Array(PHASES + 1)
  for (let j = 0; j < out.length; j++) {
    const place = at + j - (delays[j] as number)
    const whole = Math.floor(place)
    const first = whole - REFERENCE_REACH + 1
    if (!(first >= 0 && first + TAPS <= line.length))
      throw new RangeError(`the reference reads ${REFERENCE_REACH} samples about ${place}, of a line of ${line.length}`)
    const phase = (place - whole) * PHASES
    const row = phase | 0
    if (made[row] === 0) makeRow(row)
    if (made[row + 1] === 0) makeRow(row + 1)
    out[j] = (out[j] as number) + scale * between(table, row * TAPS, phase - row, line, first)
  }
}

/** The sum of samples from `first` on by the taps from `at` on, and by those of the next row, `part` of the way from one to the other. */
function between(taps: Float64Array, at: number, part: number, line: Float64Array, first: number): number {
  const next = (at + TAPS) | 0
  // Two sums each, so that one addition need not wait for the other.
  let [a, b, c, d] = [0, 0, 0, 0]
  for (let k = 0; k < TAPS; k = (k + 2) | 0) {
    const x = line[first + k] as number
    const y = line[first + k + 1] as number
    a += x * (taps[at + k] as number)
    b += x * (taps[next + k] as number)
    c += y * (taps[at + k + 1] as number)
    d += y * (taps[next + k + 1] as number)
  }
  return a + c + part * (b + d - a - c)
}

/** Taps at row/PHASES past a sample: h of the distance to each of the samples read. */
function makeRow(row: number): void {
  const taps = table as Float64Array
  const fraction = row / PHASES
  for (let k = 0; k < TAPS; k++) taps[row * TAPS + k] = tap(fraction + REFERENCE_REACH - 1 - k)
  ;(made as Uint8Array)[row] = 1
}

function tap(t: number): number {
  const u = t / REFERENCE_REACH
  if (Math.abs(u) >= 1) return 0
  const sinc = t === 0 ? 1 : Math.sin(Math.PI * t) / (Math.PI * t)
  return (sinc * besselI0(BETA * Math.sqrt(1 - u * u))) / I0_BETA
}

/** I0(x) = Σ (x²/4)^k / (k!)². */
function besselI0(x: number): number {
  const q = (x * x) / 4
  let term = 1
  let sum = 1
  for (let k = 1; term > 1e-17 * sum; k++) {
    term *= q / (k * k)
    sum += term
  }
  return sum
}

const I0_BETA = besselI0(BETA)
