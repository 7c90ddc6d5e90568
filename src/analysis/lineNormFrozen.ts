// The l1 norm of a held sweep: Σ |h[n]|, the largest sample that an input within ±1 at every input can cause. The impulse response is run until what is
// left in the line can add no more than a small part, and what it can add is bounded:
//
//   at sample N the line holds c = Σ|w| over its reach; once round it puts in at most ε = |g| σ ρ ‖f‖₁ c (and what the filters hold), which is an input like any
//   other, so ‖w‖₁ ≤ Σ_{n<N} |w[n]| + ε ‖w‖₁, hence ‖w‖₁ ≤ Σ_{n<N} |w[n]|/(1 − ε) as soon as ε < 1, whatever the filters; y likewise.
import type { Frozen } from './frozen.ts'
import type { FrozenRead } from './frozenRead.ts'
import { readL1 } from './lineNorm.ts'
import { advanceRun, heldByRead, heldByTone, type ImpulseRun, startRun } from './lineNormRun.ts'
import { toneL1 } from './norms.ts'

export interface ImpulseNorm {
  /** Σ|h| of each output as far as it was run, over both inputs where there are two; likewise of each line, from input to w. */
  readonly outputs: readonly NormSum[]
  readonly lines: readonly NormSum[]
  /** Samples run, the longer of both inputs. */
  readonly samples: number
}

export interface NormSum {
  readonly sum: number
  /** With the bound on its tail; null where the loop was not seen to decay. */
  readonly bound: number | null
}

/** Part of the sum that the tail may be: 0.01 dB. */
const TAIL = 0.001
/** A line that has gathered so much does not decay. */
const GROWN = 1e9

/** ‖h‖₁ of a frozen set for inputs within ±1, each input by itself. `most`: samples an input may be run. */
export function impulseNorm(frozen: Frozen, most: number): ImpulseNorm {
  const perLine = frozen.channels.map(({ voices, wet }) => lineGain(frozen, voices, wet))
  const runs = strikes(frozen).map((strike) => runOut(frozen, strike, { most, perLine }))
  const again = Math.max(...runs.map(({ tail }) => tail.again))
  // What comes before the line is a gain; an averaging shaper there only takes away.
  const struck = frozen.inputGain * frozen.input.slope
  const total = again < 1 ? Math.max(...runs.map(({ run }) => lineTotal(run))) / (1 - again) : null
  const sumOf = (sums: (run: ImpulseRun) => number, waits: (tail: Tail) => number): NormSum => {
    const sum = struck * runs.reduce((all, { run }) => all + sums(run), 0)
    return { sum, bound: total === null ? null : sum + struck * runs.reduce((all, { tail }) => all + waits(tail), 0) }
  }
  return {
    outputs: frozen.channels.map((_, c) =>
      sumOf(
        ({ sums }) => sums[c] as number,
        (tail) => (tail.waiting[c] as number) + tail.again * (total ?? 0) * (perLine[c] as number),
      ),
    ),
    lines: Array.from({ length: frozen.lines }, (_, l) =>
      sumOf(
        ({ lineSums }) => lineSums[l] as number,
        (tail) => tail.again * (total ?? 0),
      ),
    ),
    samples: Math.max(...runs.map(({ run }) => run.done)),
  }
}

/** Lines that do not hear each other are struck together: each output hears its own. */
function strikes({ lines, loop }: Frozen): readonly (readonly number[])[] {
  if (lines === 1) return [[1]]
  const apart = loop.crossFeed === 0 || loop.gain === 0
  return apart
    ? [[1, 1]]
    : [
        [1, 0],
        [0, 1],
      ]
}

interface Tail {
  /** ε: what the line's content puts in again, at most. */
  readonly again: number
  /** What the line's content and the filters still bring to each output by themselves. */
  readonly waiting: readonly number[]
}

const lineTotal = ({ lineSums }: ImpulseRun): number => lineSums.reduce((sum, line) => sum + line, 0)

function runOut(
  frozen: Frozen,
  strike: readonly number[],
  { most, perLine }: { readonly most: number; readonly perLine: readonly number[] },
): { run: ImpulseRun; tail: Tail } {
  const voices = frozen.channels.flatMap((channel) => (channel.wet === 0 ? [] : channel.voices.map(endOf)))
  const loops = frozen.loop.gain === 0 ? [] : frozen.loop.reads.map(endOf)
  const reach = Math.max(1, frozen.dryDelay, ...voices, ...loops) + 2
  const run = startRun(frozen, strike, reach)
  let tail: Tail
  do {
    advanceRun(run, reach)
    tail = tailOf(run, reach, perLine)
    if (settled(run, tail, perLine)) break
  } while (run.done < most && lineTotal(run) < GROWN)
  return { run, tail }
}

/** Samples behind the newest that a read looks at. */
const endOf = (read: FrozenRead): number => read.first + read.taps.length

function settled(run: ImpulseRun, { again, waiting }: Tail, perLine: readonly number[]): boolean {
  if (again >= 1) return false
  const total = lineTotal(run) / (1 - again)
  const heard = run.sums.every((sum, c) => (waiting[c] as number) + again * total * (perLine[c] as number) <= TAIL * sum)
  return heard && again * total <= TAIL * Math.min(...run.lineSums.filter((sum) => sum > 0))
}

/** l1 gain, at most, from what is written into the line to one output. */
function lineGain(frozen: Frozen, voices: readonly FrozenRead[], wet: number): number {
  const read = wet === 0 ? 0 : voices.reduce((sum, voice) => sum + readL1(voice), 0)
  const outer = frozen.outputGain * frozen.output.slope
  return outer * ((frozen.dryTap === 'line' ? Math.abs(frozen.dry) : 0) + Math.abs(wet) * read * toneL1(frozen.wetTone))
}

function tailOf(run: ImpulseRun, reach: number, perLine: readonly number[]): Tail {
  const { frozen, loops, outs } = run
  const { gain, slope, tone } = frozen.loop
  const content = contentOf(run, reach)
  const l1 = toneL1(tone)
  let again = 0
  for (const { read, memory, tone: filters } of loops) {
    const held = heldByTone(filters) + l1 * heldByRead(read, memory) + (slope.averaged ? Math.abs(memory[1] as number) / 2 : 0)
    again += Math.abs(gain) * slope.slope * (readL1(read) * content * l1 + held)
  }
  const outer = frozen.outputGain * frozen.output.slope
  const wetL1 = toneL1(frozen.wetTone)
  const waiting = outs.map(({ voices, tone: filters, wet, memory }, c) => {
    const held = heldByTone(filters) + wetL1 * voices.reduce((sum, voice) => sum + heldByRead(voice.read, voice.memory), 0)
    return (
      content * (perLine[c] as number) + Math.abs(wet) * outer * held + (frozen.output.averaged ? Math.abs(memory[0] as number) / 2 : 0)
    )
  })
  return { again, waiting }
}

/** Σ|w| over the last `reach` samples, of the fuller line: each read hears one. */
function contentOf({ w, pad, done }: ImpulseRun, reach: number): number {
  let most = 0
  for (const line of w) {
    let sum = 0
    for (let i = Math.max(pad, pad + done - reach); i < pad + done; i++) sum += Math.abs(line[i] as number)
    most = Math.max(most, sum)
  }
  return most
}
