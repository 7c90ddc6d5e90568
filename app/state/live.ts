// What the audio thread reports many times a second: plain mutable numbers, written by audio, read in the one
// frame loop. Never React state.

// The one number page and processor share.
import { SCOPE_FRAMES } from '../audio/worklet/messages.ts'

export { SCOPE_FRAMES }

export interface Live {
  /** Frames of sound are arriving. */
  running: boolean
  /** A position has been heard since the page opened: it stands where it was while paused. */
  heard: boolean
  /** Sweep position being heard now, 0 to 1 (channel 0, voice 0); extrapolated between reports. */
  position(): number
  /** Peak and held peak of the last reports, dBFS per channel. */
  readonly inPeakDb: number[]
  readonly outPeakDb: number[]
  readonly inHoldDb: number[]
  readonly outHoldDb: number[]
  /** The output passed full scale within the last seconds. */
  overload: boolean
  /** Latest aligned window of input and output, channel 0, oldest first. */
  readonly scopeIn: Float32Array
  readonly scopeOut: Float32Array
  /** Counts windows so that a plot knows a new one came. */
  scopeCount: number
  /** Samples at which a delay was held at its limit, since start. */
  heldDelays: number
  /** Where in the recorded material the sound is, s; null for the tone and live input. */
  sourceSeconds: number | null
}

export const live: Live = {
  running: false,
  heard: false,
  position: () => 0,
  inPeakDb: [-400, -400],
  outPeakDb: [-400, -400],
  inHoldDb: [-400, -400],
  outHoldDb: [-400, -400],
  overload: false,
  scopeIn: new Float32Array(SCOPE_FRAMES),
  scopeOut: new Float32Array(SCOPE_FRAMES),
  scopeCount: 0,
  heldDelays: 0,
  sourceSeconds: null,
}
