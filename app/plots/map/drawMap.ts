// What lies under the lines of the moment: the picture of the cells, the tracks with their numbers, the scale of the shades.
import type { Track } from '../../workers/analysisJobs/mapTracks.ts'
import { type Columns, partOf } from '../columns.ts'
import { clipTo, DASH_PX } from '../drawBand.ts'
import { canvasFont } from '../host/corner.ts'
import type { PlotBox } from '../host/createPlot.ts'
import type { PlotTheme } from '../host/theme.ts'
import { hertz } from '../words.ts'

const LINE_PX = 1.25
/** Lines of a kind stand at least so far apart. */
const APART_PX = 12
/** How many lines have numbers, and the room that a number takes. */
const NUMBERED = 3
const NUMBER_PX = { width: 44, height: 16 }

export interface MapSurface {
  readonly ctx: CanvasRenderingContext2D
  readonly box: PlotBox
  readonly theme: PlotTheme
  readonly rows: Columns
}

/** The picture over the plotting area; `stale` pales it. */
export function drawCells({ ctx, box }: MapSurface, picture: HTMLCanvasElement, stale: boolean): void {
  ctx.globalAlpha = stale ? 0.4 : 1
  ctx.imageSmoothingEnabled = true
  ctx.drawImage(picture, box.left, box.top, box.width, box.height)
  ctx.globalAlpha = 1
}

/** Notches solid, peaks dashed, each in the colour that stands out where it runs. */
export function drawTracks(surface: MapSurface, tracks: readonly Track[]): void {
  const { ctx, box, theme } = surface
  ctx.save()
  clipTo(ctx, box)
  ctx.lineWidth = LINE_PX * box.ratio
  ctx.lineJoin = 'round'
  for (const kind of ['peak', 'notch'] as const) {
    const lines = shownLines(
      surface,
      tracks.filter((track) => track.kind === kind),
    )
    ctx.strokeStyle = kind === 'notch' ? theme.ink : theme.paper
    ctx.setLineDash(kind === 'notch' ? [] : DASH_PX.map((px) => px * box.ratio))
    for (const line of lines) ctx.stroke(linePath(line))
    if (kind === 'notch') drawNumbers(surface, lines.slice(0, NUMBERED))
  }
  ctx.restore()
}

const yOf = ({ box, rows }: MapSurface, hz: number) => box.top + box.height * (1 - partOf(rows, hz))

/** A track on the canvas; NaN where it is left out. */
interface Line {
  readonly track: Track
  readonly xs: readonly number[]
  readonly ys: readonly number[]
}

/** Tracks of one kind, the lowest first: each is left out where it comes too close to one already there. */
function shownLines(surface: MapSurface, tracks: readonly Track[]): Line[] {
  const { box } = surface
  const lines: Line[] = []
  for (const track of tracks) {
    const last = track.frequencyHz.length - 1
    const isFree = (y: number, j: number) => lines.every(({ ys }) => !(Math.abs((ys[j] as number) - y) < APART_PX * box.ratio))
    const ys = Array.from(track.frequencyHz, (hz, j) => {
      const y = yOf(surface, hz)
      return isFree(y, j) ? y : Number.NaN
    })
    lines.push({ track, ys, xs: ys.map((_, j) => box.left + (box.width * j) / last) })
  }
  return lines
}

function linePath({ xs, ys }: Line): Path2D {
  const path = new Path2D()
  let joins = false
  ys.forEach((y, j) => {
    const isOn = !Number.isNaN(y)
    if (isOn && joins) path.lineTo(xs[j] as number, y)
    else if (isOn) path.moveTo(xs[j] as number, y)
    joins = isOn
  })
  return path
}

/** Where notches turn, in plain numbers. */
function drawNumbers(surface: MapSurface, lines: readonly Line[]): void {
  const { ctx, box, theme } = surface
  const { ratio } = box
  ctx.font = canvasFont(theme, ratio)
  ctx.textAlign = 'center'
  ctx.textBaseline = 'middle'
  ctx.strokeStyle = theme.paper
  ctx.fillStyle = theme.ink
  ctx.lineWidth = 3 * ratio
  const half = { x: (NUMBER_PX.width / 2) * ratio, y: (NUMBER_PX.height / 2) * ratio }
  const taken: { readonly x: number; readonly y: number }[] = []
  for (const { track, xs, ys } of lines)
    for (const end of turnsOf(track)) {
      if (Number.isNaN(ys[end.j])) continue
      const x = Math.max(box.left + half.x, Math.min(box.left + box.width - half.x, xs[end.j] as number))
      const y = (ys[end.j] as number) + (end.isLowest ? 1 : -1) * (half.y + 2 * ratio)
      const isFree = taken.every((other) => Math.abs(other.x - x) >= 2 * half.x || Math.abs(other.y - y) >= 2 * half.y)
      if (!isFree || y < box.top + half.y || y > box.top + box.height - half.y) continue
      taken.push({ x, y })
      ctx.strokeText(hertz(end.hz), x, y)
      ctx.fillText(hertz(end.hz), x, y)
    }
}

export interface TrackEnd {
  /** Its place in the track. */
  readonly j: number
  readonly hz: number
  readonly isLowest: boolean
}

/** Both ends of a track, one where they read the same. */
function turnsOf(track: Track): TrackEnd[] {
  const [low, high] = [lowestOf(track), highestOf(track)]
  if (low === null || high === null) return []
  return hertz(low.hz) === hertz(high.hz) ? [low] : [low, high]
}

export const lowestOf = (track: Track): TrackEnd | null => endOf(track, true)
export const highestOf = (track: Track): TrackEnd | null => endOf(track, false)

function endOf({ frequencyHz }: Track, isLowest: boolean): TrackEnd | null {
  let found: TrackEnd | null = null
  frequencyHz.forEach((hz, j) => {
    if (!Number.isNaN(hz) && (found === null || (isLowest ? hz < found.hz : hz > found.hz))) found = { j, hz, isLowest }
  })
  return found
}

const SCALE_PX = { away: 8, width: 8 }
/** From the plotting area to the numbers of the scale. */
export const SCALE_ROOM_PX = SCALE_PX.away + SCALE_PX.width + 4

/** The shades beside the picture, where their axis has its numbers. */
export function drawScale({ ctx, box, theme }: MapSurface, picture: HTMLCanvasElement): void {
  const { ratio } = box
  const x = box.left + box.width + SCALE_PX.away * ratio
  ctx.drawImage(picture, x, box.top, SCALE_PX.width * ratio, box.height)
  ctx.strokeStyle = theme.edge
  ctx.lineWidth = ratio
  ctx.strokeRect(x, box.top, SCALE_PX.width * ratio, box.height)
}

/** The axes' units, above them. */
export function drawUnits({ ctx, box, theme }: MapSurface): void {
  const { ratio } = box
  ctx.font = canvasFont(theme, ratio)
  ctx.fillStyle = theme.soft
  ctx.textBaseline = 'bottom'
  ctx.textAlign = 'right'
  const y = box.top - 6 * ratio
  ctx.fillText('Hz', box.left - 6 * ratio, y)
  ctx.textAlign = 'left'
  ctx.fillText('dB', box.left + box.width + SCALE_PX.away * ratio, y)
}
