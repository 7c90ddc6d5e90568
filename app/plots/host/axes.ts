// Axes of every plot: hairline grid, quiet labels, no ticks, no frame. The unit stands in the plot's own corner.
import type uPlot from 'uplot'
import { plotTheme } from './theme.ts'

export interface AxisSpec {
  readonly scale: string
  /** 2 bottom, 3 left, 1 right. */
  readonly side: 1 | 2 | 3
  /** Where the lines and labels stand. */
  splits(min: number, max: number, lengthPx: number): number[]
  /** `all`: everything that is labelled beside it. */
  label(value: number, all: readonly number[]): string
  /** Colour token of the labels; soft when absent. */
  readonly colour?: 'soft' | 'now' | 'second'
  readonly grid?: boolean
  /** Room for the labels, in widths of the small text. */
  readonly room?: number
}

export function axis({ scale, side, splits, label, colour = 'soft', grid = true, room }: AxisSpec): uPlot.Axis {
  const { textPx, font } = plotTheme()
  return {
    scale,
    side,
    font,
    size: Math.round(side === 2 ? textPx * 1.9 : textPx * (room ?? 3)),
    gap: 6,
    stroke: () => plotTheme()[colour],
    grid: { show: grid, stroke: () => plotTheme().hair, width: 1 },
    ticks: { show: false },
    border: { show: false },
    splits: (u, _axis, min, max) => splits(min, max, side === 2 ? u.bbox.width / devicePixelRatio : u.bbox.height / devicePixelRatio),
    filter: (_u, values) => values,
    values: (_u, values) => values.map((value) => label(value, values)),
  }
}

const ONE_TWO_FIVE = [1, 2, 5]

/** 20, 50, 100 … of a logarithmic frequency axis, fewer where the axis is short; `apartPx` is the room a label takes along it. */
export function frequencySplits(min: number, max: number, lengthPx: number, apartPx = 36): number[] {
  const perDecade = lengthPx / Math.log10(max / min)
  const steps = perDecade >= 3 * apartPx ? ONE_TWO_FIVE : perDecade >= 1.7 * apartPx ? [1, 3] : [1]
  const found: number[] = []
  for (let decade = 10 ** Math.floor(Math.log10(min)); decade <= max; decade *= 10)
    for (const step of steps) if (step * decade >= min && step * decade <= max) found.push(step * decade)
  return found
}

/** "200", "1 k", "20 k". */
export function frequencyLabel(hz: number): string {
  return hz >= 1000 ? `${hz / 1000} k` : String(hz)
}

/** Multiples of a 1-2-5 step (or of `steps`), so that labels stand at least `apartPx` apart. */
export function evenSplits(min: number, max: number, lengthPx: number, apartPx = 36, steps: readonly number[] = []): number[] {
  const wanted = ((max - min) * apartPx) / Math.max(1, lengthPx)
  const step = steps.find((s) => s >= wanted) ?? niceStep(wanted)
  const found: number[] = []
  for (let k = Math.ceil(min / step - 1e-9); k * step <= max + step * 1e-9; k++) found.push(Number((k * step).toPrecision(12)))
  return found
}

function niceStep(wanted: number): number {
  const decade = 10 ** Math.floor(Math.log10(wanted))
  return decade * ([1, 2, 5, 10].find((s) => s * decade >= wanted) ?? 10)
}

/** Steps of a level axis in dB. */
export const DECIBEL_STEPS = [1, 3, 6, 12, 24, 48] as const
