// The pixel columns of a logarithmic frequency axis, and the points at which a trace is computed in them: both edges
// and the middle of each column, so that a line has two points a pixel.

export interface Columns {
  readonly lowHz: number
  readonly highHz: number
  /** One a CSS pixel. */
  readonly count: number
}

export const LOWEST_HZ = 20
export const HIGHEST_HZ = 20000

/** The axis of a set: 20 Hz to 20 kHz, or to half its rate. */
export function axisColumns(sampleRate: number, widthPx: number): Columns {
  return { lowHz: LOWEST_HZ, highHz: Math.min(HIGHEST_HZ, sampleRate / 2), count: Math.max(2, Math.round(widthPx)) }
}

/** Frequencies of the trace's points, 2 · count + 1. */
export function columnPoints({ lowHz, highHz, count }: Columns): Float64Array {
  const points = new Float64Array(2 * count + 1)
  const ratio = Math.log(highHz / lowHz) / (2 * count)
  for (let i = 0; i < 2 * count; i++) points[i] = lowHz * Math.exp(i * ratio)
  points[2 * count] = highHz
  return points
}

/** Where a frequency stands on the axis, 0 to 1 (outside, below or above). */
export function partOf({ lowHz, highHz }: Columns, hz: number): number {
  return Math.log(hz / lowHz) / Math.log(highHz / lowHz)
}

export function frequencyAt({ lowHz, highHz }: Columns, part: number): number {
  return lowHz * (highHz / lowHz) ** part
}

export const sameColumns = (a: Columns, b: Columns): boolean => a.lowHz === b.lowHz && a.highHz === b.highHz && a.count === b.count
