// What has to come along with a change for it to mean anything: a shaper with its first curve, points when a curve becomes drawn.
import { curveValue } from '../../src/dsp/shaperCurves.ts'
import { defaultShaper } from '../../src/set/defaults.ts'
import { getAt, withAt } from '../../src/set/path.ts'
import { sweepShapeValue } from '../../src/set/sweepShape.ts'
import type { Curve, ParameterSet, Point, Shaper } from '../../src/set/types.ts'

const SWEEP_POINTS = 16
const SHAPER_POINTS = 9
const SHAPER_REACH = 2

/** The set with one field replaced and what must come along. `value` null on a shaper's curve takes the shaper out. */
export function replaceField(set: ParameterSet, path: string, value: unknown): ParameterSet {
  if (path.endsWith('.shaper.curve')) return replaceCurve(set, path.slice(0, -'.curve'.length), value as Curve | null)
  if (path === 'sweep.shape' && value === 'drawn' && set.sweep.points.length < 2)
    return withAt(withAt(set, 'sweep.points', sampledSweep(set)), path, value)
  return withAt(set, path, value)
}

function replaceCurve(set: ParameterSet, owner: string, curve: Curve | null): ParameterSet {
  if (curve === null) return withAt(set, owner, null)
  const before = getAt(set, owner) as Shaper | null
  const shaper = { ...(before ?? defaultShaper(curve)), curve }
  if (curve !== 'drawn' || shaper.points.length >= 2) return withAt(set, owner, shaper)
  return withAt(set, owner, { ...shaper, points: sampledCurve(before ?? defaultShaper('tanh')) })
}

/** The shape as it is, as points to start drawing from; drift has no shape of its own and starts as a sine. */
function sampledSweep(set: ParameterSet): readonly Point[] {
  const sweep = set.sweep.shape === 'drift' || set.sweep.shape === 'drawn' ? { ...set.sweep, shape: 'sine' as const } : set.sweep
  return Array.from({ length: SWEEP_POINTS }, (_, i) => {
    const phase = i / SWEEP_POINTS
    return [phase, round(sweepShapeValue(sweep, phase))] as const
  })
}

/** k(t) of the curve as it is, from [0, 0]. */
function sampledCurve(shaper: Shaper): readonly Point[] {
  return Array.from({ length: SHAPER_POINTS }, (_, i) => {
    const t = (i * SHAPER_REACH) / (SHAPER_POINTS - 1)
    return [t, i === 0 ? 0 : round(curveValue(shaper, t))] as const
  })
}

const round = (y: number) => Math.round(y * 1000) / 1000 + 0
