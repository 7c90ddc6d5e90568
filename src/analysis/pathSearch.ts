// The ends of |H| along a sweep path at one frequency. H itself, not its size, is followed: a complex curve through three
// positions is smooth where |H| has a null, and 1/H is smooth where a resonance is sharp.
import { type Frozen, freeze } from './frozen.ts'
import { type PathTable, pathReach, pathStretches, pathTable, type Stretch, setPosition } from './pathTable.ts'
import { createTuning, pathValues, type Tuning } from './pathValues.ts'
import { pathDelays, pathReads, type SweepPath } from './sweepPath.ts'

/** Turning points that are followed to their summit, and steps towards it. */
const FOLLOWED = 6
const STEPS = 3

export interface PathSearch {
  readonly path: SweepPath
  readonly frozen: Frozen
  readonly tuning: Tuning
  readonly stretches: readonly Stretch[]
  readonly values: Float64Array
  readonly probe: PathTable
  readonly probeValue: Float64Array
  readonly nearTs: Float64Array
  readonly nearValues: Float64Array
  readonly delays: Float64Array
}

/** Memory for searching a path with at most `most` positions. */
export function createPathSearch(path: SweepPath, most: number): PathSearch {
  const frozen = freeze(path.set, 0, path.sampleRate)
  const stretches = pathStretches(path)
  const delays = new Float64Array(pathReads(path))
  return {
    path,
    frozen,
    stretches,
    delays,
    tuning: createTuning(frozen, pathReach(path, stretches, delays)),
    values: new Float64Array(2 * (most + 3 * stretches.length + 8)),
    probe: pathTable(path, [path.stops[0] as number]),
    probeValue: new Float64Array(2),
    nearTs: new Float64Array(3),
    nearValues: new Float64Array(6),
  }
}

/** Smallest and largest |H|² of a channel along the path, at the frequency tuned to. */
export function powerEnds(search: PathSearch, table: PathTable, channel: number): { min: number; max: number } {
  const { values, tuning } = search
  const count = table.ts.length
  pathValues(tuning, table, channel, values)
  const min = nearestToZero(search, table, channel)
  // A sharp resonance is to 1/H what a null is to H: a smooth curve passing close to 0.
  for (let i = 0; i < count; i++) invertAt(values, i)
  return { min, max: 1 / nearestToZero(search, table, channel, true) }
}

/** Smallest |value|² along the path, value H or 1/H: the best sample, or where the curve through three samples comes closer. */
function nearestToZero(search: PathSearch, table: PathTable, channel: number, inverse = false): number {
  const { values } = search
  const { ts } = table
  let best = Number.POSITIVE_INFINITY
  for (let i = 0; i < ts.length; i++) best = Math.min(best, sizeAt(values, i))
  const starts: Start[] = []
  for (let i = 1; i + 1 < ts.length; i++) {
    const here = sizeAt(values, i)
    if (here > sizeAt(values, i - 1) || here > sizeAt(values, i + 1)) continue
    const { power } = foretell(ts, values, i)
    if (power >= best || (starts.length === FOLLOWED && power >= (starts.at(-1) as Start).power)) continue
    starts.push({ i, power })
    starts.sort((x, y) => x.power - y.power)
    starts.length = Math.min(starts.length, FOLLOWED)
  }
  for (const start of starts) best = Math.min(best, approach(search, table, { channel, inverse, i: start.i }))
  return best
}

/** |value|² of sample i. */
function sizeAt(values: Float64Array, i: number): number {
  const re = values[2 * i] as number
  const im = values[2 * i + 1] as number
  return re * re + im * im
}

interface Start {
  readonly i: number
  readonly power: number
}

/** The point nearest to 0 of the complex parabola through samples i − 1, i, i + 1, by three steps of Newton from i. */
function foretell(ts: Float64Array, values: Float64Array, i: number): { t: number; power: number } {
  const tb = ts[i] as number
  const da = (ts[i - 1] as number) - tb
  const dc = (ts[i + 1] as number) - tb
  const re = values[2 * i] as number
  const im = values[2 * i + 1] as number
  const aRe = ((values[2 * i - 2] as number) - re) / da
  const aIm = ((values[2 * i - 1] as number) - im) / da
  const cRe = ((values[2 * i + 2] as number) - re) / dc
  const cIm = ((values[2 * i + 3] as number) - im) / dc
  // value = b0 + b1 t + b2 t²
  const b2Re = (cRe - aRe) / (dc - da)
  const b2Im = (cIm - aIm) / (dc - da)
  const b1Re = aRe - b2Re * da
  const b1Im = aIm - b2Im * da
  let t = 0
  for (let step = 0; step < 3; step++) {
    const vRe = re + (b1Re + b2Re * t) * t
    const vIm = im + (b1Im + b2Im * t) * t
    const sRe = b1Re + 2 * b2Re * t
    const sIm = b1Im + 2 * b2Im * t
    const tangent = sRe * sRe + sIm * sIm
    const bend = tangent + 2 * (vRe * b2Re + vIm * b2Im)
    const size = bend > 0.1 * tangent ? bend : tangent
    if (!(size > 0)) break
    t = Math.min(dc, Math.max(da, t - (vRe * sRe + vIm * sIm) / size))
  }
  const vRe = re + (b1Re + b2Re * t) * t
  const vIm = im + (b1Im + b2Im * t) * t
  return { t: tb + t, power: vRe * vRe + vIm * vIm }
}

/** Follows one start to the path's own point nearest to 0; returns |value|² there. */
function approach(search: PathSearch, table: PathTable, from: { channel: number; inverse: boolean; i: number }): number {
  const { probe, probeValue, tuning, delays, nearTs, nearValues, values } = search
  for (let k = 0; k < 3; k++) {
    nearTs[k] = table.ts[from.i - 1 + k] as number
    nearValues[2 * k] = values[2 * (from.i - 1 + k)] as number
    nearValues[2 * k + 1] = values[2 * (from.i - 1 + k) + 1] as number
  }
  let best = Number.POSITIVE_INFINITY
  let bestT = nearTs[1] as number
  const visit = (t: number) => {
    setPosition(probe, 0, t, delays)
    pathValues(tuning, probe, from.channel, probeValue)
    if (from.inverse) invertAt(probeValue, 0)
    const power = sizeAt(probeValue, 0)
    if (power >= best) return
    best = power
    bestT = t
  }
  const span = (nearTs[2] as number) - (nearTs[0] as number)
  for (let step = 0; step < STEPS; step++) {
    const { t } = foretell(nearTs, nearValues, 1)
    visit(t)
    const closer = [0, 1, 2].some((k) => Math.abs(t - (nearTs[k] as number)) < 1e-6 * span)
    if (closer) break
    insert(nearTs, nearValues, t, probeValue)
  }
  if (from.inverse && search.frozen.loop.gain !== 0) for (const t of wholeLoopDelays(search, from.channel, bestT, span / 1000)) visit(t)
  return best
}

/** Where, next to t, the loop reads whole samples: an interpolator loses least there, and a loop near its limit shows it. */
function wholeLoopDelays({ path, delays }: PathSearch, channel: number, t: number, step: number): number[] {
  const line = path.lines === 2 ? channel : 0
  pathDelays(path, t + step, delays)
  const ahead = delays[line] as number
  pathDelays(path, t, delays)
  const delay = delays[line] as number
  const slope = (ahead - delay) / step
  const [low, high] = [path.stops[0] as number, path.stops.at(-1) as number]
  return [Math.floor(delay), Math.ceil(delay)].map((whole) => t + (whole - delay) / slope).filter((at) => at > low && at < high)
}

/** The new point takes the middle; its neighbours on either side stay, or the two nearest on one side at an end. */
function insert(ts: Float64Array, values: Float64Array, t: number, value: Float64Array): void {
  // Of four ascending points the one furthest from the new one goes, an outer one always.
  const dropFirst = t - (ts[0] as number) > (ts[2] as number) - t
  if (dropFirst) {
    ts[0] = ts[1] as number
    values[0] = values[2] as number
    values[1] = values[3] as number
  } else {
    ts[2] = ts[1] as number
    values[4] = values[2] as number
    values[5] = values[3] as number
  }
  ts[1] = t
  values[2] = value[0] as number
  values[3] = value[1] as number
  if ((ts[0] as number) > t) swap(ts, values, 0)
  if ((ts[2] as number) < t) swap(ts, values, 1)
}

function swap(ts: Float64Array, values: Float64Array, k: number): void {
  const [t, re, im] = [ts[k] as number, values[2 * k] as number, values[2 * k + 1] as number]
  ts[k] = ts[k + 1] as number
  values[2 * k] = values[2 * k + 2] as number
  values[2 * k + 1] = values[2 * k + 3] as number
  ts[k + 1] = t
  values[2 * k + 2] = re
  values[2 * k + 3] = im
}

function invertAt(values: Float64Array, i: number): void {
  const re = values[2 * i] as number
  const im = values[2 * i + 1] as number
  const size = Math.max(re * re + im * im, 1e-40)
  values[2 * i] = re / size
  values[2 * i + 1] = -im / size
}
