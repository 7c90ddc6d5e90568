// The adjustable tone: as a phrase, and filled into a buffer of any size by the audio thread.
import { fromDb } from '../signal/levels.ts'

export interface ToneOptions {
  /** 1 Hz to half the sample rate. */
  readonly hz: number
  /** Peak level, −120 to 0 dBFS. */
  readonly levelDb: number
}

export const DEFAULT_TONE: ToneOptions = { hz: 440, levelDb: -17 }
const TONE_SECONDS = 4

/** A sine of 4 s, its frequency moved by up to 1/8 Hz so that whole cycles fit. */
export function tone(sampleRate: number, options: ToneOptions = DEFAULT_TONE): Float64Array {
  checkTone(sampleRate, options)
  const circle = new Float64Array(TONE_SECONDS * Math.round(sampleRate))
  const cycles = Math.round((options.hz * circle.length) / sampleRate)
  toneInto(circle, { sampleRate: circle.length, hz: cycles, levelDb: options.levelDb, phase: 0 })
  return circle
}

export interface ToneIntoOptions extends ToneOptions {
  readonly sampleRate: number
  /** Phase of the first sample in cycles; what the last call returned goes on without a click. */
  readonly phase: number
}

/** Fills `buffer` with a sine of any frequency and returns the phase, in [0, 1), of the sample after it. For the audio thread: allocates nothing, does not throw. */
export function toneInto(buffer: Float64Array | Float32Array, { sampleRate, hz, levelDb, phase }: ToneIntoOptions): number {
  const amplitude = fromDb(levelDb)
  const step = hz / sampleRate
  for (let i = 0; i < buffer.length; i++) buffer[i] = amplitude * Math.sin(2 * Math.PI * (phase + i * step))
  const next = phase + buffer.length * step
  return next - Math.floor(next)
}

function checkTone(sampleRate: number, { hz, levelDb }: ToneOptions): void {
  if (!(hz >= 1 && hz <= sampleRate / 2)) throw new RangeError(`hz must be 1 to ${sampleRate / 2}, got ${hz}`)
  if (!(levelDb >= -120 && levelDb <= 0)) throw new RangeError(`levelDb must be -120 to 0 dBFS, got ${levelDb}`)
}
