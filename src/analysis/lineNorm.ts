// The largest sample that an input within ±1 can cause in the line and at the output, however the delays move: bounds in l∞, shapers by the largest
// value they put out. Source of the bounds: l∞ small gain, |Σ h x| ≤ ‖h‖₁ max|x| (DESIGN 5).
//
//   |u| ≤ U = peak of inputShaper over ±inputGain
//   |w| ≤ W, the smallest W with U + |g| · peak of loopShaper over ±‖f‖₁ ρ W ≤ W       without a shaper: U/(1 − |g| ρ ‖f‖₁)
//   |y| ≤ outputGain · peak of outputShaper over ±(|dry| (U or W) + |wet| √V ρ ‖f_wet‖₁ W)
//
// ρ = Σ|h_k| of the read: READ_PEAK while it moves, its own taps' where it stands.
import type { ParameterSet, Shaper } from '../set/types.ts'
import { type Frozen, freeze } from './frozen.ts'
import type { FrozenRead } from './frozenRead.ts'
import { readsTogether, sweepStands } from './levelsSet.ts'
import { READ_PEAK, toneL1 } from './norms.ts'
import { heldLevel, shaperPeak } from './sector.ts'

export interface PeakBounds {
  /** U. */
  readonly input: number
  /** W; null where no bound of this kind exists. */
  readonly line: number | null
  /** Before the output shaper; null where W is. */
  readonly mix: number | null
  /** |y|; null where W is and the output shaper has no end of its own. */
  readonly output: number | null
  /** ρ of the loop's read and of the voices'. */
  readonly loopPeak: number
  readonly voicePeak: number
  /** ‖f‖₁ of the loop's filters and of the wet ones. */
  readonly loopL1: number
  readonly wetL1: number
  /** True where voice and loop read as one, and what they bring was added before its size was taken. */
  readonly together: boolean
}

/** Past this nothing useful is bounded: 120 dB over full scale. */
const UNBOUNDED = 1e6

/** Bounds for any movement of the delays and any input within ±1 at every input. sampleRate in Hz. */
export function peakBounds(set: ParameterSet, sampleRate = set.sampleRate): PeakBounds {
  const frozen = freeze(set, set.sweep.startPhase, sampleRate)
  const stands = sweepStands(set)
  const loopPeak = stands || set.loop.delay === 'fixed' ? Math.max(...frozen.loop.reads.map(readL1)) : READ_PEAK[set.loop.interpolation]
  const voicePeak = stands
    ? Math.max(...frozen.channels.map(({ voices }) => voices.reduce((sum, read) => sum + readL1(read), 0) / voices.length))
    : READ_PEAK[set.line.interpolation]
  const input = shaped(set.input.shaper, frozen.inputGain)
  const loopL1 = toneL1(frozen.loop.tone)
  const wetL1 = toneL1(frozen.wetTone)
  const line = lineBound(set, input, loopPeak * loopL1)
  const read = line === null ? null : voicePeak * line
  const together = frozen.channels.every((_, c) => readsTogether(set, c)) && set.mix.dryTap === 'line' && frozen.dryDelay === 0
  const mix =
    line === null || read === null
      ? null
      : Math.max(...frozen.channels.map((_, c) => mixBound(set, frozen, c, { input, line, read, wetL1, together })))
  return { input, line, mix, output: outputBound(set.mix.shaper, frozen.outputGain, mix), loopPeak, voicePeak, loopL1, wetL1, together }
}

/** Σ|h| of a held read; of an all-pass |η| + (1 − η²)/(1 − |η|) = 1 + 2|η|. */
export function readL1({ taps, pole }: FrozenRead): number {
  return pole !== 0 ? 1 + 2 * Math.abs(pole) : taps.reduce((sum, tap) => sum + Math.abs(tap), 0)
}

interface MixParts {
  readonly input: number
  readonly line: number
  readonly read: number
  readonly wetL1: number
  readonly together: boolean
}

function mixBound(set: ParameterSet, frozen: Frozen, c: number, { input, line, read, wetL1, together }: MixParts): number {
  const { dry, wet } = set.mix
  const sign = c === 1 && set.mix.invertRight ? -1 : 1
  if (together) {
    // y = dry u + (± wet + dry g (1 − k)) q + dry g k q of the other line.
    const { gain, crossFeed: k } = frozen.loop
    return Math.abs(dry) * input + (Math.abs(sign * wet + dry * gain * (1 - k)) + Math.abs(dry * gain * k)) * read
  }
  const tap = set.mix.dryTap === 'line' ? line : input
  return Math.abs(dry) * tap + Math.abs(wet) * Math.sqrt(set.voices.count) * wetL1 * read
}

function lineBound(set: ParameterSet, input: number, passed: number): number | null {
  const g = Math.abs(set.loop.feedback)
  const { shaper } = set.loop
  if (g === 0) return input
  if (shaper === null) return g * passed < 1 ? input / (1 - g * passed) : null
  return heldLevel(shaper, input, g, passed)
}

/** A bend that ends bounds what even a line without bounds brings to it. */
function outputBound(shaper: Shaper | null, gain: number, mix: number | null): number | null {
  if (mix !== null) return gain * shaped(shaper, mix)
  if (shaper === null) return null
  const top = shaperPeak(shaper, UNBOUNDED)
  return shaperPeak(shaper, 2 * UNBOUNDED) === top ? gain * top : null
}

const shaped = (shaper: Shaper | null, level: number): number => (shaper === null ? level : shaperPeak(shaper, level))
