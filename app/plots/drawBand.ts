// Bands between a smallest and a largest level of each pixel column: the wash of a whole sweep, teeth denser than pixels.
import type { Surface } from './frequencyPlot.ts'
import type { PlotBox } from './host/createPlot.ts'
import { type Levels, levelY } from './levels.ts'

export interface Band {
  readonly low: Float64Array
  readonly high: Float64Array
}

/** The band over the last `low.length` of `count` columns, its edges joined at the columns' middles. */
export function bandFill(box: PlotBox, levels: Levels, { low, high }: Band, count: number): Path2D {
  const path = new Path2D()
  edge(path, box, levels, high, count, 1)
  edge(path, box, levels, low, count, -1)
  return path
}

/** Its two edges as lines. */
export function bandEdges(box: PlotBox, levels: Levels, { low, high }: Band, count: number): Path2D {
  const path = new Path2D()
  for (const values of [high, low]) edge(path, box, levels, values, count, 1, true)
  return path
}

/** Of a second quantity, CSS pixels along its line. */
export const DASH_PX = [5, 4] as const

/** Adds an edge to a path, from left to right (direction 1) or back (−1); it reaches from the first column's start to the last one's end. */
function edge(path: Path2D, box: PlotBox, levels: Levels, values: Float64Array, count: number, direction: 1 | -1, anew = false): void {
  const length = values.length
  if (length === 0) return
  const width = box.width / count
  const start = box.left + box.width - length * width
  const ends = [start, box.left + box.width]
  const [from, to] = direction === 1 ? [0, length - 1] : [length - 1, 0]
  const first = levelY(box, levels, values[from] as number)
  if (anew) path.moveTo(ends[direction === 1 ? 0 : 1] as number, first)
  else path.lineTo(ends[direction === 1 ? 0 : 1] as number, first)
  for (let i = from; i >= 0 && i < length; i += direction) path.lineTo(start + (i + 0.5) * width, levelY(box, levels, values[i] as number))
  path.lineTo(ends[direction === 1 ? 1 : 0] as number, levelY(box, levels, values[to] as number))
}

const WASH = 0.12
const OUTLINE = 0.35

/** What is left of a wash that is of an older set. */
const PALE = 0.3

/** Wash and outline of everything the sweep reaches, over all columns. */
export function drawWash({ ctx, box, theme, levels, pale }: Surface, band: Band): void {
  clipTo(ctx, box)
  const count = band.low.length
  ctx.fillStyle = theme.now
  ctx.strokeStyle = theme.now
  ctx.globalAlpha = pale ? PALE * WASH : WASH
  ctx.fill(bandFill(box, levels, band, count))
  ctx.globalAlpha = pale ? PALE * OUTLINE : OUTLINE
  ctx.lineWidth = box.ratio
  ctx.stroke(bandEdges(box, levels, band, count))
}

export function clipTo(ctx: CanvasRenderingContext2D, { left, top, width, height }: PlotBox): void {
  ctx.beginPath()
  ctx.rect(left, top, width, height)
  ctx.clip()
}
