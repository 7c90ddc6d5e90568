// What lies under the lines of the moment: the picture of the cells, the tracks with their numbers, the scale of the shades.
import type { Track } from '../../workers/analysisJobs/mapTracks.ts'
import { type Columns, partOf } from '../columns.ts'
import { clipTo, DASH_PX } from '../drawBand.ts'
import { canvasFont } from '../host/corner.ts'
import type { PlotBox } from '../host/createPlot.ts'
import type { PlotTheme } from '../host/theme.ts'
import { hertz } from '../words.ts'

const LINE_PX = 1.25
/** A track closer than this to the one below of its kind is left out there. */
const APART_PX = 12
/** Between two positions no notch moves by more: it jumped, or another one took its place. */
const JUMP = 1.5
/** Room that a number takes. */
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
    const own = tracks.filter((track) => track.kind === kind)
    ctx.strokeStyle = kind === 'notch' ? theme.ink : theme.paper
    ctx.setLineDash(kind === 'notch' ? [] : DASH_PX.map((px) => px * box.ratio))
    own.forEach((track, k) => {
      ctx.stroke(trackPath(surface, track, own[k - 1]))
    })
  }
  ctx.restore()
  drawNumbers(
    surface,
    tracks.filter(({ kind }) => kind === 'notch'),
  )
}

const yOf = ({ box, rows }: MapSurface, hz: number) => box.top + box.height * (1 - partOf(rows, hz))
const xOf = ({ box }: MapSurface, track: Track, j: number) => box.left + (box.width * j) / (track.frequencyHz.length - 1)

function isShown(surface: MapSurface, track: Track, below: Track | undefined, j: number): boolean {
  const hz = track.frequencyHz[j] as number
  const other = below?.frequencyHz[j] ?? Number.NaN
  return !Number.isNaN(hz) && !(yOf(surface, other) - yOf(surface, hz) < APART_PX * surface.box.ratio)
}

function trackPath(surface: MapSurface, track: Track, below: Track | undefined): Path2D {
  const path = new Path2D()
  let before = Number.NaN
  track.frequencyHz.forEach((hz, j) => {
    if (!isShown(surface, track, below, j)) {
      before = Number.NaN
      return
    }
    const x = xOf(surface, track, j)
    if (hz / before < JUMP && before / hz < JUMP) path.lineTo(x, yOf(surface, hz))
    else path.moveTo(x, yOf(surface, hz))
    before = hz
  })
  return path
}

/** Where a notch turns, in plain numbers, the lowest notches first. */
function drawNumbers(surface: MapSurface, notches: readonly Track[]): void {
  const { ctx, box, theme } = surface
  const { ratio } = box
  ctx.save()
  ctx.font = canvasFont(theme, ratio)
  ctx.textAlign = 'center'
  ctx.strokeStyle = theme.paper
  ctx.fillStyle = theme.ink
  ctx.lineWidth = 3 * ratio
  ctx.lineJoin = 'round'
  const taken: { readonly x: number; readonly y: number }[] = []
  const isFree = (x: number, y: number) =>
    taken.every((other) => Math.abs(other.x - x) >= NUMBER_PX.width * ratio || Math.abs(other.y - y) >= NUMBER_PX.height * ratio)
  notches.forEach((track, k) => {
    for (const end of [lowestOf(track), highestOf(track)]) {
      if (end === null || !isShown(surface, track, notches[k - 1], end.j)) continue
      const half = (NUMBER_PX.width / 2) * ratio
      const x = Math.max(box.left + half, Math.min(box.left + box.width - half, xOf(surface, track, end.j)))
      const y = yOf(surface, end.hz) + (end.isLowest ? 1 : -1) * (0.5 * NUMBER_PX.height + 2) * ratio
      if (!isFree(x, y) || y < box.top + 0.5 * NUMBER_PX.height * ratio || y > box.top + box.height - 0.5 * NUMBER_PX.height * ratio)
        continue
      taken.push({ x, y })
      ctx.textBaseline = 'middle'
      ctx.strokeText(hertz(end.hz), x, y)
      ctx.fillText(hertz(end.hz), x, y)
    }
  })
  ctx.restore()
}

export interface TrackEnd {
  /** Its place in the track. */
  readonly j: number
  readonly hz: number
  readonly isLowest: boolean
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
