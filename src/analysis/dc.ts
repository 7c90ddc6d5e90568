// DC that asymmetric shapers leave of a tone: the mean of w and of y, measured on the rendered path. Every part of the path but a shaper with unequal limits
// turns over with its input, so that without one a tone's opposite half periods cancel and nothing is left.
//
// The mean is weighted by a Hann window over an even number of whole cycles of the sweep (or whole periods where it stands): shifted by a cycle its halves
// add to 1, so that every position of the sweep counts alike, and what is not DC leaks in by less than −120 dB.
import { createEngine, outputChannels, processEngine } from '../dsp/engine.ts'
import { delayRange } from '../set/delayRange.ts'
import type { ParameterSet, Shaper } from '../set/types.ts'
import { lineAsOutput, sweepStands } from './levelsSet.ts'
import { partOf } from './levelsSteps.ts'
import { sectorOf } from './sector.ts'

export interface DcFigures {
  /** Largest |mean| over the lines and over the outputs, linear; null where it grows without end. */
  readonly line: number | null
  readonly output: number | null
  readonly toneHz: number
  readonly settleSeconds: number
  readonly windowSeconds: number
  /** Whole cycles of the sweep in the window; 0 where it stands. */
  readonly cycles: number
  /** Rate the sweep was run at, Hz: a very slow one faster. */
  readonly rateHz: number
}

/** Peak of the tone: −6 dBFS. */
export const DC_TONE_PEAK = 10 ** (-6 / 20)
const ABOUT_HZ = 1000
const SHORTEST_WINDOW_S = 1
const LONGEST_CYCLE_S = 2
const LONGEST_SETTLE_S = 3
const BLOCK = 1024
/** Blocks between two yields: a millisecond or two. */
const BLOCKS = 2

/** Paths of the shapers in use whose limits differ. */
export function asymmetricShapers(set: ParameterSet): ('input.shaper' | 'loop.shaper' | 'mix.shaper')[] {
  const uneven = (shaper: Shaper | null) => shaper !== null && shaper.positive !== shaper.negative
  return [
    ...(uneven(set.input.shaper) ? ['input.shaper' as const] : []),
    ...(uneven(set.loop.shaper) && set.loop.feedback !== 0 ? ['loop.shaper' as const] : []),
    ...(uneven(set.mix.shaper) ? ['mix.shaper' as const] : []),
  ]
}

/** Means of w and y of a tone of −6 dBFS near 1 kHz at every input, of a whole number of samples a period. Yields the part done; up to 0.2 s at 48 kHz. */
export function* dcSteps(set: ParameterSet, sampleRate = set.sampleRate): Generator<number, DcFigures> {
  const uneven = asymmetricShapers(set)
  const stands = sweepStands(set)
  const rateHz = stands ? set.sweep.rateHz : Math.max(set.sweep.rateHz, 1 / LONGEST_CYCLE_S)
  const run = { ...set, sweep: { ...set.sweep, rateHz } }
  const period = Math.round(sampleRate / ABOUT_HZ)
  const cycles = stands ? 0 : 2 * Math.ceil((SHORTEST_WINDOW_S * rateHz) / 2)
  const wholePeriods = (seconds: number) => Math.max(1, Math.round((seconds * sampleRate) / period)) * period
  const frames = wholePeriods(stands ? SHORTEST_WINDOW_S : cycles / rateHz)
  const settle = wholePeriods(settleSeconds(set, sampleRate))
  const plan = { sampleRate, period, settle, frames }
  const lineToo = uneven.some((path) => path !== 'mix.shaper')
  const parts = lineToo ? 2 : 1
  const output = yield* partOf(largestMean(run, plan), 0, 1 / parts)
  const line = lineToo ? yield* partOf(largestMean(lineAsOutput(run), plan), 1 / parts, 1 / parts) : 0
  return {
    line,
    output,
    toneHz: sampleRate / period,
    settleSeconds: settle / sampleRate,
    windowSeconds: frames / sampleRate,
    cycles,
    rateHz,
  }
}

/** Until the loop has fallen by 60 dB and filters have settled, between 0.1 and 3 s. */
function settleSeconds(set: ParameterSet, sampleRate: number): number {
  const { voices, loop } = delayRange(set, sampleRate)
  const perPass = Math.abs(set.loop.feedback) * sectorOf(set.loop.shaper).bound
  const passes = perPass >= 1 ? Number.POSITIVE_INFINITY : perPass === 0 ? 0 : Math.log(1000) / -Math.log(perPass)
  const cuts = [set.loop.lowCutHz, set.mix.wetLowCutHz].map((hz) => (hz === null ? 0 : Math.log(1000) / (2 * Math.PI * hz)))
  const seconds = voices.maxSamples / sampleRate + set.mix.dryDelayMs / 1000 + (passes * loop.maxSamples) / sampleRate + Math.max(...cuts)
  return Math.min(LONGEST_SETTLE_S, Math.max(0.1, seconds))
}

interface Plan {
  readonly sampleRate: number
  readonly period: number
  readonly settle: number
  readonly frames: number
}

function* largestMean(set: ParameterSet, { sampleRate, period, settle, frames }: Plan): Generator<number, number | null> {
  const engine = createEngine(set, { sampleRate, live: false })
  const channels = outputChannels(set.layout)
  const oneTurn = Float64Array.from({ length: period }, (_, i) => DC_TONE_PEAK * Math.sin((2 * Math.PI * i) / period))
  const tone = new Float64Array(BLOCK)
  const output = Array.from({ length: channels }, () => new Float64Array(BLOCK))
  const sums = new Float64Array(channels)
  const total = settle + frames
  for (let at = 0, block = 0; at < total; at += BLOCK, block++) {
    const count = Math.min(BLOCK, total - at)
    for (let j = 0; j < count; j++) tone[j] = oneTurn[(at + j) % period] as number
    processEngine(engine, [tone], output, count)
    for (let c = 0; c < channels; c++) {
      const y = output[c] as Float64Array
      for (let j = Math.max(0, settle - at); j < count; j++) {
        const hann = 1 - Math.cos((2 * Math.PI * (at + j - settle)) / frames)
        sums[c] = (sums[c] as number) + hann * (y[j] as number)
      }
    }
    if (block % BLOCKS === BLOCKS - 1) yield at / total
  }
  const largest = Math.max(...Array.from(sums, (sum) => Math.abs(sum / frames)))
  return Number.isFinite(largest) && largest < 1e9 ? largest : null
}
