// Where a value stands on its track and how far a key moves it: equal differences or equal ratios.
import type { NumberSpec } from './quantity.ts'

/** Part of a log track, at its low end, that stands for the values below where the ratios start (0 above all). */
const BELOW_ZONE = 0.03
const SCRUB_DIGITS = 3
const LINEAR_STEPS = 200

type Tapered = Pick<NumberSpec, 'kind' | 'min' | 'max' | 'taper' | 'values' | 'trackMin' | 'trackMax'>

export const trackLow = (spec: Tapered): number => spec.trackMin ?? spec.min
export const trackHigh = (spec: Tapered): number => spec.trackMax ?? spec.max

/** Position on the track, 0 to 1; values off the track stand at its ends. */
export function positionOf(spec: Tapered, value: number): number {
  const low = trackLow(spec)
  const high = trackHigh(spec)
  if (spec.taper === 'linear') return clamp((value - low) / (high - low), 0, 1)
  const zone = spec.min < low ? BELOW_ZONE : 0
  if (value < low) return zone * clamp(value / low, 0, 1)
  return zone + (1 - zone) * clamp(Math.log(value / low) / Math.log(high / low), 0, 1)
}

/** The value a pointer at this position means, rounded as the track's fineness allows. */
export function valueAt(spec: Tapered, position: number): number {
  const p = clamp(position, 0, 1)
  const low = trackLow(spec)
  const high = trackHigh(spec)
  if (spec.taper === 'linear')
    return accept(spec, roundTo(low + p * (high - low), 10 ** Math.floor(Math.log10((high - low) / LINEAR_STEPS))))
  const zone = spec.min < low ? BELOW_ZONE : 0
  if (p < zone) return spec.min
  const value = low * (high / low) ** ((p - zone) / (1 - zone))
  return accept(spec, Number(value.toPrecision(SCRUB_DIGITS)))
}

/** The value one step up (+1) or down (−1); a big step is ten. Steps lie on a grid, so that the way back meets the same values. */
export function stepped(spec: Tapered, value: number, direction: 1 | -1, big: boolean): number {
  if (spec.values) return listed(spec.values, value, direction)
  if (spec.taper === 'linear') {
    const step = spec.kind === 'integer' ? 1 : niceFloor((trackHigh(spec) - trackLow(spec)) / LINEAR_STEPS)
    return accept(spec, onGrid(value, step * (big ? 10 : 1), direction))
  }
  const low = trackLow(spec)
  if (spec.min < low) {
    if (direction < 0 && value <= low) return spec.min
    if (direction > 0 && value < low) return low
  }
  const step = ratioStep(value, direction) * (big ? 10 : 1)
  return accept(spec, onGrid(value, spec.kind === 'integer' ? Math.max(1, Math.round(step)) : step, direction))
}

/** One to two per cent of a value: 0.02, 0.05 or 0.1 in its decade. Just under a bound it is the lower decade's. */
function ratioStep(value: number, direction: 1 | -1): number {
  const inside = value * (1 + direction * 1e-9)
  const decade = 10 ** Math.floor(Math.log10(inside))
  const mantissa = inside / decade
  return decade * (mantissa < 2 ? 0.02 : mantissa < 5 ? 0.05 : 0.1)
}

function onGrid(value: number, step: number, direction: 1 | -1): number {
  const at = value / step
  const next = direction > 0 ? Math.floor(at + 1e-6) + 1 : Math.ceil(at - 1e-6) - 1
  return roundTo(next * step, step)
}

function listed(values: readonly number[], value: number, direction: 1 | -1): number {
  const nearest = values.reduce((best, one, i) => (Math.abs(one - value) < Math.abs((values[best] as number) - value) ? i : best), 0)
  return values[clamp(nearest + direction, 0, values.length - 1)] as number
}

function accept(spec: Tapered, value: number): number {
  if (spec.values) return spec.values.reduce((best, one) => (Math.abs(one - value) < Math.abs(best - value) ? one : best))
  const inRange = clamp(value, spec.min, spec.max)
  return spec.kind === 'integer' ? Math.round(inRange) : inRange
}

/** 1, 2 or 5 times a power of ten, not above x. */
function niceFloor(x: number): number {
  const decade = 10 ** Math.floor(Math.log10(x))
  const mantissa = x / decade
  return decade * (mantissa < 2 ? 1 : mantissa < 5 ? 2 : 5)
}

/** To a multiple of `step`, without the binary dust of the multiplication. */
function roundTo(value: number, step: number): number {
  const decimals = Math.max(0, 1 - Math.floor(Math.log10(step)))
  return Number((Math.round(value / step) * step).toFixed(Math.min(15, decimals))) + 0
}

const clamp = (x: number, low: number, high: number) => Math.max(low, Math.min(high, x))
