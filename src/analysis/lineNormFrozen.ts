// The l1 norm of a held sweep: Σ |h[n]|, the largest sample that an input within ±1 at every input can cause. The impulse response is run until what is
// left in the line can add no more than a small part, and what it can add is bounded:
//
//   at sample N the line holds c = Σ|w| over its reach; once round it puts in at most ε = |g| σ ρ ‖f‖₁ c (and what the filters hold), which is an input like any
//   other, so ‖w‖₁ ≤ Σ_{n<N} |w[n]| + ε ‖w‖₁, hence ‖w‖₁ ≤ Σ_{n<N} |w[n]|/(1 − ε) as soon as ε < 1, whatever the filters; y likewise.
import type { Frozen, FrozenTone } from './frozen.ts'
import type { FrozenRead } from './frozenRead.ts'
import { readL1 } from './lineNorm.ts'
import { toneL1 } from './norms.ts'

export interface ImpulseNorm {
  /** Σ|h| of each output channel as far as it was run, over both inputs where there are two. */
  readonly sums: readonly number[]
  /** Bounds with the tail; null where the loop was not seen to decay. */
  readonly bounds: readonly (number | null)[]
  /** Samples run, the longer of both inputs. */
  readonly samples: number
}

/** Part of the sum that the tail may be: 0.01 dB. */
const TAIL = 0.001

/** ‖h‖₁ of a frozen set for inputs within ±1, each input by itself. `most`: samples an input may be run. */
export function impulseNorm(frozen: Frozen, most: number): ImpulseNorm {
  // Lines that do not hear each other are struck together: each output hears its own.
  const apart = frozen.lines === 2 && (frozen.loop.crossFeed === 0 || frozen.loop.gain === 0)
  const runs =
    frozen.lines === 1
      ? [[1, 0]]
      : apart
        ? [[1, 1]]
        : [
            [1, 0],
            [0, 1],
          ]
  const done = runs.map((strike) => strikeLine(frozen, strike, most))
  const held = Math.max(...done.map((run) => run.again))
  const lineSum = Math.max(...done.map((run) => run.lineSum))
  const line = held < 1 ? lineSum / (1 - held) : null
  const channels = frozen.channels.map((_, c) => c)
  return {
    sums: channels.map((c) => done.reduce((sum, run) => sum + (run.sums[c] as number), 0)),
    bounds: channels.map((c) =>
      line === null
        ? null
        : done.reduce(
            (sum, run) => sum + (run.sums[c] as number) + (run.waiting[c] as number) + run.again * line * (run.perLine[c] as number),
            0,
          ),
    ),
    samples: Math.max(...done.map((run) => run.samples)),
  }
}

interface Run {
  readonly sums: readonly number[]
  /** Σ|w| over both lines. */
  readonly lineSum: number
  /** ε: what the line's content puts in again, at most. */
  readonly again: number
  /** What the line's content and the wet filters still bring to each output by themselves. */
  readonly waiting: readonly number[]
  /** Largest l1 gain from what is written into the line to each output. */
  readonly perLine: readonly number[]
  readonly samples: number
}

function strikeLine(frozen: Frozen, strike: readonly number[], most: number): Run {
  const { loop, channels, lines: lineCount } = frozen
  const reach =
    Math.max(
      1,
      frozen.dryDelay,
      ...channels.flatMap((channel) => channel.voices.map(endOf)),
      ...(loop.gain === 0 ? [] : loop.reads.map(endOf)),
    ) + 2
  const size = 2 ** Math.ceil(Math.log2(reach + 2))
  const state = createState(frozen, size)
  const perLine = channels.map((channel) => lineGain(frozen, channel.voices, channel.wet))
  const sums = channels.map(() => 0)
  let lineSum = 0
  let n = 0
  let tail = { again: Number.POSITIVE_INFINITY, waiting: sums }
  while (n < most) {
    let content = 0
    const until = Math.min(most, n + reach)
    for (; n < until; n++) content += stepState(state, n, strike, sums)
    lineSum += content
    tail = tailOf(state, frozen, contentOf(state, n, reach), perLine)
    const total = tail.again < 1 ? lineSum / (1 - tail.again) : Number.POSITIVE_INFINITY
    if (sums.every((sum, c) => (tail.waiting[c] as number) + tail.again * total * (perLine[c] as number) <= TAIL * sum)) break
    if (lineSum > 1e9) break
  }
  void lineCount
  return { sums, lineSum, again: tail.again, waiting: tail.waiting, perLine, samples: n }
}

/** Samples behind the newest that a read looks at. */
const endOf = (read: FrozenRead): number => read.first + read.taps.length

function lineGain(frozen: Frozen, voices: readonly FrozenRead[], wet: number): number {
  const read = voices.reduce((sum, voice) => sum + readL1(voice), 0)
  const outer = frozen.outputGain * frozen.output.slope
  return outer * ((frozen.dryTap === 'line' ? Math.abs(frozen.dry) : 0) + Math.abs(wet) * read * toneL1(frozen.wetTone))
}

/** One first-order pair of filters and its memory: what it holds bounds what it can still put out. */
interface ToneState {
  readonly tone: FrozenTone
  low: number
  high: number
  before: number
}

interface ReadState {
  readonly read: FrozenRead
  last: number
}

interface State {
  readonly frozen: Frozen
  readonly mask: number
  readonly u: readonly Float64Array[]
  readonly w: readonly Float64Array[]
  readonly loops: readonly (ReadState & { readonly tone: ToneState; averaged: number; fed: number })[]
  readonly channels: readonly { readonly voices: readonly ReadState[]; readonly tone: ToneState; before: number }[]
}

function createState(frozen: Frozen, size: number): State {
  const arrays = () => Array.from({ length: frozen.lines }, () => new Float64Array(size))
  const toneState = (tone: FrozenTone): ToneState => ({ tone, low: 0, high: 0, before: 0 })
  return {
    frozen,
    mask: size - 1,
    u: arrays(),
    w: arrays(),
    loops: frozen.loop.reads.map((read) => ({ read, last: 0, tone: toneState(frozen.loop.tone), averaged: 0, fed: 0 })),
    channels: frozen.channels.map(({ voices }) => ({
      voices: voices.map((read) => ({ read, last: 0 })),
      tone: toneState(frozen.wetTone),
      before: 0,
    })),
  }
}

/** Sample n with `strike` at the inputs at n = 0; adds |y| to the sums and returns Σ|w[n]|. */
function stepState(state: State, n: number, strike: readonly number[], sums: number[]): number {
  const { frozen, mask, u, w, loops, channels } = state
  const { loop, input } = frozen
  const struck = frozen.inputGain * input.slope
  let written = 0
  if (loop.gain !== 0) {
    for (const around of loops) {
      const l = loops.indexOf(around)
      const x = loop.slope.slope * filtered(around.tone, readAt(around, w[l] as Float64Array, n, mask))
      around.fed = loop.slope.averaged ? (x + around.averaged) / 2 : x
      around.averaged = x
    }
  }
  for (let l = 0; l < frozen.lines; l++) {
    const at = n & mask
    const half = input.averaged ? 0.5 : 1
    const here = n === 0 || (n === 1 && input.averaged) ? half * struck * (strike[l] as number) : 0
    const own = loops[l]?.fed ?? 0
    const other = loops[1 - l]?.fed ?? 0
    const value = here + loop.gain * ((1 - loop.crossFeed) * own + loop.crossFeed * other)
    ;(u[l] as Float64Array)[at] = here
    ;(w[l] as Float64Array)[at] = value
    written += Math.abs(value)
  }
  for (let c = 0; c < channels.length; c++) {
    const out = channels[c] as State['channels'][number]
    const { line, wet } = frozen.channels[c] as Frozen['channels'][number]
    const lineOf = w[line] as Float64Array
    let m = 0
    for (const voice of out.voices) m += readAt(voice, lineOf, n, mask)
    const dryFrom = frozen.dryTap === 'line' ? lineOf : (u[line] as Float64Array)
    const dry = n >= frozen.dryDelay ? (dryFrom[(n - frozen.dryDelay) & mask] as number) : 0
    const mix = frozen.outputGain * frozen.output.slope * (frozen.dry * dry + wet * filtered(out.tone, m))
    sums[c] = (sums[c] as number) + Math.abs(frozen.output.averaged ? (mix + out.before) / 2 : mix)
    out.before = mix
  }
  return written
}

/** The ring holds zeros where nothing was written yet, as the line does. */
function readAt(state: ReadState, line: Float64Array, n: number, mask: number): number {
  const { first, taps, pole } = state.read
  let sum = 0
  for (let k = 0; k < taps.length; k++) sum += (taps[k] as number) * (line[(n - first - k) & mask] as number)
  if (pole !== 0) {
    sum -= pole * state.last
    state.last = sum
  }
  return sum
}

function filtered(state: ToneState, x: number): number {
  const { lowPass: a, highPass: b } = state.tone
  let value = x
  if (a !== null) {
    state.low = (1 - a) * value + a * state.low
    value = state.low
  }
  if (b !== null) {
    state.high = ((1 + b) / 2) * (value - state.before) + b * state.high
    state.before = value
    value = state.high
  }
  return value
}

/** Σ|w| over the last `reach` samples of both lines. */
function contentOf({ w, mask }: State, n: number, reach: number): number {
  let sum = 0
  for (const line of w) for (let k = 1; k <= reach; k++) sum += Math.abs(line[(n - k) & mask] as number)
  return sum
}

/** What filters at rest but for their memory can still put out, in l1. */
function heldBy({ tone: { lowPass: a, highPass: b }, low, high, before }: ToneState): number {
  const fromLow = a === null ? 0 : (a * Math.abs(low)) / (1 - a)
  if (b === null) return fromLow
  return (1 + b) * fromLow + (b * Math.abs(high)) / (1 - b) + ((1 + b) / 2 / (1 - b)) * Math.abs(before)
}

const heldByRead = ({ read, last }: ReadState): number =>
  read.pole === 0 ? 0 : (Math.abs(read.pole) * Math.abs(last)) / (1 - Math.abs(read.pole))

function tailOf(
  { loops, channels }: State,
  frozen: Frozen,
  content: number,
  perLine: readonly number[],
): { again: number; waiting: number[] } {
  const { gain, slope, tone } = frozen.loop
  const l1 = toneL1(tone)
  let again = 0
  if (gain !== 0) {
    const passed = Math.max(...loops.map(({ read }) => readL1(read))) * content * l1
    const held = loops.reduce((sum, around) => sum + heldBy(around.tone) + l1 * heldByRead(around), 0)
    again =
      Math.abs(gain) * slope.slope * (passed + held) +
      loops.reduce((sum, around) => sum + Math.abs(gain) * Math.abs(around.averaged) * (slope.averaged ? 0.5 : 0), 0)
  }
  const outer = frozen.outputGain * frozen.output.slope
  const waiting = channels.map((out, c) => {
    const { wet } = frozen.channels[c] as Frozen['channels'][number]
    const held = heldBy(out.tone) + toneL1(frozen.wetTone) * out.voices.reduce((sum, voice) => sum + heldByRead(voice), 0)
    return content * (perLine[c] as number) + Math.abs(wet) * outer * held + (frozen.output.averaged ? Math.abs(out.before) / 2 : 0)
  })
  return { again, waiting }
}
