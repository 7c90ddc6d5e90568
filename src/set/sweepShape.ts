// The sweep's shape s(Φ) in [−1, 1]: the one definition that ranges here and the signal path evaluate.
import type { ParameterSet, Point } from './types.ts'

type Sweep = ParameterSet['sweep']

/** Edge of a square or ramp as part of the cycle: e = min(edgeMs · rateHz / 1000, ½). */
export function sweepEdge(sweep: Sweep): number {
  return Math.min((sweep.edgeMs * sweep.rateHz) / 1000, 0.5)
}

/**
 * s(Φ) of one voice, Φ in cycles, offsets included (any finite number). φ = Φ − floor Φ, e the edge, ψ = φ wrapped to [−½, ½):
 * sine sin 2πφ · triangle T · square clamp(T/(2e), −1, 1), ±1 when e = 0 · rampUp −2ψ/e for |ψ| < e/2, else (2φ−1)/(1−e) ·
 * rampDown its negative · drift cosine interpolation between hashed values, k = floor Φ · drawn straight lines, closed.
 * `voice` matters to drift only. Source: DESIGN 3.
 */
export function sweepShapeValue(sweep: Sweep, phase: number, voice = 0): number {
  const cycle = Math.floor(phase)
  const phi = phase - cycle
  switch (sweep.shape) {
    case 'sine':
      return Math.sin(2 * Math.PI * phi)
    case 'triangle':
      return triangle(phi)
    case 'square':
      return square(phi, sweepEdge(sweep))
    case 'rampUp':
      return rampUp(phi, sweepEdge(sweep))
    case 'rampDown':
      return -rampUp(phi, sweepEdge(sweep))
    case 'drift':
      return drift(sweep.seed, voice, cycle, phi)
    case 'drawn':
      return drawn(sweep.points, phi)
  }
}

export function triangle(phi: number): number {
  if (phi < 0.25) return 4 * phi
  return phi < 0.75 ? 2 - 4 * phi : 4 * phi - 4
}

export function square(phi: number, edge: number): number {
  if (edge === 0) return phi < 0.5 ? 1 : -1
  return Math.max(-1, Math.min(1, triangle(phi) / (2 * edge)))
}

export function rampUp(phi: number, edge: number): number {
  const fromJump = phi < 0.5 ? phi : phi - 1
  if (Math.abs(fromJump) < edge / 2) return (-2 * fromJump) / edge
  return (2 * phi - 1) / (1 - edge)
}

export function drift(seed: number, voice: number, cycle: number, phi: number): number {
  const from = driftValue(seed, voice, cycle)
  const to = driftValue(seed, voice, cycle + 1)
  return from + ((to - from) * (1 - Math.cos(Math.PI * phi))) / 2
}

/** r_k = int32(fmix32(seed + 0x9E3779B9 v + 0x85EBCA6B k mod 2³²)) / 2³¹, in [−1, 1). fmix32: the 32-bit MurmurHash3 finaliser. */
export function driftValue(seed: number, voice: number, cycle: number): number {
  let h = (seed + Math.imul(0x9e3779b9, voice) + Math.imul(0x85ebca6b, cycle)) | 0
  h ^= h >>> 16
  h = Math.imul(h, 0x85ebca6b)
  h ^= h >>> 13
  h = Math.imul(h, 0xc2b2ae35)
  h ^= h >>> 16
  return h / 2147483648
}

/** Straight lines through the points; past the last one towards the first, one cycle later. No points: 0. Makes no array: the audio thread evaluates it. */
export function drawn(points: readonly Point[], phi: number): number {
  const count = points.length
  if (count === 0) return 0
  let next = 0
  while (next < count && (points[next] as Point)[0] <= phi) next++
  const before = points[next > 0 ? next - 1 : count - 1] as Point
  const after = points[next < count ? next : 0] as Point
  const x0 = next > 0 ? before[0] : before[0] - 1
  const x1 = next < count ? after[0] : after[0] + 1
  return x1 === x0 ? before[1] : before[1] + ((after[1] - before[1]) * (phi - x0)) / (x1 - x0)
}
