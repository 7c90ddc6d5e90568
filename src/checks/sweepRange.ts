// sweep.range: the smallest and largest delay of the sweep against what interpolators and line can read.
import { CLOSE_TOLERANCE, type DelayRange, delayRange, MAX_DELAY_MS } from '../set/delayRange.ts'
import { parameter } from '../set/parameters.ts'
import { withAt } from '../set/path.ts'
import type { ParameterSet } from '../set/types.ts'
import { accepts } from '../set/valueProblem.ts'
import { labelOf, limitOf } from './limits.ts'
import { quantity } from './loopText.ts'
import { samplesText } from './sweepText.ts'
import type { Check, CheckFunction, Mend, Status, WorkingStep } from './types.ts'

export const sweepRange: CheckFunction = ({ set, sampleRate }): Check => {
  const range = delayRange(set, sampleRate)
  const { margin } = limitOf(set, 'sweep.range')
  const reads = readsOf(set, range)
  const tightest = reads.reduce((a, b) => (b.room < a.room ? b : a))
  const longest = Math.max(...reads.map((read) => read.largest))
  const roomAbove = (MAX_DELAY_MS * sampleRate) / 1000 - longest
  const status = statusOf(Math.min(tightest.room, roomAbove), margin)
  const ms = (samples: number) => (samples * 1000) / sampleRate
  const smallestMs = ms(Math.min(...reads.map((read) => read.smallest)))
  const largestMs = ms(longest)
  const mend = status === 'holds' || roomAbove < margin ? null : raisedBase(set, sampleRate, margin - tightest.room, margin)
  return {
    id: 'sweep.range',
    status,
    value: { smallestMs, largestMs, roomSamples: tightest.room },
    limit: ms(tightest.limit),
    unit: 'ms',
    label: labelOf('sweep.range'),
    text: `The delay ${spanText(smallestMs, largestMs)}; ${roomText(tightest)}.`,
    working: [
      ...reads.map((read): WorkingStep => stepOf(set, read, sampleRate)),
      {
        formula: 'largest delay ≤ what a line may hold',
        numbers: `${quantity(largestMs, 'ms')}, line up to ${quantity(MAX_DELAY_MS, 'ms')}`,
        result: `room ${samplesText(roomAbove)}`,
        source: 'this project’s choice: what a set file can make a reader allocate',
      },
    ],
    ...(mend && { mend: [mend] }),
  }
}

interface Read {
  readonly name: 'voices' | 'loop'
  readonly interpolation: string
  readonly smallest: number
  readonly largest: number
  readonly limit: number
  /** Samples between the smallest delay and the limit. */
  readonly room: number
}

/** The voices, and the loop where it is heard. Samples. */
function readsOf(set: ParameterSet, { voices, loop, voiceLimitSamples, loopLimitSamples }: DelayRange): Read[] {
  const read = (name: Read['name'], interpolation: string, own: DelayRange['voices'], limit: number): Read => ({
    name,
    interpolation,
    smallest: own.minSamples,
    largest: own.maxSamples,
    limit,
    room: own.minSamples - limit,
  })
  const heard = [read('voices', set.line.interpolation, voices, voiceLimitSamples)]
  if (set.loop.feedback !== 0) heard.push(read('loop', set.loop.interpolation, loop, loopLimitSamples))
  return heard
}

function statusOf(room: number, margin: number): Status {
  if (room < -CLOSE_TOLERANCE) return 'fails'
  return room < margin ? 'near' : 'holds'
}

const whose = (read: Read) => (read.name === 'voices' ? 'the voices’' : 'the loop’s')

const spanText = (smallestMs: number, largestMs: number) =>
  smallestMs === largestMs
    ? `stands at ${quantity(smallestMs, 'ms')}`
    : `runs from ${quantity(smallestMs, 'ms')} to ${quantity(largestMs, 'ms')}`

function roomText(read: Read): string {
  const reader = `${whose(read)} ${read.interpolation} read`
  if (read.room < -CLOSE_TOLERANCE) return `that is ${samplesText(-read.room)} closer than ${reader} allows`
  return read.room <= CLOSE_TOLERANCE ? `that is as close as ${reader} allows` : `${reader} has ${samplesText(read.room)} of room`
}

function stepOf({ sweep }: ParameterSet, read: Read, sampleRate: number): WorkingStep {
  const [small, large] = [read.smallest, read.largest].map((samples) => quantity((samples * 1000) / sampleRate, 'ms'))
  return {
    formula: sweep.law === 'time' ? 'D = fs (base + offset + depth · s)' : 'D = fs (base + offset) · 2^(depth · s)',
    numbers: `${read.name}, ${read.interpolation}: ${small} to ${large} at ${quantity(sampleRate, 'Hz')}, smallest allowed ${samplesText(read.limit)}`,
    result: `${samplesText(read.smallest)}, room ${samplesText(read.room)}`,
    source: 'closed form over s; an interpolator’s points must be written before they are read',
  }
}

/** The base delay that gives the tightest read its margin, if that alone does. */
function raisedBase(set: ParameterSet, sampleRate: number, missing: number, margin: number): Mend | null {
  const { minSweep } = delayRange(set, sampleRate)
  // A ratio sweep's smallest delay grows by less than its base.
  const share = set.sweep.law === 'time' ? 1 : 2 ** (set.sweep.depthOctaves * minSweep)
  const value = Math.ceil((set.line.baseMs + (missing * 1000) / sampleRate / share) * 1000 - 1e-9) / 1000
  const raised = withAt(set, 'line.baseMs', value)
  const enough = readsOf(raised, delayRange(raised, sampleRate)).every((read) => read.room >= margin - CLOSE_TOLERANCE)
  return enough && accepts(parameter('line.baseMs'), value) ? { label: `Base ${quantity(value, 'ms')}`, path: 'line.baseMs', value } : null
}
