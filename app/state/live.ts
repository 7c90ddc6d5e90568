// What the audio thread reports many times a second: plain mutable numbers, written by audio, read in the one
// frame loop. Never React state.

export const SCOPE_FRAMES = 2048

export interface Live {
  /** Frames of sound are arriving. */
  running: boolean
  /** Sweep position being heard now, 0 to 1 (channel 0, voice 0); extrapolated between reports. */
  position(): number
  /** Peak and held peak of the last reports, dBFS per channel. */
  readonly inPeakDb: number[]
  readonly outPeakDb: number[]
  readonly inHoldDb: number[]
  readonly outHoldDb: number[]
  overload: boolean
  /** Latest aligned window of input and output, channel 0, oldest first. */
  readonly scopeIn: Float32Array
  readonly scopeOut: Float32Array
  /** Counts windows so that a plot knows a new one came. */
  scopeCount: number
  /** Samples at which a delay was held at its limit, since start. */
  heldDelays: number
}

export const live: Live = {
  running: false,
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
}
