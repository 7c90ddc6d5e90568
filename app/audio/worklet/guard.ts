// The guard: mutes an output that runs away, says so, and lets it sound again once it is safe. It stands in the processor, before the
// listening level, so that neither a hidden tab nor a busy page switches it off.
//
// Limit: +12 dBFS at the effect's output (4.0), or a sample that is no number. The first sample beyond it starts a fade that is
// silent 5 ms later (a sample that is no number is never passed on). The effect's memory is then cleared, which takes a while for long lines,
// so the effect rests for a quarter of a second before it runs on unheard ("probing"). It is heard again, over 200 ms, when its output has
// stayed 6 dB below the limit for one second. An output that runs away again within ten seconds of that stays muted until the set changes or
// somebody resumes it: otherwise a slowly growing loop would come back every few seconds. Until the fade ends, the cap in listening.ts holds what is heard to +6 dB above the listening level.
import { createRamp, multiplyByRamp, type Ramp, rampTo } from './ramp.ts'

export const GUARD_LIMIT_DB = 12
export const GUARD_LIMIT = 10 ** (GUARD_LIMIT_DB / 20)
const SAFE = GUARD_LIMIT / 2
const CLOSE_S = 0.005
const OPEN_S = 0.2
const PROBE_S = 1
const AGAIN_S = 10
const REST_S = 0.25

export const GUARD_OPEN = 0
export const GUARD_CLOSING = 1
export const GUARD_PROBING = 2

export const TRIPPED_BY_LEVEL = 1
export const TRIPPED_BY_NON_FINITE = 2

export interface Guard {
  readonly sampleRate: number
  state: number
  /** What tripped it last: 0 nothing yet, TRIPPED_BY_…. */
  reason: number
  /** Stays muted until the set changes or somebody resumes. */
  latched: boolean
  /** Times tripped since start. */
  trips: number
  /** Largest finite |sample| seen since it tripped. */
  peak: number
  safeFrames: number
  /** Frames for which the effect is not run after it was cleared. */
  restFrames: number
  sinceOpened: number
  /** The ten seconds, in frames. */
  readonly againFrames: number
  readonly gain: Ramp
  readonly gains: Float64Array
}

export function createGuard(sampleRate: number, maxFrames: number): Guard {
  return {
    sampleRate,
    state: GUARD_OPEN,
    reason: 0,
    latched: false,
    trips: 0,
    peak: 0.5,
    safeFrames: 0,
    restFrames: 0,
    sinceOpened: Math.round(AGAIN_S * sampleRate),
    againFrames: Math.round(AGAIN_S * sampleRate),
    gain: createRamp(1),
    gains: new Float64Array(maxFrames),
  }
}

/**
 * Passes `left` and `right` through the guard in place. Returns true when the effect's memory must be cleared now: the output is silent, or
 * ran away again while nobody hears it. Never throws, allocates nothing.
 */
export function applyGuard(guard: Guard, left: Float64Array, right: Float64Array, frames: number): boolean {
  if (guard.state === GUARD_OPEN) return watch(guard, left, right, frames)
  guard.gains.fill(1, 0, frames)
  const beyond = firstBeyond(guard, left, right, 0, frames, GUARD_LIMIT) < frames
  silenceNonFinite(left, right, 0, frames)
  if (guard.state === GUARD_CLOSING) return close(guard, left, right, 0, frames)
  const unsafe = beyond || firstBeyond(guard, left, right, 0, frames, SAFE) < frames
  left.fill(0, 0, frames)
  right.fill(0, 0, frames)
  guard.safeFrames = unsafe ? 0 : guard.safeFrames + frames
  if (!guard.latched && guard.safeFrames >= PROBE_S * guard.sampleRate) open(guard)
  if (beyond) rest(guard)
  return beyond
}

/** Whether the effect rests for these frames: it need not be run, and what stands in for its output is silence. */
export function guardRests(guard: Guard, frames: number): boolean {
  if (guard.restFrames <= 0) return false
  guard.restFrames -= frames
  return true
}

function rest(guard: Guard): void {
  guard.restFrames = Math.round(REST_S * guard.sampleRate)
}

/** The set changed: what ran away before may not any more. */
export function forgetLatch(guard: Guard): void {
  guard.latched = false
  guard.sinceOpened = guard.againFrames
}

/** Somebody asked for the sound back. True when the effect's memory must be cleared first. */
export function resumeGuard(guard: Guard): boolean {
  if (guard.state === GUARD_OPEN) return false
  forgetLatch(guard)
  open(guard)
  return true
}

function watch(guard: Guard, left: Float64Array, right: Float64Array, frames: number): boolean {
  const again = guard.againFrames
  if (guard.sinceOpened < again) guard.sinceOpened += frames
  const at = firstBeyond(guard, left, right, 0, frames, GUARD_LIMIT)
  const stands = guard.gain.left === 0 && guard.gain.value === 1
  if (at === frames && stands) return false
  guard.gains.fill(1, 0, frames)
  if (at === frames) {
    multiplyByRamp(guard.gain, guard.gains, frames)
    scale(guard, left, right, 0, frames)
    return false
  }
  guard.latched = guard.trips > 0 && guard.sinceOpened < again
  guard.trips += 1
  guard.reason = isNumber(left[at] as number) && isNumber(right[at] as number) ? TRIPPED_BY_LEVEL : TRIPPED_BY_NON_FINITE
  guard.peak = 0.5
  notePeak(guard, left, right, at, frames)
  guard.state = GUARD_CLOSING
  rampTo(guard.gain, 0, CLOSE_S * guard.sampleRate)
  silenceNonFinite(left, right, at, frames)
  return close(guard, left, right, at, frames)
}

/** Fades from frame `from` on; true when the fade has ended. */
function close(guard: Guard, left: Float64Array, right: Float64Array, from: number, frames: number): boolean {
  const { gain, gains } = guard
  for (let i = from; i < frames; i++) {
    if (gain.left > 0) {
      gain.left -= 1
      gain.value = gain.left === 0 ? gain.target : gain.value + gain.step
    }
    gains[i] = gain.value
  }
  scale(guard, left, right, from, frames)
  if (gain.left > 0) return false
  guard.state = GUARD_PROBING
  guard.safeFrames = 0
  rest(guard)
  return true
}

function open(guard: Guard): void {
  guard.state = GUARD_OPEN
  guard.sinceOpened = 0
  guard.restFrames = 0
  rampTo(guard.gain, 1, OPEN_S * guard.sampleRate)
}

/** First frame whose magnitude exceeds `limit` or is no number; `frames` when none does. */
function firstBeyond(guard: Guard, left: Float64Array, right: Float64Array, from: number, frames: number, limit: number): number {
  for (let i = from; i < frames; i++) {
    if (!(Math.abs(left[i] as number) <= limit) || !(Math.abs(right[i] as number) <= limit)) {
      if (guard.state !== GUARD_OPEN) notePeak(guard, left, right, i, frames)
      return i
    }
  }
  return frames
}

function notePeak(guard: Guard, left: Float64Array, right: Float64Array, from: number, frames: number): void {
  let peak = guard.peak
  for (let i = from; i < frames; i++) {
    const l = Math.abs(left[i] as number)
    const r = Math.abs(right[i] as number)
    if (l > peak && l < Number.POSITIVE_INFINITY) peak = l
    if (r > peak && r < Number.POSITIVE_INFINITY) peak = r
  }
  guard.peak = peak
}

const isNumber = (x: number) => x - x === 0

function silenceNonFinite(left: Float64Array, right: Float64Array, from: number, frames: number): void {
  for (let i = from; i < frames; i++) {
    if (!isNumber(left[i] as number)) left[i] = 0
    if (!isNumber(right[i] as number)) right[i] = 0
  }
}

function scale(guard: Guard, left: Float64Array, right: Float64Array, from: number, frames: number): void {
  const { gains } = guard
  for (let i = from; i < frames; i++) {
    const gain = gains[i] as number
    left[i] = (left[i] as number) * gain
    right[i] = (right[i] as number) * gain
  }
}
