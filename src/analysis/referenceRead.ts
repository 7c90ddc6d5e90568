// A read of a line between its samples that is as good as exact: what cheaper reads are measured against. Offline only: it needs samples to
// both sides, so it reads no closer to the newest sample than REFERENCE_REACH.
//
// y(t) = Σ_m x[m] h(t − m), h(t) = sinc(t) w(t/R), |t| < R = REFERENCE_REACH; w is the Kaiser window I0(β √(1 − u²))/I0(β).
// R = 48 (96 taps), β = 14.9: a stop-band of 144 dB over a transition of 0.1 fs about fs/2, so gain and phase are right to −140 dB up to 0.45 fs.
// Sources: A. V. Oppenheim, R. W. Schafer, "Discrete-Time Signal Processing", band-limited interpolation; J. F. Kaiser 1974, β = 0.1102 (A − 8.7),
// length (A − 7.95)/(2.285 Δω) (both from memory; the test holds the read against sines and against numpy).

import { kaiserWindow } from '../signal/kaiser.ts'

/** Samples that a read takes to each side. */
export const REFERENCE_REACH = 48

const TAPS = 2 * REFERENCE_REACH
const BETA = 14.9
/** Sets of taps a sample, straight lines between: they miss by ω²/(8 · 4096²), −144 dB at 0.45 fs. */
const PHASES = 4096

let window: ((u: number) => number) | undefined
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

/**
 * Taps at row/PHASES past a sample: h of the distance t to each of the samples read. And those of the rest of the way to the next sample, which are the
 * same the other way round. sin πt is the same but for its sign at all of them.
 */
function makeRow(row: number): void {
  window ??= kaiserWindow(BETA)
  const taps = table as Float64Array
  const fraction = row / PHASES
  const sine = Math.sin(Math.PI * fraction) / Math.PI
  const mirrored = PHASES - row
  for (let k = 0; k < TAPS; k++) {
    const whole = REFERENCE_REACH - 1 - k
    const t = fraction + whole
    const sinc = t === 0 ? 1 : (whole & 1 ? -sine : sine) / t
    const tap = sinc * window(Math.abs(t) / REFERENCE_REACH)
    taps[row * TAPS + k] = tap
    taps[mirrored * TAPS + TAPS - 1 - k] = tap
  }
  const flags = made as Uint8Array
  flags[row] = 1
  flags[mirrored] = 1
}
