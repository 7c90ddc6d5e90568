// Phrases repeat without a seam: whatever still sounds at the end is laid over the beginning, so the buffer is a circle.
import { peak, rms } from '../signal/levels.ts'

/** Adds a sounding event to the circle from frame `start` on; `sample(i)` is its i-th sample, `frames` its length (may exceed the circle). */
export function addToCircle(circle: Float64Array, start: number, frames: number, sample: (i: number) => number): void {
  let at = start % circle.length
  for (let i = 0; i < frames; i++) {
    circle[at] = (circle[at] as number) + sample(i)
    if (++at === circle.length) at = 0
  }
}

export interface DecayingSine {
  readonly start: number
  readonly frames: number
  /** Radians a sample. */
  readonly angle: number
  readonly phase: number
  readonly amplitude: number
  /** Nepers a sample. */
  readonly decay: number
}

/**
 * Adds amplitude e^(−decay n) sin(phase + angle n) for n = 0 … frames − 1. angle in (0, π). By the recurrence
 * s[n] = 2 r cos(w) s[n−1] − r² s[n−2], r = e^(−decay): two multiplications a sample where a sine costs twenty.
 */
export function addDecayingSine(circle: Float64Array, { start, frames, angle, phase, amplitude, decay }: DecayingSine): void {
  const r = Math.exp(-decay)
  const a = 2 * r * Math.cos(angle)
  const b = r * r
  let s1 = (amplitude * Math.sin(phase - angle)) / r
  let s2 = (amplitude * Math.sin(phase - 2 * angle)) / b
  let at = start % circle.length
  for (let left = frames; left > 0; ) {
    const end = Math.min(circle.length, at + left)
    left -= end - at
    for (; at < end; at++) {
      const s = a * s1 - b * s2
      circle[at] = (circle[at] as number) + s
      s2 = s1
      s1 = s
    }
    at = 0
  }
}

/** Scales in place to `targetRms`, or to `maxPeak` where that is less, and returns the same array. Silence stays. */
export function setLevel(x: Float64Array, { targetRms, maxPeak }: { targetRms: number; maxPeak: number }): Float64Array {
  const gain = Math.min(targetRms / rms(x), maxPeak / peak(x))
  if (Number.isFinite(gain)) for (let i = 0; i < x.length; i++) x[i] = (x[i] as number) * gain
  return x
}
