// Equal loudness of live input, which nobody knows beforehand: the running 3 s loudness of the effect against what bypass would sound like.
import {
  createLoudnessMeter,
  feedLoudnessMeter,
  type LoudnessMeter,
  meteredLoudness,
  resetLoudnessMeter,
} from '../../../src/signal/loudnessMeter.ts'

/** The gain is looked at this often, and moves only when it differs by more than half a decibel: it must not breathe with the playing. */
const EVERY_S = 0.5
const STEP_DB = 0.5
const MOST_DB = 12
/** Softer input tells nothing: the gain stays. */
const FLOOR_LUFS = -60

export interface LiveLoudness {
  readonly dry: LoudnessMeter
  readonly wet: LoudnessMeter
  readonly everyFrames: number
  frames: number
  gainDb: number
}

export function createLiveLoudness(sampleRate: number): LiveLoudness {
  return {
    dry: createLoudnessMeter({ sampleRate, channels: 2 }),
    wet: createLoudnessMeter({ sampleRate, channels: 2 }),
    everyFrames: Math.round(EVERY_S * sampleRate),
    frames: 0,
    gainDb: 0,
  }
}

export function resetLiveLoudness(live: LiveLoudness): void {
  resetLoudnessMeter(live.dry)
  resetLoudnessMeter(live.wet)
  live.frames = 0
  live.gainDb = 0
}

/** Hears a piece of both; true when `gainDb` has moved. Allocates nothing. */
export function feedLiveLoudness(live: LiveLoudness, dry: readonly Float64Array[], wet: readonly Float64Array[], frames: number): boolean {
  feedLoudnessMeter(live.dry, dry, frames)
  feedLoudnessMeter(live.wet, wet, frames)
  live.frames += frames
  if (live.frames < live.everyFrames) return false
  live.frames = 0
  const dryLufs = meteredLoudness(live.dry)
  const wetLufs = meteredLoudness(live.wet)
  if (!(dryLufs > FLOOR_LUFS && wetLufs > FLOOR_LUFS)) return false
  const gainDb = Math.min(MOST_DB, Math.max(-MOST_DB, dryLufs - wetLufs))
  if (Math.abs(gainDb - live.gainDb) < STEP_DB) return false
  live.gainDb = gainDb
  return true
}
