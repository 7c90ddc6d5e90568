// What stands between the effect's output and the ear: equal loudness, cap, listening level, play and mute. None of it is part of the set.
//
// Order: guarded output → equal loudness → cap at ±2 (+6 dBFS) → level (0 to 1) → play → mute → ±1. The cap follows the level: nothing is
// ever heard more than 6 dB above full scale at the level chosen, whatever the effect does before the guard has closed.
import { createRamp, multiplyByRamp, type Ramp, rampTo, setRamp } from './ramp.ts'

export const CAP = 2
const EQUAL_S = 0.1
/** Bypass fades faster in the engine; the gain of equal loudness must go with it. */
const EQUAL_WITH_BYPASS_S = 0.02
const LEVEL_S = 0.05
const PLAY_S = 0.06
const FIRST_PLAY_S = 0.4
const PAUSE_S = 0.04
const MUTE_S = 0.02
const UNMUTE_S = 0.1

export interface Listening {
  readonly sampleRate: number
  readonly equal: Ramp
  readonly level: Ramp
  readonly play: Ramp
  readonly mute: Ramp
  readonly gains: Float64Array
  hasPlayed: boolean
}

export function createListening(sampleRate: number, maxFrames: number): Listening {
  return {
    sampleRate,
    equal: createRamp(1),
    level: createRamp(0),
    play: createRamp(0),
    mute: createRamp(1),
    gains: new Float64Array(maxFrames),
    hasPlayed: false,
  }
}

export function setListeningLevel(listening: Listening, gain: number): void {
  const held = gain > 0 ? Math.min(gain, 1) : 0
  // The first level stands at once: there is nothing yet to ramp from.
  if (listening.hasPlayed) rampTo(listening.level, held, LEVEL_S * listening.sampleRate)
  else setRamp(listening.level, held)
}

/** Gain in dB, ±12 at most; `withBypass` when bypass changes at the same moment. */
export function setEqualGain(listening: Listening, db: number, withBypass: boolean): void {
  const held = Math.min(12, Math.max(-12, db)) || 0
  rampTo(listening.equal, 10 ** (held / 20), (withBypass ? EQUAL_WITH_BYPASS_S : EQUAL_S) * listening.sampleRate)
}

/** Opens for playing, more slowly the first time, or closes. */
export function setPlaying(listening: Listening, playing: boolean): void {
  const seconds = !playing ? PAUSE_S : listening.hasPlayed ? PLAY_S : FIRST_PLAY_S
  if (playing) listening.hasPlayed = true
  rampTo(listening.play, playing ? 1 : 0, seconds * listening.sampleRate)
}

export function setMuted(listening: Listening, muted: boolean): void {
  rampTo(listening.mute, muted ? 0 : 1, (muted ? MUTE_S : UNMUTE_S) * listening.sampleRate)
}

/** True when paused and the fade has ended: nothing more need be rendered. */
export function isAtRest({ play }: Listening): boolean {
  return play.left === 0 && play.value === 0
}

/** Writes what is heard of left and right into the output's channels from `offset` on; channels beyond two repeat the right one. */
export function applyListening(
  listening: Listening,
  left: Float64Array,
  right: Float64Array,
  output: readonly Float32Array[],
  offset: number,
  frames: number,
): void {
  const { gains, equal, level, play, mute } = listening
  if (equal.left + level.left + play.left + mute.left === 0) {
    gains[0] = equal.value
    gains[1] = level.value * play.value * mute.value
    for (let c = 0; c < output.length; c++) giveStanding(c === 0 ? left : right, gains, output[c] as Float32Array, offset, frames)
    return
  }
  gains.fill(1, 0, frames)
  multiplyByRamp(equal, gains, frames)
  cap(left, gains, frames)
  cap(right, gains, frames)
  gains.fill(1, 0, frames)
  multiplyByRamp(level, gains, frames)
  multiplyByRamp(play, gains, frames)
  multiplyByRamp(mute, gains, frames)
  for (let c = 0; c < output.length; c++) giveMoving(c === 0 ? left : right, gains, output[c] as Float32Array, offset, frames)
}

function cap(samples: Float64Array, gains: Float64Array, frames: number): void {
  for (let i = 0; i < frames; i++) samples[i] = Math.min(CAP, Math.max(-CAP, (samples[i] as number) * (gains[i] as number)))
}

/** Capped samples times gains. */
function giveMoving(samples: Float64Array, gains: Float64Array, to: Float32Array, offset: number, frames: number): void {
  for (let i = 0; i < frames; i++) to[offset + i] = Math.min(1, Math.max(-1, (samples[i] as number) * (gains[i] as number)))
}

/** All at once while nothing ramps: gains[0] is equal loudness, gains[1] the rest. */
function giveStanding(samples: Float64Array, gains: Float64Array, to: Float32Array, offset: number, frames: number): void {
  const equal = gains[0] as number
  const rest = gains[1] as number
  for (let i = 0; i < frames; i++) {
    const x = Math.min(CAP, Math.max(-CAP, (samples[i] as number) * equal))
    to[offset + i] = Math.min(1, Math.max(-1, x * rest))
  }
}
