// One wrapper around uPlot: tokens for colours, size from the place, no legend and no frame, layers under and over
// the series, a cursor that reads out. Everything a plot draws goes through here.
import uPlot from 'uplot'
import 'uplot/dist/uPlot.min.css'
import './plot.css'
import { onPlotTheme, type PlotTheme, plotTheme } from './theme.ts'

/** The plotting area in canvas pixels; `ratio` canvas pixels make a CSS pixel. */
export interface PlotBox {
  readonly left: number
  readonly top: number
  readonly width: number
  readonly height: number
  readonly ratio: number
}

export type Layer = (ctx: CanvasRenderingContext2D, box: PlotBox, theme: PlotTheme, plot: uPlot) => void

export interface PlotSpec {
  readonly scales: uPlot.Scales
  readonly axes: uPlot.Axis[]
  /** Without the x series. */
  readonly series?: uPlot.Series[]
  readonly data?: uPlot.AlignedData
  readonly under?: Layer
  readonly over?: Layer
  /** Part of the width where the cursor stands, 0 to 1; null when it left. */
  onCursor?(part: number | null): void
  /** CSS size of the plotting area after it changed. */
  onSize?(widthPx: number, heightPx: number): void
}

export interface HostedPlot {
  readonly u: uPlot
  /** Draws again at the end of this turn; with `axes`, their ranges and labels too. */
  redraw(axes?: boolean): void
  /** Puts the cursor at a part of the width; null takes it away. */
  cursorAt(part: number | null): void
  picture(): HTMLCanvasElement
  destroy(): void
}

const SMALLEST_PX = 40

export function createPlot(element: HTMLElement, spec: PlotSpec): HostedPlot {
  const layer = (draw: Layer | undefined) => (u: uPlot) => {
    if (!draw) return
    const { left, top, width, height } = u.bbox
    u.ctx.save()
    draw(u.ctx, { left, top, width, height, ratio: uPlot.pxRatio }, plotTheme(), u)
    u.ctx.restore()
  }
  let over = false
  const size = sizeOf(element)
  const u = new uPlot(
    {
      ...size,
      scales: spec.scales,
      axes: spec.axes,
      series: [{}, ...(spec.series ?? [])],
      legend: { show: false },
      padding: [6, 16, 0, 0],
      cursor: { y: false, points: { show: false }, drag: { x: false, y: false } },
      hooks: {
        drawAxes: [layer(spec.under)],
        draw: [layer(spec.over)],
        setCursor: [
          (plot) => {
            const left = plot.cursor.left ?? -1
            const inside = left >= 0 && plot.over.clientWidth > 0
            if (inside || over) spec.onCursor?.(inside ? Math.min(1, left / plot.over.clientWidth) : null)
            over = inside
          },
        ],
        setSize: [(plot) => spec.onSize?.(plot.bbox.width / uPlot.pxRatio, plot.bbox.height / uPlot.pxRatio)],
      },
    },
    spec.data ?? [[]],
    element,
  )

  const observer = new ResizeObserver(() => {
    const next = sizeOf(element)
    if (next.width !== u.width || next.height !== u.height) u.setSize(next)
  })
  observer.observe(element)
  const stopTheme = onPlotTheme(() => u.redraw(false, true))
  const stopTouch = touchCursor(u)

  return {
    u,
    redraw: (axes = false) => u.redraw(axes, axes),
    cursorAt: (part) => u.setCursor({ left: part === null ? -10 : part * u.over.clientWidth, top: part === null ? -10 : 1 }),
    picture: () => onPaper(u),
    destroy() {
      observer.disconnect()
      stopTheme()
      stopTouch()
      u.destroy()
    },
  }
}

function sizeOf(element: HTMLElement): { width: number; height: number } {
  return { width: Math.max(SMALLEST_PX, element.clientWidth), height: Math.max(SMALLEST_PX, element.clientHeight) }
}

/** uPlot follows the mouse only: a finger moves the cursor along, too, and leaves it where it lifts. */
function touchCursor(u: uPlot): () => void {
  const move = (event: PointerEvent) => {
    if (event.pointerType === 'mouse') return
    const box = u.over.getBoundingClientRect()
    u.setCursor({ left: Math.max(0, Math.min(box.width, event.clientX - box.left)), top: 1 })
  }
  u.over.addEventListener('pointerdown', move)
  u.over.addEventListener('pointermove', move)
  return () => {
    u.over.removeEventListener('pointerdown', move)
    u.over.removeEventListener('pointermove', move)
  }
}

function onPaper(u: uPlot): HTMLCanvasElement {
  const canvas = document.createElement('canvas')
  canvas.width = u.ctx.canvas.width
  canvas.height = u.ctx.canvas.height
  const ctx = canvas.getContext('2d')
  if (!ctx) throw new TypeError('this browser gives no canvas to draw the picture on')
  ctx.fillStyle = plotTheme().paper
  ctx.fillRect(0, 0, canvas.width, canvas.height)
  ctx.drawImage(u.ctx.canvas, 0, 0)
  return canvas
}
