// What the levels of a set are measured on: shapers by the largest gain they have anywhere, and the line as an output of its own.
import { delayRange } from '../set/delayRange.ts'
import type { ParameterSet } from '../set/types.ts'
import { type Frozen, type FrozenSlope, freeze } from './frozen.ts'
import { sectorOf } from './sector.ts'

/**
 * The set held at `position`, shapers counted by their sector bound sup|shaper(x)/x| instead of their slope at 0: the same for curves that bend
 * away from a straight line, but a dead zone or a drawn curve passes larger signals with more gain than small ones.
 */
export function freezeAtLargestSlope(set: ParameterSet, position: number, sampleRate: number): Frozen {
  const frozen = freeze(set, position, sampleRate)
  const at = (slope: FrozenSlope, shaper: ParameterSet['input']['shaper']): FrozenSlope => ({ ...slope, slope: sectorOf(shaper).bound })
  return {
    ...frozen,
    input: at(frozen.input, set.input.shaper),
    output: at(frozen.output, set.mix.shaper),
    loop: { ...frozen.loop, slope: at(frozen.loop.slope, set.loop.shaper) },
  }
}

/** A set whose output is w, what `set` writes into its line: no wet sound, the dry sound from the line, one voice that nobody hears. */
export function lineAsOutput(set: ParameterSet): ParameterSet {
  return {
    ...set,
    layout: set.layout === 'stereo' ? 'stereo' : 'mono',
    voices: { ...set.voices, count: 1 },
    mix: {
      ...set.mix,
      dry: 1,
      wet: 0,
      dryTap: 'line',
      dryDelayMs: 0,
      wetLowCutHz: null,
      wetHighCutHz: null,
      invertRight: false,
      outputGainDb: 0,
      shaper: null,
    },
  }
}

/** Whether no delay ever moves: rate or depth 0, or a drawn sweep that is level. */
export function sweepStands(set: ParameterSet): boolean {
  const { rateHz, law, depthMs, depthOctaves } = set.sweep
  if (rateHz === 0 || (law === 'time' ? depthMs : depthOctaves) === 0) return true
  const { minSweep, maxSweep } = delayRange(set)
  return minSweep === maxSweep
}

/** Whether voice and loop of output `channel` read one delay in the same way at every instant, nothing between them and the mix: then m = q. */
export function readsTogether(set: ParameterSet, channel: number): boolean {
  const { loop, mix, voices, line, sweep } = set
  if (voices.count > 1 || line.interpolation !== loop.interpolation) return false
  const plain =
    loop.dampingHz === null && loop.lowCutHz === null && loop.shaper === null && mix.wetHighCutHz === null && mix.wetLowCutHz === null
  if (!plain) return false
  if ((sweep.law === 'time' ? sweep.depthMs : sweep.depthOctaves) === 0) return true
  if (loop.delay === 'fixed') return false
  // One line is read back by channel 0's sweep.
  return channel === 0 || set.layout === 'stereo' || sweep.stereoPhase % 360 === 0
}
