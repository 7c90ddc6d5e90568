// Offline rendering: one set, one signal, no changes.
import type { ParameterSet } from '../set/types.ts'
import { createEngine, outputChannels, processEngine } from './engine.ts'

export interface RenderOptions {
  /** Rate to run at, Hz; the set's when absent. The input is taken to be at it. */
  readonly sampleRate?: number
  /** How long to go on with silence after the input, seconds, 0 or more; 0 when absent. */
  readonly tailSeconds?: number
}

/**
 * The set's output for `input` (one or more channels of equal length, routed as processEngine does), from a line at rest: one array an
 * output channel, as long as the input and the tail. The same arguments give the same bits everywhere.
 */
export function renderSet(set: ParameterSet, input: readonly Float64Array[], options: RenderOptions = {}): Float64Array[] {
  const { sampleRate = set.sampleRate, tailSeconds = 0 } = options
  const frames = input[0]?.length
  if (frames === undefined) throw new RangeError('input must have at least one channel')
  if (input.some((channel) => channel.length !== frames)) throw new RangeError('input channels must have equal lengths')
  if (!(tailSeconds >= 0 && tailSeconds < Number.POSITIVE_INFINITY))
    throw new RangeError(`tailSeconds must be 0 or more, got ${tailSeconds}`)
  const engine = createEngine(set, { sampleRate, live: false })
  const tail = Math.round(tailSeconds * sampleRate)
  const output = Array.from({ length: outputChannels(set.layout) }, () => new Float64Array(frames + tail))
  processEngine(engine, input, output, frames)
  processEngine(engine, [], output, tail, frames)
  return output
}
