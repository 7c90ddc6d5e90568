// Rows 1 and 2: the engine against the same equations in C, in turns inside one run.
import { type ChildProcess, execFileSync, spawn } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import os from 'node:os'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { createEngine, inputChannels, outputChannels, processEngine, resetEngine } from '../../src/dsp/engine.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { noise } from '../dsp/noise.ts'
import { changedSet } from '../dsp/sets.ts'
import type { Bench, Row } from './bench.ts'

/** A quarter of a second at 48 kHz: short enough that most turns are not interrupted. */
const FRAMES = 12288
/** A round compares the fastest of some turns in a row on either side, so that cold caches and what else the machine does fall away. */
const TURNS = 6
const ROUNDS = 100
/** Rounds that only warm both sides up: the machine goes on compiling the engine for about a second. */
const WARM = 200

interface Kernel {
  readonly what: string
  readonly kind: 'stereo' | 'mono' | 'passes'
  /** The target; absent for what only informs. */
  readonly most?: number
  readonly set: ParameterSet
}

const base = changedSet((s) => {
  s.sampleRate = 48000
  s.loop.feedback = 0.5
  s.mix.dry = 0.7
  s.mix.wet = 0.7
  s.sweep.rateHz = 0.4
  s.sweep.updateEvery = 16
})

const fourVoices: ParameterSet = {
  ...base,
  layout: 'stereo',
  line: { baseMs: 12, interpolation: 'lagrange3' },
  sweep: { ...base.sweep, depthMs: 2.5, stereoPhase: 90 },
  voices: { count: 4, phaseSpread: 360, spreadMs: 4 },
  loop: { ...base.loop, dampingHz: 6000, lowCutHz: 80 },
}

const KERNELS: readonly Kernel[] = [
  {
    what: 'row 1: stereo, 4 voices, lagrange3, loop filters: time over that of C',
    kind: 'stereo',
    most: 1.25,
    set: fourVoices,
  },
  {
    what: 'row 2: mono, 1 voice, linear: time over that of C',
    kind: 'mono',
    most: 1.1,
    set: {
      ...base,
      layout: 'mono',
      line: { baseMs: 3, interpolation: 'linear' },
      sweep: { ...base.sweep, depthMs: 2 },
      voices: { count: 1, phaseSpread: 360, spreadMs: 0 },
    },
  },
  { what: 'row 1 against C in the passes the engine makes, which gcc vectorises', kind: 'passes', set: fourVoices },
]

export const engineBench: Bench = {
  id: 'engine',
  title: 'Engine against the same equations in C, sample by sample in one loop, Node',
  async run() {
    const folder = mkdtempSync(path.join(os.tmpdir(), 'combwright-bench-'))
    try {
      const program = compile(folder)
      const rows: Row[] = []
      for (const kernel of KERNELS) rows.push(row(kernel, await ratioOf(kernel, program, folder)))
      return rows
    } finally {
      rmSync(folder, { recursive: true })
    }
  },
}

/** Throws when gcc is not there. */
function compile(folder: string): string {
  const program = path.join(folder, 'kernels')
  execFileSync('gcc', ['-O3', '-march=native', '-o', program, fileURLToPath(new URL('kernels.c', import.meta.url)), '-lm'])
  return program
}

interface Ratio {
  readonly median: number
  readonly low: number
  readonly high: number
  readonly nsTypeScript: number
  readonly nsC: number
}

/** Renders the same noise in turns and compares the times; before, that both give the same samples. */
async function ratioOf({ kind, set }: Kernel, program: string, folder: string): Promise<Ratio> {
  const input = Array.from({ length: inputChannels(set.layout) }, (_, c) => noise(c + 1, FRAMES))
  const output = Array.from({ length: outputChannels(set.layout) }, () => new Float64Array(FRAMES))
  const file = path.join(folder, `${kind}.raw`)
  writeFileSync(file, Buffer.concat(input.map((x) => new Uint8Array(x.buffer))))
  const c = startC(program, [kind, String(FRAMES), file])
  const engine = createEngine(set, { live: false })
  const engineTime = () => {
    resetEngine(engine)
    const begin = process.hrtime.bigint()
    processEngine(engine, input, output, FRAMES)
    return Number(process.hrtime.bigint() - begin)
  }
  engineTime()
  expectSame(output, await c.dump(output.length))
  const rounds: (readonly [number, number])[] = []
  for (let round = 0; round < ROUNDS + WARM; round++) {
    let ours = Number.POSITIVE_INFINITY
    let native = Number.POSITIVE_INFINITY
    for (let turn = 0; turn < TURNS; turn++) ours = Math.min(ours, engineTime())
    for (let turn = 0; turn < TURNS; turn++) native = Math.min(native, await c.time())
    if (round >= WARM) rounds.push([ours, native])
  }
  c.end()
  const ratios = rounds.map(([ours, native]) => ours / native).sort((a, b) => a - b)
  const at = (part: number) => ratios[Math.floor(part * (ratios.length - 1))] as number
  const fastest = (side: 0 | 1) => Math.min(...rounds.map((round) => round[side])) / FRAMES
  return { median: at(0.5), low: at(0.25), high: at(0.75), nsTypeScript: fastest(0), nsC: fastest(1) }
}

function expectSame(ours: readonly Float64Array[], theirs: readonly Float64Array[]): void {
  const worst = Math.max(...ours.map((y, c) => Math.max(...y.map((v, n) => Math.abs(v - theirs[c]![n]!)))))
  if (!(worst < 1e-12)) throw new Error(`the engine and the C kernel differ by ${worst}; their times cannot be compared`)
}

function startC(program: string, args: readonly string[]) {
  const child: ChildProcess = spawn(program, args, { stdio: ['pipe', 'pipe', 'inherit'] })
  let received = Buffer.alloc(0)
  let wake = () => {}
  child.stdout!.on('data', (data: Buffer) => {
    received = Buffer.concat([received, data])
    wake()
  })
  const until = async (complete: () => number) => {
    while (complete() === 0) await new Promise<void>((resolve) => (wake = resolve))
    const answer = received.subarray(0, complete())
    received = received.subarray(complete())
    return answer
  }
  return {
    async time(): Promise<number> {
      child.stdin!.write('go\n')
      return Number((await until(() => received.indexOf('\n') + 1)).toString())
    },
    async dump(channels: number): Promise<Float64Array[]> {
      const bytes = FRAMES * Float64Array.BYTES_PER_ELEMENT
      child.stdin!.write('dump\n')
      const answer = await until(() => (received.length >= bytes * channels ? bytes * channels : 0))
      return Array.from(
        { length: channels },
        (_, c) => new Float64Array(new Uint8Array(answer.subarray(c * bytes, (c + 1) * bytes)).buffer),
      )
    },
    end(): void {
      child.stdin!.end()
    },
  }
}

function row({ what, most }: Kernel, ratio: Ratio): Row {
  const two = (value: number) => value.toFixed(2)
  return {
    what,
    value: ratio.median,
    unit: '×',
    ...(most !== undefined && { target: `≤ ${two(most)}`, met: ratio.median <= most }),
    how: `median of ${ROUNDS} rounds (half of them ${two(ratio.low)} to ${two(ratio.high)}), each the fastest of ${TURNS} renders of ${FRAMES} frames by either side, side after side; at best ${two(ratio.nsTypeScript)} ns a frame against ${two(ratio.nsC)} ns. C: kernels.c, gcc -O3 -march=native, parameters read at run time; both outputs agree within 1e-12.`,
  }
}
