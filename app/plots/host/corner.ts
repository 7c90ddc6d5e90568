// Words in a plot's own corners.
import type { PlotBox } from './createPlot.ts'
import type { PlotTheme } from './theme.ts'

export type Corner = 'topLeft' | 'topRight' | 'bottomLeft' | 'bottomRight'

/** The small text at the canvas's scale. */
export function canvasFont(theme: PlotTheme, ratio: number): string {
  return theme.font.replace(/^[\d.]+px/, `${theme.textPx * ratio}px`)
}

export function cornerText(
  ctx: CanvasRenderingContext2D,
  box: PlotBox,
  theme: PlotTheme,
  corner: Corner,
  text: string,
  colour = theme.soft,
): void {
  const left = corner === 'topLeft' || corner === 'bottomLeft'
  const top = corner === 'topLeft' || corner === 'topRight'
  ctx.font = canvasFont(theme, box.ratio)
  ctx.fillStyle = colour
  ctx.textAlign = left ? 'left' : 'right'
  ctx.textBaseline = top ? 'top' : 'bottom'
  const gap = 4 * box.ratio
  ctx.fillText(text, left ? box.left + gap : box.left + box.width, top ? box.top + gap : box.top + box.height - gap)
}

/** A sentence in the middle of an empty plot, broken at its line feeds, and between words where the plot is narrower. */
export function middleText(ctx: CanvasRenderingContext2D, box: PlotBox, theme: PlotTheme, text: string): void {
  ctx.font = canvasFont(theme, box.ratio)
  ctx.fillStyle = theme.soft
  ctx.textAlign = 'center'
  ctx.textBaseline = 'middle'
  const lines = text.split('\n').flatMap((line) => brokenLines(ctx, line, box.width))
  const step = theme.textPx * 1.5 * box.ratio
  lines.forEach((line, i) => {
    ctx.fillText(line, box.left + box.width / 2, box.top + box.height / 2 + (i - (lines.length - 1) / 2) * step)
  })
}

function brokenLines(ctx: CanvasRenderingContext2D, text: string, width: number): string[] {
  const lines: string[] = []
  for (const word of text.split(' ')) {
    const longer = lines.length === 0 ? word : `${lines.at(-1)} ${word}`
    if (lines.length > 0 && ctx.measureText(longer).width <= width) lines[lines.length - 1] = longer
    else lines.push(word)
  }
  return lines
}
