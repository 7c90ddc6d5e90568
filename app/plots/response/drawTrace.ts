// Draws the response: a line where its teeth can be told apart, from there on the band between the smallest and the
// largest level of each pixel column.
import type { TraceChannel } from '../../workers/analysisJobs/trace.ts'
import type { PlotBox } from '../host/createPlot.ts'

export interface Levels {
  readonly minDb: number
  readonly maxDb: number
}

/** Canvas y of a level, held a little outside the plot. */
export function levelY(box: PlotBox, { minDb, maxDb }: Levels, db: number): number {
  const part = (maxDb - db) / (maxDb - minDb)
  return box.top + box.height * Math.max(-0.1, Math.min(1.1, part))
}

/** The line over the columns before `dense`; notches and peaks between its points are not cut off. */
export function traceLine(box: PlotBox, levels: Levels, { db, low, high }: TraceChannel, dense: number): Path2D {
  const path = new Path2D()
  const half = box.width / (2 * low.length)
  const y = (level: number) => levelY(box, levels, level)
  path.moveTo(box.left, y(db[0] as number))
  for (let i = 0; i < dense; i++) {
    const x = box.left + 2 * i * half
    const middle = db[2 * i + 1] as number
    const end = db[2 * i + 2] as number
    path.lineTo(x + half, y(sharpest(db[2 * i] as number, middle, end, low[i] as number, high[i] as number)))
    path.lineTo(x + 2 * half, y(end))
  }
  return path
}

/** The middle of a column, or the notch or peak that lies between its points. */
function sharpest(start: number, middle: number, end: number, low: number, high: number): number {
  if (low < Math.min(start, middle, end)) return low
  return high > Math.max(start, middle, end) ? high : middle
}

export interface Band {
  readonly low: Float64Array
  readonly high: Float64Array
}

export interface BandEdges {
  readonly fill: Path2D
  readonly top: Path2D
  readonly bottom: Path2D
}

/** Top, bottom and the closed band between them over the last `low.length` of `count` columns, joined at the columns' middles. */
export function bandEdges(box: PlotBox, levels: Levels, { low, high }: Band, count: number): BandEdges {
  const width = box.width / count
  const start = box.left + box.width - low.length * width
  const edge = (values: Float64Array): Point[] => {
    const points = Array.from(values, (db, i): Point => [start + (i + 0.5) * width, levelY(box, levels, db)])
    const [first] = points
    const last = points.at(-1)
    return first && last ? [[start, first[1]], ...points, [box.left + box.width, last[1]]] : []
  }
  const upper = edge(high)
  const lower = edge(low)
  return { fill: through([...upper, ...lower.toReversed()]), top: through(upper), bottom: through(lower) }
}

type Point = readonly [number, number]

function through(points: readonly Point[]): Path2D {
  const path = new Path2D()
  for (const [x, y] of points) path.lineTo(x, y)
  return path
}
