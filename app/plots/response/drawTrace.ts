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

export interface BandEdges {
  readonly fill: Path2D
  readonly top: Path2D
  readonly bottom: Path2D
}

/** Top, bottom and the closed band between them, each column one step wide, joined at the columns' middles. */
export function bandEdges(box: PlotBox, levels: Levels, low: Float64Array, high: Float64Array, from: number): BandEdges {
  const count = low.length
  const width = box.width / count
  const edge = (values: Float64Array): [number, number][] => {
    const points: [number, number][] = []
    for (let i = from; i < count; i++) points.push([box.left + (i + 0.5) * width, levelY(box, levels, values[i] as number)])
    const first = points[0]
    const last = points.at(-1)
    if (first && last) {
      points.unshift([box.left + from * width, first[1]])
      points.push([box.left + box.width, last[1]])
    }
    return points
  }
  const upper = edge(high)
  const lower = edge(low)
  return { fill: through([...upper, ...lower.reverse()], true), top: through(upper, false), bottom: through(lower, false) }
}

function through(points: readonly (readonly [number, number])[], closed: boolean): Path2D {
  const path = new Path2D()
  points.forEach(([x, y], i) => {
    if (i === 0) path.moveTo(x, y)
    else path.lineTo(x, y)
  })
  if (closed) path.closePath()
  return path
}
