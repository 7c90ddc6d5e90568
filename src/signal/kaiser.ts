// The Kaiser window, fast enough for every tap of a long table, and the cubic that it is read by.
//
// w(u) = I0(β √(1 − u²))/I0(β), |u| ≤ 1. Source: J. F. Kaiser, "Nonrecursive Digital Filter Design Using the I0-sinh Window Function", Proc. IEEE ISCAS
// 1974 (from memory). The window is smooth: from 4096 points, cubic interpolation misses it by less than 1e-11, far below any stop-band.
const POINTS = 4096

/** w at u ≥ 0, 0 from u = 1 on. */
export function kaiserWindow(beta: number): (u: number) => number {
  // w at u = (i − 1)/POINTS, one point of each side spare for the cubic; w is even, and its formula goes on past u = 1.
  const table = Float64Array.from({ length: POINTS + 3 }, (_, i) => {
    const u = Math.abs(i - 1) / POINTS
    return besselI0Of(beta * beta * (1 - u * u)) / besselI0Of(beta * beta)
  })
  return (u) => {
    if (u >= 1) return 0
    const at = u * POINTS
    const i = Math.floor(at)
    const [a, b, c, d] = cubicWeights(at - i)
    return a * (table[i] as number) + b * (table[i + 1] as number) + c * (table[i + 2] as number) + d * (table[i + 3] as number)
  }
}

/** Third-order Lagrange weights of the points −1, 0, 1, 2 for a place f in [0, 1]. */
export function cubicWeights(f: number): readonly [number, number, number, number] {
  return [(-f * (f - 1) * (f - 2)) / 6, ((f + 1) * (f - 1) * (f - 2)) / 2, (-(f + 1) * f * (f - 2)) / 2, ((f + 1) * f * (f - 1)) / 6]
}

/** I0(√q) = Σ (q/4)^k / (k!)², for q > −1 too, where the window's formula goes on smoothly past its edge. */
function besselI0Of(q: number): number {
  let term = 1
  let sum = 1
  for (let k = 1; Math.abs(term) > 1e-17 * sum; k++) {
    term *= q / 4 / (k * k)
    sum += term
  }
  return sum
}
