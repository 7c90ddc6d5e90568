// The same question for the all-pass read, whose own state makes R = L⁻¹B: y[n] + η_n y[n−1] = η_n w[n−M] + w[n−M−1]. ‖R‖ < t exactly when
// t² L Lᵀ − B Bᵀ is positive definite, a band in the rows instead of the columns: rows share samples only with rows that read within one sample.
// Source: as movingReadGram.ts.
import { allpassCoefficient, splitDelay } from '../dsp/interpolators.ts'

/** Rows back with which a row may share samples; a read that runs backwards shares with more and is not decided here. */
const BAND = 12
const SIZE = BAND + 1

export interface AllpassTest {
  readonly square: number
  /** Rows seen so far. */
  rows: number
  /** η and oldest sample read, of the last BAND + 1 rows, by row modulo BAND + 1. */
  readonly eta: Float64Array
  readonly oldest: Float64Array
  readonly pivot: Float64Array
  /** L of the factorisation: entry (row, row − j) at (BAND + 1) · (row mod (BAND + 1)) + j. */
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
    const { whole, fraction } = splitDelay('allpass1', delays[i] as number)
    const n = test.rows++
    test.eta[n % SIZE] = allpassCoefficient(fraction)
    test.oldest[n % SIZE] = first + i - whole - 1
    const band = loadRow(test, n)
    test.positive = band >= 0 && factorRow(test, n, band)
  }
  return test.positive
}

/** S(n, n − j) of S = t² L Lᵀ − B Bᵀ into `row`; returns the largest j in use, −1 when rows beyond the band may be needed. */
function loadRow({ square, eta, oldest, row }: AllpassTest, n: number): number {
  const e = eta[n % SIZE] as number
  const sample = oldest[n % SIZE] as number
  let band = 0
  for (let j = 0; j <= Math.min(BAND, n); j++) {
    const f = eta[(n - j) % SIZE] as number
    const apart = sample - (oldest[(n - j) % SIZE] as number)
    if (apart < 0 || (j === BAND && apart <= 1)) return -1
    let s = apart === 0 ? -(1 + e * f) : apart === 1 ? -f : 0
    if (j === 0) s += square * (1 + (n > 0 ? e * e : 0))
    if (j === 1) s += square * e
    row[j] = s
    if (s !== 0) band = j
  }
  return band
}

/** v(n, n−j) = S(n, n−j) − Σ_{k>j} v(n, n−k) L(n−j, n−k); d = S(n, n) − Σ v²/d. True when d is positive. */
function factorRow({ row, factor, pivot }: AllpassTest, n: number, band: number): boolean {
  const own = SIZE * (n % SIZE)
  factor.fill(0, own, own + SIZE)
  let d = row[0] as number
  for (let j = band; j > 0; j--) {
    const slot = (n - j) % SIZE
    let v = row[j] as number
    for (let k = j + 1; k <= band; k++) v -= (row[k] as number) * (factor[SIZE * slot + k - j] as number)
    row[j] = v
    const l = v / (pivot[slot] as number)
    factor[own + j] = l
    d -= v * l
  }
  pivot[n % SIZE] = d
  return d > 0
}
