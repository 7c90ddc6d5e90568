// What an engine is made of, and the making of one: everything it will ever need is taken here.
//
// Two cores on the same lines, one sounding. A change of gains, filters or (gliding) delays moves inside it; any other is loaded into the
// second core, and the two cross-fade. While nothing was changed, phases are closed forms and coefficients constant.
import { delayRange, MAX_DELAY_MS } from '../set/delayRange.ts'
import { drawnProblems } from '../set/drawnPoints.ts'
import { FLAT_PARAMETERS, flatten } from '../set/flat.ts'
import { getAt } from '../set/path.ts'
import type { ParameterSet } from '../set/types.ts'
import { valueProblem } from '../set/valueProblem.ts'
import { type Bypass, createBypass } from './bypass.ts'
import { type Core, createCore, loadCore } from './core.ts'
import type { Acceptance } from './flatRules.ts'
import { CHUNK, createLines, type Lines } from './line.ts'
import { rampLength } from './ramps.ts'
import { startPhase } from './trajectory.ts'

/** How a delay change is made: the read glides there, bending pitch, or two reads cross-fade. */
export type DelayChange = 'glide' | 'crossfade'

export interface EngineOptions {
  /** Rate to run at, Hz, 1000 to 768000; the set's when absent. */
  readonly sampleRate?: number
  /** Longest delay that live edits may reach, ms; what the set itself reaches when absent. Longer ones are held and counted. */
  readonly maxDelayMs?: number
  /** Whether the set may be edited while it runs (true when absent). Without, memory is less than half and tails are not cut off at 1e-30. */
  readonly live?: boolean
}

export interface EngineCounters {
  /** Samples for which a read was held at the limit of its interpolator or of the line. */
  heldDelays: number
  /** Output samples that were not finite. */
  nonFinite: number
  /** Values of flat sets that were refused, their slots keeping the old value. */
  refusedValues: number
}

export interface Engine {
  readonly fs: number
  readonly live: boolean
  readonly lines: Lines
  /** The core that is heard, or fading in. */
  core: Core
  /** The other one; null unless live. */
  idle: Core | null
  /** Whether `idle` is still heard, fading out. */
  fading: boolean
  fadeElapsed: number
  readonly fadeLength: number
  /** A change came while fading; it is loaded when the fade ends. */
  pending: boolean
  /** The flat set as accepted so far. */
  readonly accepted: Float64Array
  readonly acceptance: Acceptance
  delayChange: DelayChange
  readonly bypass: Bypass
  /** The input by output channel, for a bypass that passes it. */
  readonly straight: readonly [Float64Array, Float64Array]
  /** Scratch: the mean of all input channels. */
  readonly mean: Float64Array
  /** Absolute index of the next sample. */
  n: number
  readonly counters: EngineCounters
}

/**
 * An engine at the start of a set. Throws RangeError when the set has a value outside its range, or an option is. Reads that come too
 * close or reach too far do not throw: they are held and counted, as on the part.
 */
export function createEngine(set: ParameterSet, { sampleRate = set.sampleRate, maxDelayMs, live = true }: EngineOptions = {}): Engine {
  checkSet(set)
  if (!(sampleRate >= 1000 && sampleRate <= 768000)) throw new RangeError(`sampleRate must be in [1000, 768000] Hz, got ${sampleRate}`)
  const longestMs = maxDelayMs ?? longestDelayMs(set, sampleRate)
  if (!(longestMs >= 0 && longestMs <= MAX_DELAY_MS)) throw new RangeError(`maxDelayMs must be in [0, ${MAX_DELAY_MS}], got ${longestMs}`)
  const maxDelay = Math.max(4, Math.ceil((longestMs * sampleRate) / 1000) + 1)
  const lines = createLines(maxDelay, live || (set.mix.dryTap === 'input' && set.mix.dryDelayMs > 0))
  const engine: Engine = {
    fs: sampleRate,
    live,
    lines,
    core: createCore(sampleRate, maxDelay, lines),
    idle: live ? createCore(sampleRate, maxDelay, lines) : null,
    fading: false,
    fadeElapsed: 0,
    fadeLength: rampLength(sampleRate),
    pending: false,
    accepted: acceptedAtStart(set),
    acceptance: { changed: 0, refused: 0 },
    delayChange: 'glide',
    bypass: createBypass(sampleRate),
    straight: [new Float64Array(CHUNK), new Float64Array(CHUNK)],
    mean: new Float64Array(CHUNK),
    n: 0,
    counters: { heldDelays: 0, nonFinite: 0, refusedValues: 0 },
  }
  loadCore(engine.core, engine.accepted, 1, 1)
  startPhase(engine.core.trajectory, engine.core.settings)
  return engine
}

function checkSet(set: ParameterSet): void {
  for (const p of FLAT_PARAMETERS) {
    const value = getAt(set, p.path)
    // A shaper that is not there has no fields.
    if (value === undefined && p.path.includes('.shaper.')) continue
    const problem = valueProblem(p, value)
    if (problem) throw new RangeError(problem.message)
  }
  const drawn = drawnProblems(set)[0]
  if (drawn) throw new RangeError(drawn.message)
}

function longestDelayMs(set: ParameterSet, fs: number): number {
  const { voices, loop } = delayRange(set, fs)
  const reached = (Math.max(voices.maxSamples, loop.maxSamples) * 1000) / fs
  return Math.min(MAX_DELAY_MS, Math.max(reached, set.mix.dryDelayMs))
}

/** The flat set, with the table's defaults for the numbers of absent shapers, so that each slot always has a good value to keep. */
function acceptedAtStart(set: ParameterSet): Float64Array {
  const flat = flatten(set)
  FLAT_PARAMETERS.forEach((p, i) => {
    if (!p.path.includes('.shaper.') || p.path.endsWith('.curve') || getAt(set, p.path) !== undefined) return
    if (p.kind === 'choice') flat[i] = p.options.findIndex((o) => o.value === p.default)
    else flat[i] = p.default as number
  })
  return flat
}
