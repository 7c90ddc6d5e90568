// Bands between a smallest and a largest level of each pixel column: the wash of a whole sweep, teeth denser than pixels.
import type { Surface } from './frequencyPlot.ts'
import type { PlotBox } from './host/createPlot.ts'
import { type Levels, levelY } from './levels.ts'

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

const WASH = 0.12
const OUTLINE = 0.35

/** Wash and outline of everything the sweep reaches, over all columns. */
export function drawWash({ ctx, box, theme, levels }: Surface, band: Band): void {
  clipTo(ctx, box)
  const { fill, top, bottom } = bandEdges(box, levels, band, band.low.length)
  ctx.fillStyle = theme.now
  ctx.strokeStyle = theme.now
  ctx.globalAlpha = WASH
  ctx.fill(fill)
  ctx.globalAlpha = OUTLINE
  ctx.lineWidth = box.ratio
  ctx.stroke(top)
  ctx.stroke(bottom)
}

export function clipTo(ctx: CanvasRenderingContext2D, { left, top, width, height }: PlotBox): void {
  ctx.beginPath()
  ctx.rect(left, top, width, height)
  ctx.clip()
}
