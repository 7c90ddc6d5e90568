// One-dimensional searches the loop's analysis shares.

const GOLDEN = (Math.sqrt(5) - 1) / 2

/** Where f is largest in [from, to], by golden section down to `tolerance` (same unit as the argument); f must have one maximum there. */
export function goldenMaximum(f: (t: number) => number, from: number, to: number, tolerance: number): { at: number; value: number } {
  let a = from
  let b = to
  let c = b - GOLDEN * (b - a)
  let d = a + GOLDEN * (b - a)
  let fc = f(c)
  let fd = f(d)
  while (b - a > tolerance && c > a && d < b) {
    if (fc >= fd) {
      b = d
      d = c
      fd = fc
      c = b - GOLDEN * (b - a)
      fc = f(c)
    } else {
      a = c
      c = d
      fc = fd
      d = a + GOLDEN * (b - a)
      fd = f(d)
    }
  }
  return fc >= fd ? { at: c, value: fc } : { at: d, value: fd }
}

/** Indices of values no smaller than both neighbours, ends included, largest first; NaN counts as −∞. */
export function localMaxima(values: ArrayLike<number>): number[] {
  const value = (i: number) => {
    const v = values[i]
    return v === undefined || Number.isNaN(v) ? Number.NEGATIVE_INFINITY : v
  }
  const found: number[] = []
  for (let i = 0; i < values.length; i++) {
    if (value(i) > Number.NEGATIVE_INFINITY && value(i) >= value(i - 1) && value(i) >= value(i + 1)) found.push(i)
  }
  return found.sort((a, b) => value(b) - value(a))
}

/** The argument in [from, to] where `test` turns from its value at `from`, by bisection to rounding. */
export function bisect(test: (t: number) => boolean, from: number, to: number, steps = 100): number {
  const first = test(from)
  let a = from
  let b = to
  for (let i = 0; i < steps; i++) {
    const middle = (a + b) / 2
    if (middle <= Math.min(a, b) || middle >= Math.max(a, b)) break
    if (test(middle) === first) a = middle
    else b = middle
  }
  return (a + b) / 2
}
