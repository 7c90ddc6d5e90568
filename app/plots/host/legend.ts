// What the lines and shades of a plot mean: in its top right corner; beneath the axis where the corner is too narrow for it.
import type uPlot from 'uplot'
import { canvasFont, cornerText } from './corner.ts'
import type { PlotBox } from './createPlot.ts'
import type { PlotTheme } from './theme.ts'

const NARROW_PX = 540
const LINES = 2
const LINE_EM = 1.35
const SEPARATOR = ' · '

const isBeneath = (u: uPlot): boolean => u.width < NARROW_PX

/** CSS pixels kept free beneath the axis: as many whatever the legend says, so that the plot does not jump. */
export function legendRoomPx(u: uPlot, theme: PlotTheme): number {
  return isBeneath(u) ? Math.ceil(LINES * LINE_EM * theme.textPx + 4) : 0
}

export function drawLegend(ctx: CanvasRenderingContext2D, box: PlotBox, theme: PlotTheme, u: uPlot, text: string): void {
  if (!isBeneath(u)) {
    cornerText(ctx, box, theme, 'topRight', text)
    return
  }
  ctx.font = canvasFont(theme, box.ratio)
  ctx.fillStyle = theme.soft
  ctx.textAlign = 'left'
  ctx.textBaseline = 'top'
  const left = 8 * box.ratio
  const top = ctx.canvas.height - legendRoomPx(u, theme) * box.ratio
  const lines = wrapped(text, (part) => ctx.measureText(part).width <= ctx.canvas.width - 2 * left)
  lines.forEach((line, i) => {
    ctx.fillText(line, left, top + i * LINE_EM * theme.textPx * box.ratio)
  })
}

/** Parts between separators put on as few lines as they fit on. */
export function wrapped(text: string, fits: (line: string) => boolean): string[] {
  const lines: string[] = []
  for (const part of text.split(SEPARATOR)) {
    const longer = lines.length > 0 ? `${lines.at(-1)}${SEPARATOR}${part}` : part
    if (lines.length > 0 && fits(longer)) lines[lines.length - 1] = longer
    else lines.push(part)
  }
  return lines
}
