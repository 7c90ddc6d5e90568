// What the Curve plot shows of one shaper: the exact curve, its table's error, and harmonics, DC and folded energy against drive.
import { foldedEnergy } from '../../src/analysis/folded.ts'
import { drivenSine, harmonicDb, totalDistortion } from '../../src/analysis/harmonics.ts'
import { tableError } from '../../src/analysis/tableError.ts'
import { shaperCorners } from '../../src/analysis/tableErrorBend.ts'
import { createShaper } from '../../src/dsp/shaper.ts'
import { readShaperTable, tablePoint } from '../../src/dsp/shaperTable.ts'
import type { Shaper } from '../../src/set/types.ts'

export interface CurveRequest {
  readonly shaper: Shaper
  /** Peak of the sine that is driven through it. */
  readonly amplitude: number
  /** Hz. */
  readonly sampleRate: number
  /** Harmonics 2 to this. */
  readonly highest: number
}

export interface CurveReply {
  readonly request: CurveRequest
  readonly transfer: Transfer
  readonly against: AgainstDrive
  /** The same at the shaper's own drive: one of each. */
  readonly own: AgainstDrive
}

export interface Transfer {
  /** Evenly over ± a little more than full scale and table. */
  readonly x: Float64Array
  readonly y: Float64Array
  /** Largest |table − curve| around each x; NaN beyond the table. */
  readonly error: Float64Array
  /** Points of the table that are far enough apart to be seen one by one; none else. */
  readonly tableX: Float64Array
  readonly tableY: Float64Array
  readonly step: number
  readonly largest: number
  readonly at: number
  readonly bound: number
  readonly boundBy: 'bend' | 'corners'
  readonly measure: number
  /** Largest difference of curve and held ends beyond the table; null where the curve has no end. */
  readonly beyond: number | null
}

/** Levels against the first harmonic, dB; NaN where there is none. */
export interface AgainstDrive {
  readonly drives: Float64Array
  /** Harmonics 2, 3 … */
  readonly harmonics: readonly Float64Array[]
  readonly distortion: Float64Array
  /** |mean| of what comes out, of full scale, dB. */
  readonly dcDb: Float64Array
  /** At the set's rate, with the shaper's own anti-aliasing. */
  readonly foldedDb: Float64Array
}

const POINTS = 600
/** Shown beyond the larger of full scale and table. */
const AIR = 1.12
const SEEN_APART = 100
const DRIVES = 120
/** The track of the drive's field. */
const LEAST_DRIVE = 0.1
const MOST_DRIVE = 30

export function curveJob(request: CurveRequest): CurveReply {
  return {
    request,
    transfer: transferOf(request.shaper),
    against: againstDrive(request),
    own: atDrives(request, Float64Array.of(request.shaper.drive)),
  }
}

function transferOf(shaper: Shaper): Transfer {
  const { table, ...figures } = tableError(shaper)
  const { curve } = createShaper(shaper)
  const reach = AIR * Math.max(1, table.range)
  const x = Float64Array.from({ length: POINTS + 1 }, (_, i) => reach * ((2 * i) / POINTS - 1))
  const error = (at: number) => Math.abs(readShaperTable(table, at) - curve(at))
  const corners = shaperCorners(shaper, table.range)
  const half = reach / POINTS
  const intervals = table.values.length - 1
  const seen = intervals * (reach / table.range) <= SEEN_APART ? Array.from(table.values.keys()) : []
  return {
    x,
    y: x.map(curve),
    error: x.map((at) => {
      if (figures.largest === 0) return Math.abs(at) > table.range ? Number.NaN : 0
      const near = corners.filter((corner) => Math.abs(corner.x - at) <= half).map((corner) => error(corner.x))
      return Math.max(errorAround(error, at, half, table), ...near)
    }),
    tableX: Float64Array.from(seen, (i) => tablePoint(table, i)),
    tableY: Float64Array.from(seen, (i) => table.values[i] as number),
    step: table.step,
    ...figures,
  }
}

/** A hump between two points is drawn as such when it is this many shown x wide; denser ones as the line over their tops. */
const HUMP = 6
const LOOKS = 3

/** Error at x, or where humps are dense the largest in the middles of the intervals around it. */
function errorAround(
  error: (x: number) => number,
  x: number,
  half: number,
  { range, step }: { readonly range: number; readonly step: number },
): number {
  if (Math.abs(x) > range) return Number.NaN
  if (step > 2 * half * HUMP) return error(x)
  let most = 0
  for (let k = 0; k < LOOKS; k++) {
    const near = x - half + (2 * half * (k + 0.5)) / LOOKS
    const middle = (Math.floor((near + range) / step) + 0.5) * step - range
    most = Math.max(most, error(Math.max(-range, Math.min(range, middle))))
  }
  return most
}

let kept: { readonly key: string; readonly against: AgainstDrive } | null = null

/** Does not depend on the drive itself: dragging it costs nothing here. */
function againstDrive(request: CurveRequest): AgainstDrive {
  const { shaper, amplitude, sampleRate, highest } = request
  const low = Math.min(LEAST_DRIVE, shaper.drive)
  const high = Math.max(MOST_DRIVE, shaper.drive)
  const { drive, tableSize, tableRange, ...rest } = shaper
  const key = JSON.stringify([rest, amplitude, sampleRate, highest, low, high])
  if (kept?.key === key) return kept.against
  const against = atDrives(
    request,
    Float64Array.from({ length: DRIVES + 1 }, (_, i) => low * (high / low) ** (i / DRIVES)),
  )
  kept = { key, against }
  return against
}

function atDrives({ shaper, amplitude, sampleRate, highest }: CurveRequest, drives: Float64Array): AgainstDrive {
  const sines = Array.from(drives, (drive) => drivenSine({ ...shaper, drive }, amplitude, highest))
  const decibels = (of: (i: number) => number | null) => drives.map((_, i) => of(i) ?? Number.NaN)
  return {
    drives,
    harmonics: Array.from({ length: highest - 1 }, (_, k) => decibels((i) => harmonicDb(sines[i]!, k + 2))),
    distortion: decibels((i) => totalDistortion(sines[i]!)),
    dcDb: decibels((i) => {
      const dc = Math.abs(sines[i]!.amplitudes[0] as number)
      // Less is what rounding leaves of a mean that is 0.
      return dc > 1e-14 ? 20 * Math.log10(dc) : null
    }),
    foldedDb: decibels((i) => {
      const { db } = foldedEnergy({ ...shaper, drive: drives[i] as number }, amplitude, sampleRate)
      return db === null || db <= -400 ? null : db
    }),
  }
}
