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
}

export function createSineTables(): SineTables {
  return { centre: new Float64Array(READS), inSine: new Float64Array(READS), inCosine: new Float64Array(READS) }
}

/** Fills the tables and says whether they may be used: also, no read may come so near its limits that rounding could pass them. */
export function takeSine(s: Settings): boolean {
  if (s.sweep.shape !== 'sine' || s.sweep.law !== 'time' || !isContinuous(s.voiceRead) || !isContinuous(s.loopRead)) return false
  const samples = s.fs / 1000
  const depth = s.sweep.depthMs * samples
  let inside = true
  for (let c = 0; c < 2; c++) {
    for (let v = 0; v < s.voices.count; v++) {
      const centre = s.centreMs[v]! * samples
      setRead(s.sineTables, c * MAX_VOICES + v, centre, depth, s.voicePhase[v]! + s.channelPhase[c]!)
      inside &&= staysInside(s, centre, depth, s.voiceLeast)
    }
    const centre = s.baseMs * samples - s.loopLess
    setRead(s.sineTables, LOOPS + c, centre, s.loopMoves ? depth : 0, s.channelPhase[c]!)
    inside &&= staysInside(s, centre, s.loopMoves ? depth : 0, s.loopLeast)
  }
  return inside
}

/** Whether a read moves without a step when its delay does. */
const isContinuous = (kind: Interpolation): boolean => kind === 'linear' || kind === 'lagrange3' || kind === 'hermite4'

function setRead({ centre, inSine, inCosine }: SineTables, r: number, at: number, depth: number, phase: number): void {
  centre[r] = at
  inSine[r] = depth * Math.cos(2 * Math.PI * phase)
  inCosine[r] = depth * Math.sin(2 * Math.PI * phase)
}

/** More than rounding can take away, samples. */
const MARGIN = 1e-6

function staysInside({ longest }: Settings, centre: number, depth: number, least: number): boolean {
  return centre - depth >= least + MARGIN && centre + depth <= longest - MARGIN
}
