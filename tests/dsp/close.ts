/** Largest difference between two lists of numbers, for one expectation a list; Infinity when they are not as long as each other. */
export function largestDifference(a: ArrayLike<number>, b: ArrayLike<number>, from = 0, to = a.length): number {
  if (a.length !== b.length) return Number.POSITIVE_INFINITY
  let most = 0
  for (let i = from; i < to; i++) {
    const difference = Math.abs(a[i]! - b[i]!)
    if (!(difference <= most)) most = difference
  }
  return most
}
