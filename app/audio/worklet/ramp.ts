// A gain that moves in a straight line, so that no change clicks. Plain numbers that never change kind: the audio thread allocates nothing.

export interface Ramp {
  value: number
  target: number
  step: number
  /** Frames until `target` is reached; 0 while it stands. */
  left: number
}

export function createRamp(value: number): Ramp {
  // Stored as a double from the start: a field that began as a small integer would be boxed anew at its first fraction.
  const ramp = { value: 0.5, target: 0.5, step: 0.5, left: 0 }
  setRamp(ramp, value)
  return ramp
}

/** Stands at `value` at once. */
export function setRamp(ramp: Ramp, value: number): void {
  ramp.value = value
  ramp.target = value
  ramp.step = 0
  ramp.left = 0
}

/** Moves to `target` within `frames` (at least 1), from wherever it stands. Asking again for the same target changes nothing. */
export function rampTo(ramp: Ramp, target: number, frames: number): void {
  if (target === ramp.target) return
  const length = Math.max(1, Math.round(frames))
  ramp.target = target
  ramp.step = (target - ramp.value) / length
  ramp.left = length
}

/** Multiplies `gains[0 … frames)` by the ramp and moves it on. */
export function multiplyByRamp(ramp: Ramp, gains: Float64Array, frames: number): void {
  if (ramp.left === 0) {
    const value = ramp.value
    if (value === 1) return
    for (let i = 0; i < frames; i++) gains[i] = (gains[i] as number) * value
    return
  }
  for (let i = 0; i < frames; i++) {
    if (ramp.left > 0) {
      ramp.left -= 1
      ramp.value = ramp.left === 0 ? ramp.target : ramp.value + ramp.step
    }
    gains[i] = (gains[i] as number) * ramp.value
  }
}
