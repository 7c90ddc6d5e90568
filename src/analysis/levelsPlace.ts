// What the search for the largest gain stands on: the path, the set held anywhere on it, and how a place of the path is named.
import { frozenShapeValue, phaseOffset, wrapPhase } from '../dsp/sweep.ts'
import type { ParameterSet } from '../set/types.ts'
import { type Frozen, freeze } from './frozen.ts'
import { frozenRead } from './frozenRead.ts'
import { type FrequencyBound, frequencyBound } from './levelsBound.ts'
import { freezeAtLargestSlope, readsTogether } from './levelsSet.ts'
import { pathDelays, pathReads, type SweepPath, sweepPath } from './sweepPath.ts'
import { shapeCorners } from './sweepSlope.ts'

export interface LargestGain {
  /** Reached: |H| at this place. */
  readonly gain: number
  /** No held position and no frequency has more; Infinity where the loop gain is not below 1. */
  readonly bound: number
  readonly channel: number
  readonly frequencyHz: number
  /** Position of the cycle, of voice 0 of channel 0, at which `channel` (or its like) has this gain. */
  readonly position: number
  /** Delay of the channel's first voice there, ms. */
  readonly delayMs: number
}

/** A place of the search: channel, ω in rad/sample, the path's parameter, |H| there. */
export interface Place {
  readonly channel: number
  readonly omega: number
  readonly t: number
  readonly gain: number
}

export interface Ground {
  readonly path: SweepPath
  readonly frozen: Frozen
  readonly bounds: readonly FrequencyBound[]
  readonly delays: Float64Array
}

export function groundOf(set: ParameterSet, sampleRate: number): Ground {
  const path = sweepPath(set, sampleRate)
  const frozen = freezeAtLargestSlope(set, 0, sampleRate)
  return {
    path,
    frozen,
    bounds: Array.from({ length: path.walked }, (_, c) => frequencyBound(frozen, c, inPhase(set, frozen, c))),
    delays: new Float64Array(pathReads(path)),
  }
}

const inPhase = (set: ParameterSet, { dryDelay, loop }: Frozen, c: number): boolean =>
  dryDelay === 0 && loop.crossFeed === 0 && readsTogether(set, c)

/** The path's state at t as a frozen set, from which one channel's response is had exactly. */
export function frozenAt({ path, frozen, delays }: Ground, t: number): Frozen {
  pathDelays(path, t, delays)
  const { set, lines } = path
  const voices = set.voices.count
  // A line that is not walked stands like the first.
  const loopOf = (line: number) => delays[line < lines ? line : 0] as number
  return {
    ...frozen,
    loop: { ...frozen.loop, reads: frozen.loop.reads.map((_, line) => frozenRead(set.loop.interpolation, loopOf(line))) },
    channels: frozen.channels.map((channel, c) => ({
      ...channel,
      voices: channel.voices.map((_, v) =>
        frozenRead(set.line.interpolation, delays[lines + (c < path.walked ? c * voices : 0) + v] as number),
      ),
    })),
  }
}

/** A place of the search as people name it. */
export function named(path: SweepPath, best: Place, bound: number): LargestGain {
  const { set, sampleRate } = path
  // Channels that do not hear each other's sweep are walked as if in phase.
  const walked = path.offsets === null ? 0 : (path.offsets[path.lines + best.channel * set.voices.count] as number)
  const phase = (path.offsets === null ? positionOf(set, best.t) : best.t) + walked
  const position = path.stops.length === 1 ? best.t : wrapPhase(phase - phaseOffset(set, best.channel, 0))
  const { channels } = freeze(set, position, sampleRate)
  return {
    gain: best.gain,
    bound: Math.max(bound, best.gain),
    channel: best.channel,
    frequencyHz: (best.omega * sampleRate) / (2 * Math.PI),
    position,
    delayMs: ((channels[best.channel]?.voices[0]?.delaySamples ?? 0) * 1000) / sampleRate,
  }
}

/** The first position of the cycle at which the shape stands at s. */
function positionOf({ sweep }: ParameterSet, s: number): number {
  const corners = [0, ...shapeCorners(sweep), 1]
  let nearest = { position: 0, away: Number.POSITIVE_INFINITY }
  const visit = (position: number) => {
    const away = Math.abs(frozenShapeValue(sweep, position) - s)
    if (away < nearest.away - 1e-12) nearest = { position: wrapPhase(position), away }
  }
  for (let i = 1; i < corners.length; i++) {
    let a = corners[i - 1] as number
    let b = (corners[i] as number) - 1e-12
    if (b <= a) continue
    visit(a)
    const rising = frozenShapeValue(sweep, b) > frozenShapeValue(sweep, a)
    for (let k = 0; k < 60; k++) {
      const middle = (a + b) / 2
      if (frozenShapeValue(sweep, middle) < s === rising) a = middle
      else b = middle
    }
    visit(a)
    visit(b)
  }
  return nearest.position
}
