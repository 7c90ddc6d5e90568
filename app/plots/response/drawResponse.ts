// The response at this instant: line and band, the second channel dashed where it is another one, marks, corner words.
import type { Trace } from '../../workers/analysisJobs/trace.ts'
import { bandEdges, clipTo } from '../drawBand.ts'
import type { Surface } from '../frequencyPlot.ts'
import { cornerText } from '../host/corner.ts'
import { drawMarks } from './drawMarks.ts'
import { traceLine } from './drawTrace.ts'

const BAND = 0.62
const LINE_PX = 1.75
const DASH_PX = [5, 4] as const

export function drawResponse(surface: Surface, trace: Trace): void {
  const { ctx, box, theme, levels } = surface
  const { count } = trace.columns
  const [first, second] = trace.channels
  const [firstBand, secondBand] = trace.bands
  cornerText(ctx, box, theme, 'topLeft', 'dB')
  cornerText(ctx, box, theme, 'topRight', cornerWords(trace))
  ctx.save()
  clipTo(ctx, box)
  ctx.lineJoin = 'round'
  ctx.lineWidth = LINE_PX * box.ratio
  if (first && firstBand) {
    const { fill, top, bottom } = bandEdges(box, levels, firstBand, count)
    ctx.fillStyle = theme.now
    ctx.strokeStyle = theme.now
    ctx.globalAlpha = BAND
    ctx.fill(fill)
    ctx.globalAlpha = 1
    ctx.stroke(traceLine(box, levels, first, trace.dense))
    ctx.lineWidth = box.ratio
    ctx.stroke(top)
    ctx.stroke(bottom)
  }
  if (second && secondBand && trace.differs) {
    const { top, bottom } = bandEdges(box, levels, secondBand, count)
    ctx.strokeStyle = theme.second
    ctx.lineWidth = box.ratio
    ctx.setLineDash(DASH_PX.map((px) => px * box.ratio))
    ctx.stroke(traceLine(box, levels, second, trace.dense))
    ctx.stroke(top)
    ctx.stroke(bottom)
  }
  ctx.restore()
  drawMarks(surface, trace.columns, trace.marks)
}

function cornerWords({ differs, smallSignal, unstable }: Trace): string {
  const parts = ['shaded: everywhere the sweep reaches']
  if (differs) parts.unshift('dashed: second channel')
  if (unstable) parts.unshift('the loop builds up here')
  if (smallSignal) parts.unshift('for small signals')
  return parts.join(' · ')
}
