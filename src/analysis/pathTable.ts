// The reads of a sweep path at many of its positions, as flat tables: filled once, then used at every frequency.
import { allpassCoefficient, firstTap, splitDelay, tapsOf } from '../dsp/interpolators.ts'
import { pathDelays, pathReads, type SweepPath } from './sweepPath.ts'

export const TABLE_TAPS = 4

export interface PathTable {
  readonly path: SweepPath
  readonly reads: number
  /** Path parameter of each position, ascending. */
  readonly ts: Float64Array
  /** Per position and read: whole samples before the first tap, four taps, all-pass coefficient. */
  readonly first: Int32Array
  readonly taps: Float64Array
  readonly pole: Float64Array
}

export function pathTable(path: SweepPath, ts: ArrayLike<number>): PathTable {
  const reads = pathReads(path)
  const table: PathTable = {
    path,
    reads,
    ts: Float64Array.from(ts),
    first: new Int32Array(ts.length * reads),
    taps: new Float64Array(TABLE_TAPS * ts.length * reads),
    pole: new Float64Array(ts.length * reads),
  }
  const delays = new Float64Array(reads)
  for (let i = 0; i < ts.length; i++) setPosition(table, i, ts[i] as number, delays)
  return table
}

/** Puts path parameter t at index i. `delays`: scratch, one a read. */
export function setPosition(table: PathTable, i: number, t: number, delays: Float64Array): void {
  const { path, reads } = table
  pathDelays(path, t, delays)
  table.ts[i] = t
  for (let r = 0; r < reads; r++) {
    const kind = r < path.lines ? path.set.loop.interpolation : path.set.line.interpolation
    const { whole, fraction } = splitDelay(kind, delays[r] as number)
    const at = i * reads + r
    table.first[at] = whole + firstTap(kind)
    if (kind === 'allpass1') {
      const eta = allpassCoefficient(fraction)
      table.pole[at] = eta
      table.taps[TABLE_TAPS * at] = eta
      table.taps[TABLE_TAPS * at + 1] = 1
    } else table.taps.set(tapsOf(kind, fraction), TABLE_TAPS * at)
  }
}

export interface Stretch {
  readonly from: number
  readonly to: number
  /** Furthest any read moves along it, samples. */
  readonly travel: number
}

/** Smallest and largest delay of any read along the path, samples. `delays`: scratch, one a read. */
export function pathReach(path: SweepPath, stretches: readonly Stretch[], delays: Float64Array): { lowest: number; highest: number } {
  let lowest = Number.POSITIVE_INFINITY
  let highest = 0
  for (const t of stretches.length === 0 ? path.stops : stretches.flatMap(({ from, to }) => [from, to])) {
    pathDelays(path, t, delays)
    for (const delay of delays) {
      lowest = Math.min(lowest, delay)
      highest = Math.max(highest, delay)
    }
  }
  return { lowest, highest }
}

/** The path cut where its delays turn or bend, finer where they speed up between. */
export function pathStretches(path: SweepPath): Stretch[] {
  const { shape, law } = path.set.sweep
  const parts = shape === 'sine' || shape === 'drift' || law === 'ratio' ? 4 : 1
  const start = new Float64Array(pathReads(path))
  const end = new Float64Array(pathReads(path))
  return path.stops.slice(0, -1).flatMap((from, i) => {
    const width = ((path.stops[i + 1] as number) - from) / parts
    return Array.from({ length: parts }, (_, part) => {
      // A hair inside: on a corner without an edge the delay is that of one side only.
      const a = from + part * width + width * 1e-9
      const b = from + (part + 1) * width - width * 1e-9
      pathDelays(path, a, start)
      pathDelays(path, b, end)
      return { from: a, to: b, travel: start.reduce((most, delay, r) => Math.max(most, Math.abs(delay - (end[r] as number))), 0) }
    })
  })
}

/** Positions a path is never cut below. */
const FEWEST = 32

/**
 * Positions at least `perSample` of them a sample of travel, on the ends of the stretches where those lie far enough
 * apart; between 32 and about `most`.
 */
export function pathPositions(path: SweepPath, stretches: readonly Stretch[], perSample: number, most: number): number[] {
  if (stretches.length === 0) return [...path.stops]
  if (path.offsets === null) return evenDelays(path, perSample, most)
  const travel = Math.max(
    1e-9,
    stretches.reduce((sum, stretch) => sum + stretch.travel, 0),
  )
  const density = Math.min(Math.max(perSample, FEWEST / travel), most / travel)
  const positions: number[] = []
  let since = Number.POSITIVE_INFINITY
  for (const { from, to, travel: own } of stretches) {
    const cells = Math.ceil(own * density)
    for (let j = 0; j < cells; j++) {
      if (j > 0 || since * density >= 0.5) positions.push(from + ((to - from) * j) / cells)
    }
    if (cells === 0 && since > 0) positions.push(from)
    // Standing still adds nothing new; a jump ends what was covered.
    since = own / Math.max(cells, 1)
    if (path.leaps) {
      positions.push(to)
      since = Number.POSITIVE_INFINITY
    }
  }
  positions.push((stretches.at(-1) as Stretch).to)
  return positions
}

/** Where the path is s itself: delays at equal distances, whole samples among them, where an interpolator's loss has its corners. */
function evenDelays({ set, sampleRate, stops }: SweepPath, perSample: number, most: number): number[] {
  const base = (set.line.baseMs * sampleRate) / 1000
  const { law, depthOctaves } = set.sweep
  const depth = law === 'time' ? (set.sweep.depthMs * sampleRate) / 1000 : depthOctaves
  const [from, to] = [stops[0] as number, stops.at(-1) as number]
  if (depth === 0 || base === 0 || to === from) return [from]
  const delayAt = (s: number) => (law === 'time' ? base + depth * s : base * 2 ** (depth * s))
  const travel = delayAt(to) - delayAt(from)
  const wanted = Math.min(Math.max(perSample, FEWEST / travel), most / travel)
  const perWhole = wanted >= 1 ? Math.floor(wanted) : 1 / Math.ceil(1 / wanted)
  const first = Math.ceil(delayAt(from) * perWhole)
  const last = Math.floor(delayAt(to) * perWhole)
  const inside = Array.from({ length: Math.max(0, last - first + 1) }, (_, k) => {
    const delay = (first + k) / perWhole
    return law === 'time' ? (delay - base) / depth : Math.log2(delay / base) / depth
  })
  return [from, ...inside.filter((s) => s > from && s < to), to]
}
