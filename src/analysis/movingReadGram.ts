// Is the read operator R, y[n] = Σ h_k(D[n]) w[n − k], of norm below t over a given movement? Exactly when t² I − RᵀR is positive definite, and every row
// of R touches at most four neighbouring samples, so RᵀR has seven diagonals however the delay moves: its LDLᵀ factors are streamed in one pass and all
// pivots must be positive. Source: Sylvester's law of inertia.
//
// Invariant: column m of RᵀR is complete once every row n' that follows has n' − (largest whole delay) − 2 > m. Columns wait in a ring until then.
import { firstTap } from '../dsp/interpolators.ts'
import type { Interpolation } from '../set/types.ts'

const DIAGONALS = 4
/** Rows added between two goes at factoring, a power of two. */
const TOGETHER = 64

export interface GramTest {
  readonly kind: Exclude<Interpolation, 'allpass1'>
  readonly square: number
  /** Largest and smallest whole delay that may come. */
  readonly longest: number
  readonly mask: number
  /** Upper half of RᵀR, column m at DIAGONALS · (m & mask): entries (m, m) … (m, m+3). */
  readonly band: Float64Array
  /** Next column to factor; null before the first row. */
  column: number | null
  /** Pivots d of the last three columns and L's entries between them. */
  readonly state: { d1: number; d2: number; d3: number; l21: number; l31: number; l32: number }
  /** False as soon as one pivot was not positive: the norm is not below t. */
  positive: boolean
}

/** A fresh test for norm < t of reads between `shortest` and `longest` samples. */
export function createGramTest(
  kind: GramTest['kind'],
  t: number,
  range: { readonly shortest: number; readonly longest: number },
): GramTest {
  const span = Math.ceil(range.longest) - Math.floor(range.shortest) + 16 + TOGETHER
  const size = 2 ** Math.ceil(Math.log2(span))
  return {
    kind,
    square: t * t,
    longest: Math.ceil(range.longest) + 1,
    mask: size - 1,
    band: new Float64Array(DIAGONALS * size),
    column: null,
    state: { d1: 1, d2: 1, d3: 1, l21: 0, l31: 0, l32: 0 },
    positive: true,
  }
}

const taps = new Float64Array(4)

/** Taps of the read, oldest first, into `taps`; returns how many. The weights of tapsOf, without its array. */
function loadTaps(kind: GramTest['kind'], f: number): number {
  switch (kind) {
    case 'nearest':
      taps[0] = 1
      return 1
    case 'linear':
      taps[0] = f
      taps[1] = 1 - f
      return 2
    case 'lagrange3':
      taps[3] = (-f * (f - 1) * (f - 2)) / 6
      taps[2] = ((f + 1) * (f - 1) * (f - 2)) / 2
      taps[1] = (-(f + 1) * f * (f - 2)) / 2
      taps[0] = ((f + 1) * f * (f - 1)) / 6
      return 4
    case 'hermite4':
      taps[3] = ((-f + 2) * f - 1) * f * 0.5
      taps[2] = (3 * f - 5) * f * f * 0.5 + 1
      taps[1] = ((-3 * f + 4) * f + 1) * f * 0.5
      taps[0] = (f - 1) * f * f * 0.5
      return 4
  }
}

/** Adds the rows first, first + 1, … with these delays (samples) and factors every column they complete. Returns `positive`. */
export function addRows(test: GramTest, first: number, delays: Float64Array, count = delays.length): boolean {
  const { kind, mask, band } = test
  const half = kind === 'nearest' ? 0.5 : 0
  const points = kind === 'nearest' ? 1 : kind === 'linear' ? 2 : 4
  const back = firstTap(kind) + points - 1
  test.column ??= first - test.longest - 4
  for (let i = 0; i < count && test.positive; i++) {
    const delay = delays[i] as number
    const whole = Math.floor(delay + half)
    loadTaps(kind, delay - whole)
    const oldest = first + i - whole - back
    for (let a = 0; a < points; a++) {
      const at = DIAGONALS * ((oldest + a) & mask)
      const h = taps[a] as number
      for (let b = a; b < points; b++) band[at + b - a] = (band[at + b - a] as number) + h * (taps[b] as number)
    }
    // The columns a block of rows completes are factored together; the ring has room for them.
    if ((i & (TOGETHER - 1)) === TOGETHER - 1) factorUpTo(test, first + i - test.longest - 3)
  }
  factorUpTo(test, first + count - 1 - test.longest - 3)
  return test.positive
}

/** Factors what is left once no row follows; true when every pivot was positive. */
export function finishGramTest(test: GramTest, lastRow: number): boolean {
  factorUpTo(test, lastRow + 1)
  return test.positive
}

/** Pivots of the columns before `end`: d = S_mm − Σ l² d over the three columns before, S = t² I − RᵀR. */
function factorUpTo(test: GramTest, end: number): void {
  if (test.column === null) return
  const { band, mask, state } = test
  let { d1, d2, d3, l21, l31, l32 } = state
  let m = test.column
  for (; m < end; m++) {
    const at = DIAGONALS * (m & mask)
    const g0 = band[at] as number
    const g1 = band[DIAGONALS * ((m - 1) & mask) + 1] as number
    const g2 = band[DIAGONALS * ((m - 2) & mask) + 2] as number
    const g3 = band[DIAGONALS * ((m - 3) & mask) + 3] as number
    // The column four back is not needed again: its place is free for a later one.
    const old = DIAGONALS * ((m - 4) & mask)
    band[old] = 0
    band[old + 1] = 0
    band[old + 2] = 0
    band[old + 3] = 0
    const v3 = -g3
    const v2 = -g2 - v3 * l32
    const v1 = -g1 - v3 * l31 - v2 * l21
    const l3 = v3 / d3
    const l2 = v2 / d2
    const l1 = v1 / d1
    const d = test.square - g0 - v3 * l3 - v2 * l2 - v1 * l1
    if (!(d > 0)) {
      test.positive = false
      break
    }
    d3 = d2
    d2 = d1
    d1 = d
    l32 = l21
    l21 = l1
    l31 = l2
  }
  test.column = m
  state.d1 = d1
  state.d2 = d2
  state.d3 = d3
  state.l21 = l21
  state.l31 = l31
  state.l32 = l32
}
