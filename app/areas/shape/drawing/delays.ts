// The delays the drawing shows: where every voice and the loop read the line at a sweep position, and how far they move.
import { delayAtShape, frozenShapeValue, loopDelayAtShape, phaseOffset } from '../../../../src/dsp/sweep.ts'
import { delayRange } from '../../../../src/set/delayRange.ts'
import type { ParameterSet } from '../../../../src/set/types.ts'

export interface Read {
  readonly id: string
  /** Output channel of a voice, line of a loop. */
  readonly channel: number
  readonly delayMs: number
}

export interface Reads {
  /** By channel, in it by voice: voice 0 of channel 0 first. */
  readonly voices: readonly Read[]
  readonly loop: readonly Read[]
}

/** Everything frozen at `position` of channel 0's voice 0; the others keep their offsets. */
export function readsAt(set: ParameterSet, position: number): Reads {
  const channels = set.layout === 'mono' ? 1 : 2
  const lines = set.layout === 'stereo' ? 2 : 1
  const { count } = set.voices
  const ms = (samples: number) => (samples * 1000) / set.sampleRate
  const shapeAt = (c: number, v: number) => frozenShapeValue(set.sweep, position + phaseOffset(set, c, v))
  return {
    voices: Array.from({ length: channels * count }, (_, i) => {
      const channel = Math.floor(i / count)
      const voice = i % count
      const delayMs = ms(delayAtShape(set, voice, shapeAt(channel, voice), set.sampleRate))
      return { id: `channel ${channel} voice ${voice}`, channel, delayMs }
    }),
    loop: Array.from({ length: lines }, (_, channel) => ({
      id: `loop ${channel}`,
      channel,
      delayMs: ms(loopDelayAtShape(set, shapeAt(channel, 0), set.sampleRate)),
    })),
  }
}

export interface RulerScale {
  readonly minMs: number
  readonly maxMs: number
  /** Right end of the ruler; its left end is 0. */
  readonly endMs: number
}

/** How far the voices move, and a ruler that holds them, the loop and the dry delay with a little room. */
export function rulerScale(set: ParameterSet): RulerScale {
  const { voices, loop } = delayRange(set)
  const ms = (samples: number) => (samples * 1000) / set.sampleRate
  const furthest = Math.max(ms(voices.maxSamples), ms(loop.maxSamples), set.mix.dryDelayMs)
  return { minMs: ms(voices.minSamples), maxMs: ms(voices.maxSamples), endMs: furthest * 1.08 || 1 }
}
