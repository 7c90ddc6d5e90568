// The same question for the all-pass read, whose own state makes R = L⁻¹B: y[n] + η_n y[n−1] = η_n w[n−M] + w[n−M−1]. ‖R‖ < t exactly when
// t² L Lᵀ − B Bᵀ is positive definite, a band in the rows instead of the columns: rows share samples only with rows that read within one sample.
// Source: as movingReadGram.ts.
import { allpassCoefficient } from '../dsp/interpolators.ts'

/** Rows back with which a row may share samples; a read that runs backwards shares with more and is not decided here. */
const BAND = 12
/** Rows kept, a power of two above BAND. */
const SIZE = 16
const MASK = SIZE - 1

export interface AllpassTest {
  readonly square: number
  /** Rows seen so far. */
  rows: number
  /** η and oldest sample read, of the last rows, by row modulo SIZE. */
  readonly eta: Float64Array
  readonly oldest: Float64Array
  readonly pivot: Float64Array
  /** L of the factorisation: entry (row, row − j) at SIZE · (row mod SIZE) + j. */
  readonly factor: Float64Array
  readonly row: Float64Array
  positive: boolean
}

export function createAllpassTest(t: number): AllpassTest {
  return {
    square: t * t,
    rows: 0,
    eta: new Float64Array(SIZE),
    oldest: new Float64Array(SIZE),
    pivot: new Float64Array(SIZE),
    factor: new Float64Array(SIZE * SIZE),
    row: new Float64Array(SIZE),
    positive: true,
  }
}

/** Adds the rows first, first + 1, … with these delays (samples). False when the norm is not below t, or cannot be told. */
export function addAllpassRows(test: AllpassTest, first: number, delays: Float64Array, count = delays.length): boolean {
  for (let i = 0; i < count && test.positive; i++) {
    const delay = delays[i] as number
    const whole = Math.floor(delay - 0.5)
    const n = test.rows++
    test.eta[n & MASK] = allpassCoefficient(delay - whole)
    test.oldest[n & MASK] = first + i - whole - 1
    const band = loadRow(test, n)
    test.positive = band >= 0 && factorRow(test, n, band)
  }
  return test.positive
}

/** S(n, n − j) of S = t² L Lᵀ − B Bᵀ into `row`; returns the largest j in use, −1 when rows beyond the band may be needed. */
function loadRow({ square, eta, oldest, row }: AllpassTest, n: number): number {
  const e = eta[n & MASK] as number
  const sample = oldest[n & MASK] as number
  row[0] = square * (1 + (n > 0 ? e * e : 0)) - (1 + e * e)
  for (let j = 1; j <= Math.min(BAND, n); j++) {
    const apart = sample - (oldest[(n - j) & MASK] as number)
    if (apart < 0) return -1
    // No row before this one reads later than the row after it: once they are two samples apart, all before are.
    if (apart > 1 && j > 1) return j - 1
    const f = eta[(n - j) & MASK] as number
    row[j] = (apart === 0 ? -(1 + e * f) : apart === 1 ? -f : 0) + (j === 1 ? square * e : 0)
    if (apart > 1) return 1
  }
  return n < BAND ? n : -1
}

/** v(n, n−j) = S(n, n−j) − Σ_{k>j} v(n, n−k) L(n−j, n−k); d = S(n, n) − Σ v²/d. True when d is positive. */
function factorRow({ row, factor, pivot }: AllpassTest, n: number, band: number): boolean {
  const own = SIZE * (n & MASK)
  for (let j = 1; j <= BAND; j++) factor[own + j] = 0
  let d = row[0] as number
  for (let j = band; j > 0; j--) {
    const slot = (n - j) & MASK
    let v = row[j] as number
    for (let k = j + 1; k <= band; k++) v -= (row[k] as number) * (factor[SIZE * slot + k - j] as number)
    row[j] = v
    const l = v / (pivot[slot] as number)
    factor[own + j] = l
    d -= v * l
  }
  pivot[n & MASK] = d
  return d > 0
}
