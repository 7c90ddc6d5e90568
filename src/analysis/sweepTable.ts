// Delay and detune of every voice over the cycle: what the `sweep` command prints.
import { frozenShapeValue, phaseOffset } from '../dsp/sweep.ts'
import { delayMs, voiceOffsetMs } from '../set/delayRange.ts'
import type { ParameterSet } from '../set/types.ts'
import { shapeSlope } from './sweepSlope.ts'

export interface VoiceSweep {
  readonly channel: number
  readonly voice: number
  readonly delayMs: readonly number[]
  /** 1200 log2(1 − dτ/dt) of the shape and law themselves, right of a corner; 0 at rate 0, null where the read stalls or runs backwards. */
  readonly cents: readonly (number | null)[]
}

export interface SweepTable {
  /** k/points, k = 0 … points − 1: positions of voice 0 of channel 0; the next one would repeat the first. */
  readonly positions: readonly number[]
  readonly voices: readonly VoiceSweep[]
}

/**
 * dτ/dt of a read whose sweep stands at phase φ: time law depth · s'(φ) · rate, ratio law τ ln 2 · octaves · s'(φ) · rate. Seconds a second. The sine that stands for
 * a drift runs at half its rate: from −1 to 1 in one cycle, as the steepest drift does, so that no more is bent than drift can bend.
 */
export function delaySlope(set: ParameterSet, phi: number, voice: number): number {
  const { sweep } = set
  const perSecond = shapeSlope(sweep, phi) * (sweep.shape === 'drift' ? sweep.rateHz / 2 : sweep.rateHz)
  if (perSecond === 0) return 0
  if (sweep.law === 'time') return (sweep.depthMs / 1000) * perSecond
  return (frozenDelayMs(set, phi, voice) / 1000) * Math.LN2 * sweep.depthOctaves * perSecond
}

/** τ in ms of a voice whose sweep stands at phase φ, before any limit. */
function frozenDelayMs(set: ParameterSet, phi: number, voice: number): number {
  return delayMs(set, { offsetMs: voiceOffsetMs(set.voices, voice), sweep: frozenShapeValue(set.sweep, phi) })
}

/** Cents by which a delay growing at `slope` seconds a second bends pitch, null from 1 on, where nothing is played forwards, and for a jump without an edge. Source: J. O. Smith, PASP, "Time-Varying Delay-Line Reads". */
export function centsOfSlope(slope: number): number | null {
  if (!(slope < 1 && slope > -Infinity)) return null
  return slope === 0 ? 0 : (1200 * Math.log1p(-slope)) / Math.LN2
}

/**
 * The sweep of every voice at `points` evenly spaced positions, 1 to 1,000,000 (throws RangeError outside). `drift`, which has no
 * cycle, counts as the sine; nothing depends on the sample rate.
 */
export function sweepTable(set: ParameterSet, points: number): SweepTable {
  if (!(Number.isInteger(points) && points >= 1 && points <= 1e6)) throw new RangeError(`points must be 1 to 1000000, got ${points}`)
  const positions = Array.from({ length: points }, (_, k) => k / points)
  const channels = set.layout === 'mono' ? [0] : [0, 1]
  const voices = channels.flatMap((channel) =>
    Array.from({ length: set.voices.count }, (_, voice): VoiceSweep => {
      const phases = positions.map((position) => position + phaseOffset(set, channel, voice))
      return {
        channel,
        voice,
        delayMs: phases.map((phi) => frozenDelayMs(set, phi, voice)),
        cents: phases.map((phi) => centsOfSlope(delaySlope(set, phi, voice))),
      }
    }),
  )
  return { positions, voices }
}
