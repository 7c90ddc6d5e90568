// The line of the response where its teeth can be told apart.
import type { TraceChannel } from '../../workers/analysisJobs/trace.ts'
import type { PlotBox } from '../host/createPlot.ts'
import { type Levels, levelY } from '../levels.ts'

/** The line over the columns before `dense`; notches and peaks between its points are not cut off. */
export function traceLine(box: PlotBox, levels: Levels, { db, low, high }: TraceChannel, dense: number): Path2D {
  const path = new Path2D()
  const half = box.width / (2 * low.length)
  const y = (level: number) => levelY(box, levels, level)
  for (let i = 0; i < dense; i++) {
    const x = box.left + 2 * i * half
    const start = db[2 * i] as number
    const end = db[2 * i + 2] as number
    if (i === 0) path.moveTo(x, y(start))
    path.lineTo(x + half, y(sharpest(start, db[2 * i + 1] as number, end, low[i] as number, high[i] as number)))
    path.lineTo(x + 2 * half, y(end))
  }
  return path
}

/** The middle of a column, or the notch or peak that lies between its points. */
function sharpest(start: number, middle: number, end: number, low: number, high: number): number {
  if (low < Math.min(start, middle, end)) return low
  return high > Math.max(start, middle, end) ? high : middle
}
