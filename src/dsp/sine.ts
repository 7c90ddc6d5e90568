// The commonest sweep in a shorter way: the sine under the law of time is, for every read, a mixture of one sine and one cosine. A few units
// in the last place from the direct formula; so it is only used where reads are continuous in their delay. One that jumps with it needs
// exactly the delay an independent model has.
import type { Interpolation } from '../set/types.ts'
import { LOOPS, MAX_VOICES, READS } from './runs.ts'
import type { Settings } from './settings.ts'

/** D of read r at phase Φ of voice 0 of channel 0, samples: centre[r] + inSine[r] sin 2πΦ + inCosine[r] cos 2πΦ. */
export interface SineTables {
  readonly centre: Float64Array
  readonly inSine: Float64Array
  readonly inCosine: Float64Array
  /** Whether any read in use has a part in the cosine. */
  cosine: boolean
}

export function createSineTables(): SineTables {
  return { centre: new Float64Array(READS), inSine: new Float64Array(READS), inCosine: new Float64Array(READS), cosine: true }
}

/** Fills the tables and says whether they may be used: also, no read may come so near its limits that rounding could pass them. */
export function takeSine(s: Settings): boolean {
  if (s.sweep.shape !== 'sine' || s.sweep.law !== 'time' || !isContinuous(s.voiceRead) || !isContinuous(s.loopRead)) return false
  const { centre, inSine, inCosine } = s.sineTables
  const samples = s.fs / 1000
  const depth = s.sweep.depthMs * samples
  for (let c = 0; c < 2; c++) {
    for (let v = 0; v < s.voices.count; v++) {
      const angle = 2 * Math.PI * (s.voicePhase[v]! + s.channelPhase[c]!)
      const r = c * MAX_VOICES + v
      centre[r] = s.centreMs[v]! * samples
      inSine[r] = depth * Math.cos(angle)
      inCosine[r] = depth * Math.sin(angle)
    }
    const angle = 2 * Math.PI * s.channelPhase[c]!
    const loopDepth = s.loopMoves ? depth : 0
    centre[LOOPS + c] = s.baseMs * samples - s.loopLess
    inSine[LOOPS + c] = loopDepth * Math.cos(angle)
    inCosine[LOOPS + c] = loopDepth * Math.sin(angle)
  }
  // Alone, voice 0 of channel 0 moves with the sine.
  s.sineTables.cosine = s.voices.count > 1 || s.outputs > 1
  return staysInside(s)
}

/** Whether a read moves without a step when its delay does. */
const isContinuous = (kind: Interpolation): boolean => kind === 'linear' || kind === 'lagrange3' || kind === 'hermite4'

/** More than rounding can take away, samples. */
const MARGIN = 1e-6

function staysInside({ sineTables, voices, sweep, fs, loopMoves, longest, voiceLeast, loopLeast }: Settings): boolean {
  const { centre } = sineTables
  const depth = (sweep.depthMs * fs) / 1000 + MARGIN
  const loopDepth = loopMoves ? depth : MARGIN
  for (let v = 0; v < voices.count; v++) if (centre[v]! - depth < voiceLeast || centre[v]! + depth > longest) return false
  return centre[LOOPS]! - loopDepth >= loopLeast && centre[LOOPS]! + loopDepth <= longest
}
