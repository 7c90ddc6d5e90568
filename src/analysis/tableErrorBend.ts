// How sharply a shaper bends: max|f''| of its smooth curves, corners of the others. In x of shaper(x), f = ceiling · P k(drive · x/P), so f'' = ceiling · drive²/P · k''.
import { DIODE_I, DIODE_V } from '../dsp/shaperCurves.ts'
import type { Shaper } from '../set/types.ts'

/** t of the largest |k''| and its size; t is where it is reached, or would be if the range went on. */
interface Bend {
  readonly t: number
  readonly second: (t: number) => number
}

/** u/(1 + u²)² is largest at 1/√3; tanh'' at tanh² = 1/3; the diode's where 2q C² − C − 3q = 0, C = cosh(v/V), q = I/V. */
function bendOf(curve: Shaper['curve']): Bend | null {
  if (curve === 'tanh') return { t: Math.atanh(Math.sqrt(1 / 3)), second: (t) => 2 * Math.tanh(t) * (1 - Math.tanh(t) ** 2) }
  if (curve === 'cubic') return { t: 1.5, second: (t) => (8 * Math.min(t, 1.5)) / 9 }
  if (curve === 'arctan') {
    const second = (t: number) => (Math.PI * ((Math.PI / 2) * t)) / (1 + ((Math.PI / 2) * t) ** 2) ** 2
    return { t: 2 / (Math.PI * Math.sqrt(3)), second }
  }
  if (curve !== 'diode') return null
  const q = DIODE_I / DIODE_V
  const v = DIODE_V * Math.acosh((1 + Math.sqrt(1 + 24 * q * q)) / (4 * q))
  return { t: v + DIODE_I * Math.sinh(v / DIODE_V), second: diodeSecond }
}

/** |d²v/dt²| of t = v + I sinh(v/V): (q/V) sinh w/(1 + q cosh w)³, w = v/V. */
function diodeSecond(t: number): number {
  const q = DIODE_I / DIODE_V
  let w = Math.min(t / DIODE_V, Math.asinh(t / DIODE_I))
  for (let i = 0; i < 40; i++) w -= (DIODE_V * w + DIODE_I * Math.sinh(w) - t) / (DIODE_V + DIODE_I * Math.cosh(w))
  return ((q / DIODE_V) * Math.sinh(w)) / (1 + q * Math.cosh(w)) ** 3
}

/** Both halves as signed limits: x of a t is t · limit/drive. */
export const halves = ({ positive, negative }: Pick<Shaper, 'positive' | 'negative'>): readonly number[] => [positive, -negative]

/** max|f''| over ±range of a curve without corners; 0 for curves of straight lines. */
export function steepestBend(p: Shaper, range: number): number {
  const bend = bendOf(p.curve)
  if (bend === null) return 0
  const { t, second } = bend
  const sizes = halves(p).map(
    (limit) => ((p.ceiling * p.drive * p.drive) / Math.abs(limit)) * second(Math.min(t, (p.drive * range) / Math.abs(limit))),
  )
  return Math.max(...sizes)
}

/** x where |f''| is largest, one a half. */
export function bendPlaces(p: Shaper): number[] {
  const bend = bendOf(p.curve)
  return bend === null ? [] : halves(p).map((limit) => (bend.t * limit) / p.drive)
}

export interface Corner {
  readonly x: number
  /** |Change of slope| of shaper(x) there. */
  readonly change: number
}

/** Corners of shaper(x) inside ±range, rising x. */
export function shaperCorners(p: Shaper, range: number): Corner[] {
  const found = halves(p).flatMap((limit) =>
    curveCorners(p).map(({ t, change }) => ({ x: (t * limit) / p.drive, change: p.ceiling * p.drive * change })),
  )
  return found.filter(({ x, change }) => Math.abs(x) < range && change > 0).sort((a, b) => a.x - b.x)
}

/** Corners of k(t), t > 0, with the size of their change of slope. */
function curveCorners({ curve, deadZone, points }: Shaper): { readonly t: number; readonly change: number }[] {
  if (curve === 'hardClip') return [{ t: 1, change: 1 }]
  // At 0 the two halves' slopes meet.
  if (curve === 'deadZone') return deadZone > 0 ? [{ t: deadZone, change: 1 }] : []
  if (curve !== 'drawn') return []
  const slopes = points.slice(1).map(([t, k], i) => (k - points[i]![1]) / (t - points[i]![0]))
  return points.slice(1).map(([t], i) => ({ t, change: Math.abs((slopes[i + 1] ?? 0) - slopes[i]!) }))
}

/** Largest sum of changes within one interval of a table: what corners closer than an interval can do together. */
export function worstCorners(corners: readonly Corner[], step: number): number {
  let worst = 0
  corners.forEach(({ x }, i) => {
    let sum = 0
    for (let k = i; k < corners.length && corners[k]!.x - x < step; k++) sum += corners[k]!.change
    worst = Math.max(worst, sum)
  })
  return worst
}

/** Largest |shaper(x) − held end| beyond ±range; null where the curve has no end (diode, dead zone). */
export function beyondEnds(p: Shaper, range: number, curve: (x: number) => number): number | null {
  if (p.curve === 'diode' || p.curve === 'deadZone') return null
  const sizes = halves(p).map((limit) => {
    const end = curve(Math.sign(limit) * range)
    const last = p.curve === 'drawn' ? (p.points.at(-1)?.[1] ?? 0) : 1
    const later = p.curve === 'drawn' ? p.points.filter(([t]) => t * Math.abs(limit) > range * p.drive).map(([, k]) => k) : []
    return Math.max(...[last, ...later].map((k) => Math.abs(p.ceiling * k * limit - end)))
  })
  return Math.max(...sizes)
}
