// What page and processor say to each other; both sides import this file.
import type { ParameterSet } from '../../../src/set/types.ts'
import type { Bypass, DelayChange } from '../../state/session.ts'

export const PROCESSOR_NAME = 'combwright-audition'

/** Frames of the scope's window. */
export const SCOPE_FRAMES = 2048

/** Frames the processor works on at once; a quantum of any size is cut into such pieces. */
export const PIECE_FRAMES = 128

/** Seconds between two reports. */
export const REPORT_S = 0.032

export interface ProcessorOptions {
  readonly buildId: string
  readonly set: ParameterSet
  readonly settings: Settings
  /** Reports go through this memory where the page is isolated; else by message. */
  readonly shared: SharedArrayBuffer | null
}

/** Everything the listener sets, as one state: the last message counts, none depends on an earlier one. */
export interface Settings {
  readonly playing: boolean
  readonly muted: boolean
  /** Linear listening gain, 0 to 1. */
  readonly level: number
  readonly bypass: Bypass
  readonly delayChange: DelayChange
  /** Sweep position held, 0 to 1; null lets it run. */
  readonly held: number | null
  readonly toneHz: number
  /** Gain of equal loudness for recorded material, dB; 0 when off or unmeasured. */
  readonly equalDb: number
  /** Live input measures its own equal loudness while it plays. */
  readonly equalLive: boolean
  /** "I wear headphones", and the device is there. */
  readonly inputOpen: boolean
}

export type SourceMessage =
  | {
      readonly type: 'sample'
      readonly id: number
      readonly channels: readonly Float32Array[]
      /** What sounds at the end flows into the beginning. */
      readonly circular: boolean
      readonly start: number
      readonly end: number
    }
  | { readonly type: 'tone' }
  | { readonly type: 'input' }
  | { readonly type: 'nothing' }

export type ToProcessor =
  | { readonly type: 'set'; readonly flat: Float64Array }
  | { readonly type: 'settings'; readonly settings: Settings }
  | { readonly type: 'source'; readonly source: SourceMessage }
  /** Repeat region of sample memory `id`, frames. */
  | { readonly type: 'region'; readonly id: number; readonly start: number; readonly end: number }
  /** The guard's "Resume". */
  | { readonly type: 'resume' }
  /** The last report has been read. */
  | { readonly type: 'read' }
  | { readonly type: 'hidden'; readonly hidden: boolean }
  | { readonly type: 'close' }

export type FromProcessor =
  | { readonly type: 'ready'; readonly buildId: string }
  | { readonly type: 'refused'; readonly buildId: string }
  /** Sample memory nobody reads any more comes home to be freed here, not on the audio thread. */
  | { readonly type: 'freed'; readonly id: number; readonly channels: readonly Float32Array[] }
  /** Not boxed in an object: cloning a plain array of numbers leaves nothing behind on the audio thread. */
  | Float64Array

/** Slots of a report; after the last follow SCOPE_FRAMES of input and as many of output, oldest first. */
export const REPORT = {
  /** Context frame at the end of the last rendered quantum. */
  frame: 0,
  /** Sweep position at that frame, 0 to 1, and its change a frame. */
  position: 1,
  positionStep: 2,
  /** Peaks since the last report, linear: input left, right, output left, right. */
  peaks: 3,
  overs: 7,
  heldDelays: 8,
  guardState: 9,
  guardReason: 10,
  guardLatched: 11,
  guardTrips: 12,
  guardPeak: 13,
  /** Frame of the sample memory that plays next; −1 when none does. */
  playFrame: 14,
  /** Gain equal loudness applies, dB. */
  equalDb: 15,
  /** 1 while frames of sound are made, 0 while paused. */
  running: 16,
  /** Counts reports. */
  count: 17,
  scope: 18,
} as const

export const REPORT_LENGTH = REPORT.scope + 2 * SCOPE_FRAMES
