// The largest value of a piecewise smooth function of one variable between two ends.
import { goldenMaximum } from './loopSearch.ts'

/**
 * The largest f found on [from, to]: the best of `samples` + 1 even points, ends included, then golden section in the two cells
 * next to it, exact to rounding when f has one summit there. Only values that f really takes.
 */
export function largestBetween(f: (x: number) => number, from: number, to: number, samples = 16): number {
  const step = (to - from) / samples
  let at = from
  let best = f(from)
  for (let i = 1; i <= samples; i++) {
    const x = i === samples ? to : from + i * step
    const value = f(x)
    if (value > best) {
      best = value
      at = x
    }
  }
  // The value is level at its summit: a bracket of 1e-8 of the span leaves 1e-16 of its height.
  const summit = goldenMaximum(f, Math.max(from, at - step), Math.min(to, at + step), 1e-8 * (to - from))
  return Math.max(best, summit.value)
}
