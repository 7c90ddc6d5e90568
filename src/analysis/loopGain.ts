// The open loop of a frozen set against frequency, for the Loop plot, and its summary for a page that moves.
import type { Frozen } from './frozen.ts'
import { type LoopLine, logGain, logGainResult, loopLine, wrapAngle } from './loopLine.ts'
import { loopParts } from './loopPair.ts'
import { lineMax } from './norms.ts'
import { largestPole, ringSeconds } from './poles.ts'

export interface LoopGainCurve {
  /** Line this curve belongs to. */
  readonly line: number
  /**
   * `line`: g · slope · A · F of a line that is not crossed with another. `eigenvalue`: one of the two eigenvalues of g · slope · F X diag(A₀, A₁), the larger
   * first: the loop rings where one of them comes to 1, as a single line does.
   */
  readonly kind: 'line' | 'eigenvalue'
  readonly frequenciesHz: Float64Array
  /** 20 log10, floor −400. */
  readonly db: Float64Array
  /** In [−π, π]. */
  readonly phaseRad: Float64Array
}

const FLOOR_DB = -400
const scratch = logGainResult()

/** Loop gain at the given frequencies (each in [0, fs/2], Hz), one curve a line; small signals: the shaper counts by its slope. */
export function loopGain(frozen: Frozen, frequenciesHz: ArrayLike<number>): LoopGainCurve[] {
  const { loop, sampleRate } = frozen
  const gain = loop.gain * loop.slope.slope
  const lines = loop.reads.map((read) => loopLine(loop, gain, [read]))
  const crossed = lines.length === 2 && loop.crossFeed > 0
  const curves = lines.map(
    (_, line): LoopGainCurve => ({
      line,
      kind: crossed ? 'eigenvalue' : 'line',
      frequenciesHz: Float64Array.from(frequenciesHz),
      db: new Float64Array(frequenciesHz.length),
      phaseRad: new Float64Array(frequenciesHz.length),
    }),
  )
  for (let i = 0; i < frequenciesHz.length; i++) {
    const hz = frequenciesHz[i] as number
    if (!(hz >= 0 && hz <= sampleRate / 2)) throw new RangeError(`frequenciesHz[${i}] must be in [0, ${sampleRate / 2}] Hz, got ${hz}`)
    const theta = (2 * Math.PI * hz) / sampleRate
    const values = lines.map((line) => gainAt(line, theta))
    const shown = crossed ? eigenvalues(loop.crossFeed, values as [Complex, Complex]) : values
    shown.forEach((value, line) => {
      const curve = curves[line] as LoopGainCurve
      curve.db[i] = Math.max(FLOOR_DB, 20 * Math.log10(Math.hypot(...value)))
      curve.phaseRad[i] = Math.atan2(value[1], value[0])
    })
  }
  return curves
}

type Complex = readonly [number, number]

function gainAt(line: LoopLine, theta: number): Complex {
  if (line.gain === 0) return [0, 0]
  logGain(line, 0, theta, scratch)
  const size = Math.exp(scratch.ln)
  if (!(size > 0)) return [0, 0]
  const angle = wrapAngle(scratch.phase - line.delay * theta)
  return [size * Math.cos(angle), size * Math.sin(angle)]
}

/** Eigenvalues of X diag(a, b), larger first: λ² − (1−k)(a + b) λ + (1−2k) a b = 0. */
function eigenvalues(k: number, [a, b]: readonly [Complex, Complex]): [Complex, Complex] {
  const tRe = ((1 - k) * (a[0] + b[0])) / 2
  const tIm = ((1 - k) * (a[1] + b[1])) / 2
  const both = 1 - 2 * k
  const dRe = tRe * tRe - tIm * tIm - both * (a[0] * b[0] - a[1] * b[1])
  const dIm = 2 * tRe * tIm - both * (a[0] * b[1] + a[1] * b[0])
  const size = Math.hypot(dRe, dIm)
  const rRe = Math.sqrt((size + dRe) / 2)
  const rIm = Math.sign(dIm || 1) * Math.sqrt(Math.max(0, (size - dRe) / 2))
  const plus: Complex = [tRe + rRe, tIm + rIm]
  const minus: Complex = [tRe - rRe, tIm - rIm]
  return Math.hypot(...plus) >= Math.hypot(...minus) ? [plus, minus] : [minus, plus]
}

export interface LoopSummary {
  /** Largest loop gain over frequency at this position, linear; of two lines the larger. */
  readonly gain: number
  /** Largest pole radius at this position; null without a loop. */
  readonly radius: number | null
  /** 60 dB decay of that pole, s; null when it does not fall, or without a loop. */
  readonly ringSeconds: number | null
}

/** What a moving page shows of the loop at this position. Under 2 ms for usual sets. */
export function loopSummary(frozen: Frozen): LoopSummary {
  const { lines } = loopParts({ ...frozen.loop, crossFeed: 0 })
  const gain = frozen.loop.gain === 0 ? 0 : Math.max(...lines.map((line) => lineMax(line).value))
  const pole = largestPole(frozen)
  return { gain, radius: pole?.radius ?? null, ringSeconds: pole && ringSeconds(pole.lnRadius, frozen.sampleRate) }
}
