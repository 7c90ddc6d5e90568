// The cells as a picture of one pixel a cell, made once for what was computed and drawn scaled.
import type { SweepMap } from '../../workers/analysisJobs/map.ts'
import type { PlotTheme } from '../host/theme.ts'
import type { Levels } from '../levels.ts'
import { type Rgb, SHADES, shades } from './palette.ts'

const STEP_DB = 3
/** Deeper notches are as pale as the paper. */
const SPAN_DB = 36
const LEAST_DB = 12

/** A peak of few cells may stand this much above the rest: one far above it would leave the rest without shades. */
const FEW = 0.005
const ABOVE_DB = 12

/** The range of the shades: whole steps around all cells, notches cut off 36 dB below the top, and peaks of few cells far above all others. */
export function shadeLevels({ channels }: Pick<SweepMap, 'channels'>): Levels {
  const { low, high: highest } = cellSpan(channels)
  const high = Math.min(highest, highOfMost(channels, highest) + ABOVE_DB)
  // What rounding adds to a level does not ask for another step.
  const maxDb = Math.ceil(high / STEP_DB - 1e-3) * STEP_DB
  const minDb = Math.max(Math.floor(low / STEP_DB + 1e-3) * STEP_DB, maxDb - SPAN_DB)
  // A level response stands in the middle of the shades.
  const missing = Math.ceil(Math.max(0, LEAST_DB - maxDb + minDb) / (2 * STEP_DB)) * STEP_DB
  return { minDb: Math.min(minDb, maxDb + missing - LEAST_DB), maxDb: maxDb + missing }
}

/** The level that all but few cells stay under, found to a decibel, looking no further down than the shades reach. */
function highOfMost(channels: SweepMap['channels'], highest: number): number {
  const counts = new Uint32Array(2 * SPAN_DB)
  let total = 0
  for (const cells of channels) {
    total += cells.length
    for (const db of cells) {
      const below = Math.floor(highest - db)
      if (below < counts.length) counts[below] = (counts[below] as number) + 1
    }
  }
  let seen = 0
  const at = counts.findIndex((count) => {
    seen += count
    return seen > FEW * total
  })
  return highest - (at < 0 ? counts.length : at)
}

/** Least and most of all cells, dB. */
export function cellSpan(channels: SweepMap['channels']): { readonly low: number; readonly high: number } {
  let low = Number.POSITIVE_INFINITY
  let high = Number.NEGATIVE_INFINITY
  for (const cells of channels)
    for (const db of cells) {
      if (db < low) low = db
      if (db > high) high = db
    }
  return { low, high }
}

/** The shade of a level, 0 to SHADES − 1. */
export function shadeOf(db: number, { minDb, maxDb }: Levels): number {
  return Math.max(0, Math.min(SHADES - 1, Math.round(((db - minDb) / (maxDb - minDb)) * (SHADES - 1))))
}

/** Shades of the theme in red, green and blue. */
export function themeShades(theme: PlotTheme): Uint8ClampedArray {
  return shades({ paper: rgbOf(theme.paper), now: rgbOf(theme.now), ink: rgbOf(theme.ink) })
}

/** One pixel a cell: positions across, highest frequency on top. */
export function cellPicture(map: SweepMap, channel: number, levels: Levels, colours: Uint8ClampedArray): HTMLCanvasElement {
  const { positions, rows } = map
  const cells = map.channels[channel]
  const [canvas, ctx] = canvasOf(positions, rows.count)
  const image = ctx.createImageData(positions, rows.count)
  if (cells)
    for (let i = 0; i < positions; i++)
      for (let r = 0; r < rows.count; r++) {
        const shade = 3 * shadeOf(cells[i * rows.count + r] as number, levels)
        const at = 4 * ((rows.count - 1 - r) * positions + i)
        image.data[at] = colours[shade] as number
        image.data[at + 1] = colours[shade + 1] as number
        image.data[at + 2] = colours[shade + 2] as number
        image.data[at + 3] = 255
      }
  ctx.putImageData(image, 0, 0)
  return canvas
}

/** All shades, darkest meaning on top, as a picture one pixel wide. */
export function scalePicture(colours: Uint8ClampedArray): HTMLCanvasElement {
  const [canvas, ctx] = canvasOf(1, SHADES)
  const image = ctx.createImageData(1, SHADES)
  for (let i = 0; i < SHADES; i++) image.data.set([...colours.subarray(3 * i, 3 * i + 3), 255], 4 * (SHADES - 1 - i))
  ctx.putImageData(image, 0, 0)
  return canvas
}

function canvasOf(width: number, height: number): [HTMLCanvasElement, CanvasRenderingContext2D] {
  const canvas = document.createElement('canvas')
  canvas.width = width
  canvas.height = height
  const ctx = canvas.getContext('2d')
  if (!ctx) throw new TypeError('this browser gives no canvas to draw on')
  return [canvas, ctx]
}

/** Any CSS colour, system colours too, as the browser paints it. */
function rgbOf(colour: string): Rgb {
  const [, ctx] = canvasOf(1, 1)
  ctx.fillStyle = colour
  ctx.fillRect(0, 0, 1, 1)
  const [r = 0, g = 0, b = 0] = ctx.getImageData(0, 0, 1, 1).data
  return [r, g, b]
}
