// The layers of the response plot: the sweep's wash under the trace, trace and marks over it.
import type { Reach } from '../../workers/analysisJobs/reach.ts'
import type { Trace } from '../../workers/analysisJobs/trace.ts'
import { cornerText } from '../host/corner.ts'
import type { PlotBox } from '../host/createPlot.ts'
import type { PlotTheme } from '../host/theme.ts'
import { drawMarks } from './drawMarks.ts'
import { bandEdges, type Levels, traceLine } from './drawTrace.ts'

const WASH = 0.12
const OUTLINE = 0.35
const BAND = 0.62
const LINE_PX = 1.75
const DASH_PX = [5, 4] as const

/** Wash and outline of everything the sweep reaches. */
export function drawReach(ctx: CanvasRenderingContext2D, box: PlotBox, theme: PlotTheme, levels: Levels, reach: Reach | null): void {
  if (!reach) return
  clip(ctx, box)
  const { fill, top, bottom } = bandEdges(box, levels, reach, reach.columns.count)
  ctx.fillStyle = theme.now
  ctx.strokeStyle = theme.now
  ctx.globalAlpha = WASH
  ctx.fill(fill)
  ctx.globalAlpha = OUTLINE
  ctx.lineWidth = box.ratio
  ctx.stroke(top)
  ctx.stroke(bottom)
}

/** The trace at this instant, the second channel dashed where it is another one, marks and corner words. */
export function drawTrace(ctx: CanvasRenderingContext2D, box: PlotBox, theme: PlotTheme, levels: Levels, trace: Trace | null): void {
  cornerText(ctx, box, theme, 'topLeft', 'dB')
  cornerText(ctx, box, theme, 'topRight', 'shaded: everywhere the sweep reaches')
  if (!trace) return
  const [first, second] = trace.channels
  const [firstBand, secondBand] = trace.bands
  ctx.save()
  clip(ctx, box)
  ctx.lineJoin = 'round'
  ctx.lineWidth = LINE_PX * box.ratio
  if (first && firstBand) {
    const { fill, top, bottom } = bandEdges(box, levels, firstBand, trace.columns.count)
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
    const { top, bottom } = bandEdges(box, levels, secondBand, trace.columns.count)
    ctx.strokeStyle = theme.second
    ctx.lineWidth = box.ratio
    ctx.setLineDash(DASH_PX.map((px) => px * box.ratio))
    ctx.stroke(traceLine(box, levels, second, trace.dense))
    ctx.stroke(top)
    ctx.stroke(bottom)
  }
  ctx.restore()
  drawMarks(ctx, box, theme, levels, trace.columns, trace.marks)
}

function clip(ctx: CanvasRenderingContext2D, { left, top, width, height }: PlotBox): void {
  ctx.beginPath()
  ctx.rect(left, top, width, height)
  ctx.clip()
}
