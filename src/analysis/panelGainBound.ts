// A bound of the worst gain at the output or in the line that goes one way with every parameter and does not depend on the delays.
import type { ParameterSet } from '../set/types.ts'
import { levelDb } from './levels.ts'
import { frequencyBound, largestBound } from './levelsBound.ts'
import { freezeAtLargestSlope, lineAsOutput } from './levelsSet.ts'
import { peakBounds } from './lineNorm.ts'

/** The smaller of the largest |H| there can be and, where a shaper bends, the level it holds. dB; Infinity where neither is finite. sampleRate in Hz. */
export function gainBound(set: ParameterSet, sampleRate: number, place: 'peak' | 'line'): number {
  const judged = place === 'peak' ? set : lineAsOutput(set)
  const frozen = freezeAtLargestSlope(judged, 0, sampleRate)
  // Channels differ in sign and delays, which do not count.
  const gain = largestBound(frequencyBound(frozen, 0, false)).value
  const bends = judged.input.shaper !== null || judged.mix.shaper !== null || (judged.loop.shaper !== null && judged.loop.feedback !== 0)
  const ceiling = bends ? peakBounds(anyDelays(judged), sampleRate).output : null
  const least = Math.min(gain, ceiling ?? Number.POSITIVE_INFINITY)
  return least === Number.POSITIVE_INFINITY ? least : levelDb(least)
}

/** With reads that move apart from each other: standing or together they are counted as they stand, which depends on their delays. */
function anyDelays(set: ParameterSet): ParameterSet {
  return {
    ...set,
    sweep: { ...set.sweep, shape: 'sine', rateHz: 1, depthMs: 1, depthOctaves: 1 },
    loop: { ...set.loop, delay: 'moving' },
    mix: { ...set.mix, dryDelayMs: 20 },
  }
}
