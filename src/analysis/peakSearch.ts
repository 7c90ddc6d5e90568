// The largest value of a smooth function of one variable between two ends.

const GOLDEN = (Math.sqrt(5) - 1) / 2

/**
 * The largest f on [from, to], ends included: the best of `samples` + 1 even points, then golden section in its two cells. Exact to
 * rounding when f has one summit in those cells. Returns only values that f really takes.
 */
export function largestBetween(f: (x: number) => number, from: number, to: number, samples = 16): { x: number; value: number } {
  const step = (to - from) / samples
  let best = { x: from, value: f(from) }
  const keep = (x: number): number => {
    const value = f(x)
    if (value > best.value) best = { x, value }
    return value
  }
  for (let i = 1; i <= samples; i++) keep(i === samples ? to : from + i * step)
  let low = Math.max(from, best.x - step)
  let high = Math.min(to, best.x + step)
  let x1 = high - GOLDEN * (high - low)
  let x2 = low + GOLDEN * (high - low)
  let f1 = keep(x1)
  let f2 = keep(x2)
  // The value is level at its summit: a bracket of 1e-8 of the span leaves 1e-16 of its height.
  while (high - low > 1e-8 * (to - from)) {
    if (f1 > f2) {
      high = x2
      x2 = x1
      f2 = f1
      x1 = high - GOLDEN * (high - low)
      f1 = keep(x1)
    } else {
      low = x1
      x1 = x2
      f1 = f2
      x2 = low + GOLDEN * (high - low)
      f2 = keep(x2)
    }
  }
  return best
}
