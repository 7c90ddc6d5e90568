// Where a driven shaper is smooth: panels of the half cycle that Gauss's rule integrates to the last places.
import type { Shaper } from '../set/types.ts'

/** Nodes a panel. On a panel as wide as its distance from the curve's nearest singularity the rule errs by about 1e-17 of the integrand. */
export const NODES = 20

interface Rule {
  readonly nodes: Float64Array
  readonly weights: Float64Array
}

/** Gauss–Legendre on [−1, 1]: roots of the Legendre polynomial by Newton's method. Source: Abramowitz and Stegun 25.4.29 (from memory). */
function gaussLegendre(count: number): Rule {
  const nodes = new Float64Array(count)
  const weights = new Float64Array(count)
  for (let i = 0; i < count; i++) {
    let x = Math.cos((Math.PI * (i + 0.75)) / (count + 0.5))
    let slope = 1
    for (let step = 0; step < 8; step++) {
      let before = 1
      let value = x
      for (let k = 2; k <= count; k++) {
        const next = ((2 * k - 1) * x * value - (k - 1) * before) / k
        before = value
        value = next
      }
      slope = (count * (x * value - before)) / (x * x - 1)
      x -= value / slope
    }
    nodes[i] = x
    weights[i] = 2 / ((1 - x * x) * slope * slope)
  }
  return { nodes, weights }
}

const RULE = gaussLegendre(NODES)

/** t at which a curve bends at once: between them it is analytic, or a polynomial. */
export function cornersOf(p: Pick<Shaper, 'curve' | 'deadZone' | 'points'>): readonly number[] {
  switch (p.curve) {
    case 'hardClip':
      return [1]
    case 'cubic':
      return [1.5]
    case 'deadZone':
      return p.deadZone > 0 ? [p.deadZone] : []
    case 'drawn':
      return p.points.slice(1).map(([t]) => t)
    default:
      return []
  }
}

/** t between which smooth curves are well inside their nearest singularities: (2/π)i for arctan, (π/2)i for tanh, 0.454 ± 0.377i for the diode. */
function gradesOf(p: Shaper, highest: number): readonly number[] {
  if (p.curve !== 'arctan' && p.curve !== 'tanh' && p.curve !== 'diode') return cornersOf(p)
  const grades = [0.25, 0.5, 0.75]
  for (let t = 1; t < highest; t *= 1.5) grades.push(t)
  return grades
}

export interface Nodes {
  /** Angles in [0, end]. */
  readonly angles: Float64Array
  readonly weights: Float64Array
}

/**
 * Nodes over [0, end] for a function of shaper(amplitude · cos(ψ ± spread)), even in ψ, times up to cos² of `harmonic` ψ. Panels end wherever
 * either argument passes 0, a corner or a grade of the curve.
 */
export function panelNodes(p: Shaper, amplitude: number, spread: number, harmonic: number, end: number): Nodes {
  const edges = panelEdges(p, amplitude, spread, end)
  const widest = Math.min(Math.PI / 8, 8 / harmonic)
  const bounds = [0]
  for (const edge of edges) {
    const from = bounds.at(-1) as number
    // Nearer than this there is nothing to integrate.
    if (edge - from < 1e-13) continue
    const parts = Math.ceil((edge - from) / widest)
    for (let k = 1; k <= parts; k++) bounds.push(k === parts ? edge : from + ((edge - from) * k) / parts)
  }
  const panels = bounds.length - 1
  const angles = new Float64Array(panels * NODES)
  const weights = new Float64Array(panels * NODES)
  for (let i = 0; i < panels; i++) {
    const middle = (bounds[i]! + bounds[i + 1]!) / 2
    const half = (bounds[i + 1]! - bounds[i]!) / 2
    for (let k = 0; k < NODES; k++) {
      angles[i * NODES + k] = middle - half * RULE.nodes[k]!
      weights[i * NODES + k] = half * RULE.weights[k]!
    }
  }
  return { angles, weights }
}

function panelEdges(p: Shaper, amplitude: number, spread: number, end: number): number[] {
  const edges = [end]
  const take = (angle: number) => {
    const folded = angle > Math.PI ? 2 * Math.PI - angle : Math.abs(angle)
    if (folded > 0 && folded < end) edges.push(folded)
  }
  const pass = (level: number) => {
    if (Math.abs(level) >= amplitude) return
    const angle = Math.acos(level / amplitude)
    take(angle - spread)
    if (spread > 0) take(angle + spread)
  }
  pass(0)
  for (const limit of [p.positive, -p.negative]) {
    for (const t of gradesOf(p, (amplitude * p.drive) / Math.abs(limit))) pass((t * limit) / p.drive)
  }
  return edges.sort((a, b) => a - b)
}
