// The open loop at this instant, the limit it must stay under, and the poles it makes.
import type { LoopTrace, PoleMark } from '../../workers/analysisJobs/loop.ts'
import { type Columns, partOf } from '../columns.ts'
import { clipTo, DASH_PX } from '../drawBand.ts'
import type { Surface } from '../frequencyPlot.ts'
import { middleText } from '../host/corner.ts'
import { levelY } from '../levels.ts'
import { hertz } from '../words.ts'
import { NO_LOOP } from './loopWords.ts'

const LINE_PX = 1.75
const DOT_PX = 3

export function drawLoop(surface: Surface, trace: LoopTrace): void {
  const { ctx, box, theme } = surface
  if (trace.largest === null) {
    middleText(ctx, box, theme, NO_LOOP)
    return
  }
  drawLimit(surface)
  ctx.save()
  clipTo(ctx, box)
  ctx.lineJoin = 'round'
  ctx.lineWidth = LINE_PX * box.ratio
  const [first, second] = trace.lines
  ctx.strokeStyle = theme.now
  if (first) ctx.stroke(curve(surface, first))
  if (second && trace.differs) {
    ctx.strokeStyle = theme.second
    ctx.lineWidth = box.ratio
    ctx.setLineDash(DASH_PX.map((px) => px * box.ratio))
    ctx.stroke(curve(surface, second))
  }
  ctx.restore()
  drawPoles(surface, trace.columns, trace.poles)
}

export function loopLegend({ differs, largest }: LoopTrace): string {
  if (largest === null) return ''
  const parts = ['dots: poles', 'shaded: wherever the sweep stands']
  if (differs) parts.unshift('dashed: second line')
  return parts.join(' · ')
}

/** The line at 0 dB: at and above it the loop gives back what it got, or more. */
function drawLimit({ ctx, box, theme, levels }: Surface): void {
  const y = Math.round(levelY(box, levels, 0)) + 0.5
  ctx.strokeStyle = theme.ink
  ctx.lineWidth = 1.5 * box.ratio
  ctx.beginPath()
  ctx.moveTo(box.left, y)
  ctx.lineTo(box.left + box.width, y)
  ctx.stroke()
  ctx.fillStyle = theme.ink
  ctx.textAlign = 'right'
  ctx.textBaseline = 'bottom'
  ctx.fillText('limit', box.left + box.width, y - 3 * box.ratio)
}

function curve({ box, levels }: Surface, db: Float64Array): Path2D {
  const path = new Path2D()
  const step = box.width / (db.length - 1)
  db.forEach((level, i) => {
    path.lineTo(box.left + i * step, levelY(box, levels, level))
  })
  return path
}

function drawPoles({ ctx, box, theme, levels }: Surface, columns: Columns, poles: readonly PoleMark[]): void {
  const { ratio } = box
  ctx.textAlign = 'center'
  ctx.textBaseline = 'top'
  for (const { frequencyHz, db, labelled } of poles) {
    const x = box.left + box.width * partOf(columns, frequencyHz)
    const y = levelY(box, levels, db)
    if (y > box.top + box.height) continue
    ctx.fillStyle = theme.now
    ctx.beginPath()
    ctx.arc(x, y, DOT_PX * ratio, 0, 2 * Math.PI)
    ctx.fill()
    if (!labelled) continue
    ctx.fillStyle = theme.ink
    ctx.fillText(hertz(frequencyHz), x, y + (DOT_PX + 4) * ratio)
  }
}
