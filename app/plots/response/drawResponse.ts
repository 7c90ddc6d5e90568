// The response at this instant: line and band, the second channel dashed where it is another one, marks, legend.
import type { Trace } from '../../workers/analysisJobs/trace.ts'
import { bandEdges, bandFill, clipTo, DASH_PX } from '../drawBand.ts'
import type { Surface } from '../frequencyPlot.ts'
import { drawMarks } from './drawMarks.ts'
import { traceLine } from './drawTrace.ts'

const BAND = 0.62
const LINE_PX = 1.75
const SECOND_PX = 1.25

export function drawResponse(surface: Surface, trace: Trace): void {
  const { ctx, box, theme, levels } = surface
  const { count } = trace.columns
  const [first, second] = trace.channels
  const [firstBand, secondBand] = trace.bands
  ctx.save()
  clipTo(ctx, box)
  ctx.lineJoin = 'round'
  if (first && firstBand) {
    ctx.fillStyle = theme.now
    ctx.strokeStyle = theme.now
    if (firstBand.low.length > 0) {
      ctx.globalAlpha = BAND
      ctx.fill(bandFill(box, levels, firstBand, count))
      ctx.globalAlpha = 1
      ctx.lineWidth = box.ratio
      ctx.stroke(bandEdges(box, levels, firstBand, count))
    }
    ctx.lineWidth = LINE_PX * box.ratio
    ctx.stroke(traceLine(box, levels, first, trace.dense))
  }
  if (second && secondBand && trace.differs) {
    ctx.strokeStyle = theme.second
    ctx.lineWidth = SECOND_PX * box.ratio
    ctx.setLineDash(DASH_PX.map((px) => px * box.ratio))
    ctx.stroke(traceLine(box, levels, second, count - secondBand.low.length))
    ctx.stroke(bandEdges(box, levels, secondBand, count))
  }
  ctx.restore()
  drawMarks(surface, trace.columns, trace.marks)
}

/** Changes seldom, drawn with the axes. */
export function responseLegend({ differs, smallSignal, drifts, stands, unstable }: Trace): string {
  const parts = stands ? ['the sweep stands still'] : ['shaded: everywhere the sweep reaches']
  if (differs) parts.unshift('dashed: second channel')
  if (drifts) parts.unshift('drift stands as a sine')
  if (unstable) parts.unshift('the loop builds up here')
  if (smallSignal) parts.unshift('for small signals')
  return parts.join(' · ')
}
