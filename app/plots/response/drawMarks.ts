// Notch and peak marks: a triangle under a notch, over a peak, with its frequency as a plain number.
import type { Mark } from '../../workers/analysisJobs/teeth.ts'
import { type Columns, partOf } from '../columns.ts'
import type { Surface } from '../frequencyPlot.ts'
import { levelY } from '../levels.ts'
import { hertz } from '../words.ts'

const SIZE_PX = 4
const AWAY_PX = 5
/** Of the corner's words. */
const WORDS_PX = 16

export function drawMarks({ ctx, box, theme, levels }: Surface, columns: Columns, marks: readonly Mark[]): void {
  const { ratio } = box
  ctx.textAlign = 'center'
  // A rim of paper keeps numbers legible over the curve.
  ctx.strokeStyle = theme.paper
  ctx.lineWidth = 3 * ratio
  ctx.lineJoin = 'round'
  for (const mark of marks) {
    const under = mark.kind === 'notch'
    const away = (under ? 1 : -1) * ratio
    const x = box.left + box.width * partOf(columns, mark.frequencyHz)
    const room = (SIZE_PX * 2 + AWAY_PX + (mark.labelled ? theme.textPx + 2 : 0)) * ratio
    const level = levelY(box, levels, mark.db)
    const y = under ? Math.min(level, box.top + box.height - room) : Math.max(level, box.top + room + WORDS_PX * ratio)
    const tip = y + AWAY_PX * away
    const base = tip + 1.75 * SIZE_PX * away
    ctx.fillStyle = theme.now
    ctx.beginPath()
    ctx.moveTo(x, tip)
    ctx.lineTo(x - SIZE_PX * ratio, base)
    ctx.lineTo(x + SIZE_PX * ratio, base)
    ctx.fill()
    if (!mark.labelled) continue
    ctx.textBaseline = under ? 'top' : 'bottom'
    ctx.strokeText(hertz(mark.frequencyHz), x, base + 2 * away)
    ctx.fillStyle = theme.ink
    ctx.fillText(hertz(mark.frequencyHz), x, base + 2 * away)
  }
}
