// Arithmetic of "what is being heard now".

export interface Stamp {
  /** Context frame of the stamp. */
  readonly frame: number
  /** Sweep position at that frame, 0 to 1, and its change a frame. */
  readonly position: number
  readonly step: number
}

/**
 * Sweep position heard at context time `heardS` (s): position + (heardS · fs − frame) · step, wrapped to [0, 1). The time heard lies behind the stamp by the
 * output latency, so this usually runs backwards. Bounded to `reachS` seconds from the stamp: a stopped report must not let the position run on.
 */
export function positionAt(stamp: Stamp, heardS: number, sampleRate: number, reachS = 0.5): number {
  const frames = Math.min(Math.max(heardS * sampleRate - stamp.frame, -reachS * sampleRate), reachS * sampleRate)
  const position = stamp.position + frames * stamp.step
  return position - Math.floor(position)
}

/** Tells whether a clock stands still: fed with its readings, true once they have not moved for `limitMs`. */
export function createStallWatch(limitMs: number): (clockS: number, nowMs: number) => boolean {
  let last = Number.NaN
  let since = 0
  return (clockS, nowMs) => {
    if (clockS !== last) {
      last = clockS
      since = nowMs
      return false
    }
    return nowMs - since >= limitMs
  }
}
