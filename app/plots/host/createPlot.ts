// One wrapper around uPlot: tokens for colours, size from the place, no legend and no frame, layers under and over
// the series, a cursor that reads out. Everything a plot draws goes through here.
import uPlot from 'uplot'
import 'uplot/dist/uPlot.min.css'
import './plot.css'
import { canvasFont } from './corner.ts'
import { drawLegend, legendRoomPx } from './legend.ts'
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
  /** Drawn with axes and series, when they are: what changes with the set. */
  readonly under?: Layer
  readonly over?: Layer
  /** What lines and shades mean. */
  legend?(): string
  /** CSS px kept free above the plotting area, where the legend then stands; for plots that fill their corners. */
  readonly headRoomPx?: number
  /** Drawn on a canvas of its own in front, as often as drawLive is called: what changes with the sound. The small text is set. */
  readonly live?: Layer
  /** Part of the width where the cursor stands, 0 to 1; null when it left. */
  onCursor?(part: number | null): void
  /** CSS size of the plotting area after it changed. */
  onSize?(widthPx: number, heightPx: number): void
}

export interface HostedPlot {
  readonly u: uPlot
  /** Draws axes, series and layers again, at the end of this turn. */
  redraw(): void
  /** Draws the live layer again, at once. */
  drawLive(): void
  /** Puts the cursor at a part of the width; null takes it away. */
  cursorAt(part: number | null): void
  picture(): HTMLCanvasElement
  destroy(): void
}

const SMALLEST_PX = 40

export function createPlot(element: HTMLElement, spec: PlotSpec): HostedPlot {
  const front = document.createElement('canvas')
  front.className = 'cw-plot-front'
  const frontCtx = front.getContext('2d')
  if (!frontCtx) throw new TypeError('this browser gives no canvas to draw on')

  let frontFont = ''
  const layer = (draw: Layer | undefined, ctx: CanvasRenderingContext2D | null) => (u: uPlot) => {
    if (!draw) return
    const { left, top, width, height } = u.bbox
    const on = ctx ?? u.ctx
    on.save()
    draw(on, { left, top, width, height, ratio: uPlot.pxRatio }, plotTheme(), u)
    on.restore()
  }
  const drawLive = (u: uPlot) => {
    if (!spec.live) return
    // Setting a size empties the canvas, and costs even when it stays.
    if (front.width !== u.ctx.canvas.width || front.height !== u.ctx.canvas.height) {
      front.width = u.ctx.canvas.width
      front.height = u.ctx.canvas.height
      frontFont = ''
    } else frontCtx.clearRect(0, 0, front.width, front.height)
    // Setting a font makes the browser lay the page out: once, not every frame.
    const font = canvasFont(plotTheme(), uPlot.pxRatio)
    if (font !== frontFont) frontCtx.font = font
    frontFont = font
    layer(spec.live, frontCtx)(u)
  }
  const legend: Layer = (ctx, box, theme, plot) => {
    const above = (spec.headRoomPx ?? 0) * box.ratio
    if (spec.legend) drawLegend(ctx, { ...box, top: box.top - above }, theme, plot, spec.legend())
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
      padding: [spec.headRoomPx ?? 6, 16, (plot) => (spec.legend ? legendRoomPx(plot, plotTheme()) : 0), 0],
      cursor: { y: false, points: { show: false }, drag: { x: false, y: false } },
      hooks: {
        drawAxes: [layer(spec.under, null)],
        draw: [layer(spec.over, null), layer(legend, null), drawLive],
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

  if (spec.live) u.over.before(front)

  const observer = new ResizeObserver(() => {
    const next = sizeOf(element)
    if (next.width !== u.width || next.height !== u.height) u.setSize(next)
  })
  observer.observe(element)
  const stopTheme = onPlotTheme(() => u.redraw(false, true))
  const stopTouch = touchCursor(u)

  return {
    u,
    redraw: () => u.redraw(false, false),
    drawLive: () => drawLive(u),
    cursorAt: (part) => u.setCursor({ left: part === null ? -10 : part * u.over.clientWidth, top: part === null ? -10 : 1 }),
    picture: () => onPaper([u.ctx.canvas, ...(spec.live ? [front] : [])]),
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

function onPaper(layers: readonly HTMLCanvasElement[]): HTMLCanvasElement {
  const canvas = document.createElement('canvas')
  canvas.width = layers[0]?.width ?? 0
  canvas.height = layers[0]?.height ?? 0
  const ctx = canvas.getContext('2d')
  if (!ctx) throw new TypeError('this browser gives no canvas to draw the picture on')
  ctx.fillStyle = plotTheme().paper
  ctx.fillRect(0, 0, canvas.width, canvas.height)
  for (const layer of layers) ctx.drawImage(layer, 0, 0)
  return canvas
}
