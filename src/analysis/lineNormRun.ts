// The impulse response of a held sweep, run in passes over stretches of samples: a few nanoseconds a tap.
// Layout: every history begins with `pad` zeros, what a read finds before sample 0.
import type { Frozen, FrozenTone } from './frozen.ts'
import type { FrozenRead } from './frozenRead.ts'

/** A filter pair with its memory: low-pass output; high-pass output and the input before. */
interface ToneState {
  readonly tone: FrozenTone
  readonly memory: Float64Array
}

interface LoopState {
  readonly read: FrozenRead
  /** Output before, of an all-pass read; input before, of an averaging shaper. */
  readonly memory: Float64Array
  readonly tone: ToneState
}

interface OutState {
  readonly line: number
  readonly wet: number
  readonly voices: readonly { readonly read: FrozenRead; readonly memory: Float64Array }[]
  readonly tone: ToneState
  /** Mix before, of an averaging shaper. */
  readonly memory: Float64Array
}

export interface ImpulseRun {
  readonly frozen: Frozen
  readonly pad: number
  /** Samples done. */
  done: number
  u: Float64Array[]
  w: Float64Array[]
  readonly loops: readonly LoopState[]
  readonly outs: readonly OutState[]
  /** Σ|y| of each output, Σ|w| of each line. */
  readonly sums: Float64Array
  readonly lineSums: Float64Array
}

/** A run from rest with an impulse of size `strike[l]` as u of line l, the gain and shaper of the input apart; `reach`: samples behind the newest that anything reads. */
export function startRun(frozen: Frozen, strike: readonly number[], reach: number): ImpulseRun {
  const pad = reach + 4
  const history = () => Array.from({ length: frozen.lines }, () => new Float64Array(pad + 2 * reach + 64))
  const toneState = (tone: FrozenTone): ToneState => ({ tone, memory: new Float64Array(3) })
  const u = history()
  u.forEach((x, l) => {
    x[pad] = strike[l] as number
  })
  return {
    frozen,
    pad,
    done: 0,
    u,
    w: history(),
    loops:
      frozen.loop.gain === 0
        ? []
        : frozen.loop.reads.map((read) => ({ read, memory: new Float64Array(2), tone: toneState(frozen.loop.tone) })),
    outs: frozen.channels.map(({ line, wet, voices }) => ({
      line,
      wet,
      voices: wet === 0 ? [] : voices.map((read) => ({ read, memory: new Float64Array(1) })),
      tone: toneState(frozen.wetTone),
      memory: new Float64Array(1),
    })),
    sums: new Float64Array(frozen.channels.length),
    lineSums: new Float64Array(frozen.lines),
  }
}

/** Runs `count` more samples. */
export function advanceRun(run: ImpulseRun, count: number): void {
  const { frozen, loops, outs, pad } = run
  const from = pad + run.done
  const to = from + count
  grow(run, to)
  // No loop read comes closer than its first tap: so many samples can be read before the first of them is written.
  const piece = loops.length === 0 ? count : Math.min(...loops.map(({ read }) => read.first))
  for (let at = from; at < to; at += piece) writeLines(run, at, Math.min(to, at + piece))
  const m = new Float64Array(count)
  const outer = frozen.outputGain * frozen.output.slope
  outs.forEach((out, c) => {
    const w = run.w[out.line] as Float64Array
    const dryFrom = frozen.dryTap === 'line' ? w : (run.u[out.line] as Float64Array)
    m.fill(0)
    for (const { read, memory } of out.voices) addRead(read, memory, w, from, m, count)
    filterPass(out.tone, m, count)
    let sum = 0
    let before = out.memory[0] as number
    const half = frozen.output.averaged
    for (let j = 0; j < count; j++) {
      const y = outer * (frozen.dry * (dryFrom[from + j - frozen.dryDelay] as number) + out.wet * (m[j] as number))
      sum += Math.abs(half ? (y + before) / 2 : y)
      before = y
    }
    out.memory[0] = before
    run.sums[c] = (run.sums[c] as number) + sum
  })
  run.done += count
}

function grow(run: ImpulseRun, length: number): void {
  if ((run.w[0] as Float64Array).length >= length) return
  const larger = (x: Float64Array) => {
    const y = new Float64Array(2 * length)
    y.set(x)
    return y
  }
  run.w = run.w.map(larger)
  run.u = run.u.map(larger)
}

const MOST_PIECE = 1 << 16
let fed = [new Float64Array(1024), new Float64Array(1024)] as const

function writeLines({ frozen, loops, u, w, lineSums }: ImpulseRun, from: number, to: number): void {
  const count = to - from
  if (count > fed[0].length)
    fed = [new Float64Array(Math.min(MOST_PIECE, 2 * count) + count), new Float64Array(Math.min(MOST_PIECE, 2 * count) + count)]
  const { gain, slope, crossFeed: k } = frozen.loop
  const a = fed[0]
  const b = fed[1]
  a.fill(0, 0, count)
  b.fill(0, 0, count)
  loops.forEach((around, l) => {
    const s = l === 0 ? a : b
    addRead(around.read, around.memory, w[l] as Float64Array, from, s, count)
    filterPass(around.tone, s, count)
    if (slope.averaged) averagePass(around.memory, s, count)
  })
  const g = gain * slope.slope
  for (let l = 0; l < w.length; l++) {
    const own = l === 0 ? a : b
    const other = l === 0 ? b : a
    const into = w[l] as Float64Array
    const x = u[l] as Float64Array
    let sum = 0
    for (let j = 0; j < count; j++) {
      const value = (x[from + j] as number) + g * ((1 - k) * (own[j] as number) + k * (other[j] as number))
      into[from + j] = value
      sum += Math.abs(value)
    }
    lineSums[l] = (lineSums[l] as number) + sum
  }
}

/** out[j] += the read of `line` at from + j. */
function addRead(read: FrozenRead, memory: Float64Array, line: Float64Array, from: number, out: Float64Array, count: number): void {
  const { first, taps, pole } = read
  if (pole !== 0) {
    const start = from - first
    const t0 = taps[0] as number
    let y = memory[0] as number
    for (let j = 0; j < count; j++) {
      y = t0 * (line[start + j] as number) + (line[start + j - 1] as number) - pole * y
      if (y < NOTHING && y > -NOTHING) y = 0
      out[j] = (out[j] as number) + y
    }
    memory[0] = y
    return
  }
  for (let k = 0; k < taps.length; k++) {
    const tap = taps[k] as number
    const start = from - first - k
    if (tap !== 0) for (let j = 0; j < count; j++) out[j] = (out[j] as number) + tap * (line[start + j] as number)
  }
}

/** Recursions end here: processors are slow with the smallest numbers there are. Over any run it adds up to less than 1e-30. */
const NOTHING = 1e-40

function filterPass({ tone, memory }: ToneState, x: Float64Array, count: number): void {
  const { lowPass: a, highPass: b } = tone
  if (a !== null) {
    let y = memory[0] as number
    for (let j = 0; j < count; j++) {
      y = (1 - a) * (x[j] as number) + a * y
      if (y < NOTHING && y > -NOTHING) y = 0
      x[j] = y
    }
    memory[0] = y
  }
  if (b !== null) {
    let y = memory[1] as number
    let before = memory[2] as number
    for (let j = 0; j < count; j++) {
      const value = x[j] as number
      y = ((1 + b) / 2) * (value - before) + b * y
      if (y < NOTHING && y > -NOTHING) y = 0
      before = value
      x[j] = y
    }
    memory[1] = y
    memory[2] = before
  }
}

function averagePass(memory: Float64Array, x: Float64Array, count: number): void {
  let before = memory[1] as number
  for (let j = 0; j < count; j++) {
    const value = x[j] as number
    x[j] = (value + before) / 2
    before = value
  }
  memory[1] = before
}

/** What filters can still put out of their memory alone, in l1. */
export function heldByTone({ tone: { lowPass: a, highPass: b }, memory }: ToneState): number {
  const fromLow = a === null ? 0 : (a * Math.abs(memory[0] as number)) / (1 - a)
  if (b === null) return fromLow
  return (1 + b) * fromLow + Math.abs(b * (memory[1] as number) - ((1 + b) / 2) * (memory[2] as number)) / (1 - b)
}

/** The same of a read. */
export function heldByRead({ pole }: FrozenRead, memory: Float64Array): number {
  return (Math.abs(pole) * Math.abs(memory[0] as number)) / (1 - Math.abs(pole))
}
