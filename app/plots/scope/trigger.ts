// Where a scope window begins: at a rising zero crossing, so that a steady sound stands still.

/** Crossings count only after the signal was this part of its peak below zero: noise around zero is none. */
const HYSTERESIS = 0.05

/**
 * Sample (with fraction) of the rising zero crossing before `searched` that leads into the highest swing: the same place in every
 * period of a steady sound. 0 when there is no crossing.
 */
export function triggerAt(signal: ArrayLike<number>, searched: number): number {
  let peak = 0
  for (let i = 0; i < signal.length; i++) peak = Math.max(peak, Math.abs(signal[i] as number))
  let armed = false
  let best = 0
  let highest = 0
  let crossing = -1
  for (let i = 1; i < signal.length; i++) {
    const before = signal[i - 1] as number
    const value = signal[i] as number
    if (value < -HYSTERESIS * peak) armed = true
    if (armed && before <= 0 && value > 0) {
      if (i >= searched) break
      crossing = i - value / (value - before)
      armed = false
    }
    if (crossing >= 0 && value > highest * 1.001) {
      highest = value
      best = crossing
    }
  }
  return best
}
