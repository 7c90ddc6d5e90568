// Run in a process of its own (see allocation.ts): counts the bytes the engine leaves on the JavaScript heap while it plays, as the audio thread
// would call it. Prints JSON: for each way of playing, bytes a block. `sloppy` is the same engine with one small array made a block: the proof
// that an allocation shows.
import {
  type BypassMode,
  createEngine,
  type Engine,
  engineCounters,
  holdPosition,
  processEngine,
  retargetEngine,
  setBypass,
  setDelayChange,
  sweepPosition,
} from '../../src/dsp/engine.ts'
import { flatten } from '../../src/set/flat.ts'
import { noise } from './noise.ts'
import { randomSet } from './sets.ts'

declare const gc: () => void

const BLOCK = 128
const WARM_BLOCKS = 20000
const BLOCKS = 6400
const WINDOWS = 60

const input = [Float32Array.from(noise(1, BLOCK)), Float32Array.from(noise(2, BLOCK))]
const output = [new Float32Array(BLOCK), new Float32Array(BLOCK)]
const sets = Array.from({ length: 40 }, (_, i) => randomSet(9000 + i))
const flats = sets.map((set) => flatten(set))
const modes: readonly BypassMode[] = ['off', 'tails', 'off', 'hard', 'off', 'wetOnly']
const kept: Float64Array[] = []
let sink = 0

function play(engine: Engine, blocks: number): void {
  for (let i = 0; i < blocks; i++) processEngine(engine, input, output, BLOCK)
}

/** Every kind of live change, several a second of sound. */
function playEdited(engine: Engine, blocks: number): void {
  for (let i = 0; i < blocks; i++) {
    if (i % 16 === 0) retargetEngine(engine, flats[(i / 16) % flats.length]!)
    if (i % 640 === 0) setDelayChange(engine, i % 1280 === 0 ? 'glide' : 'crossfade')
    if (i % 1000 === 0) setBypass(engine, modes[(i / 1000) % modes.length]!)
    if (i % 333 === 0) holdPosition(engine, i % 666 === 0 ? null : 0.3)
    processEngine(engine, input, output, BLOCK)
    if (engineCounters(engine).nonFinite > 0) sink++
  }
}

function playSloppily(engine: Engine, blocks: number): void {
  for (let i = 0; i < blocks; i++) {
    processEngine(engine, input, output, BLOCK)
    kept[i % 4] = new Float64Array(2)
  }
}

/**
 * Bytes a block once everything is warm: the least of some windows, because compiling goes on beside, on a busy machine for long; `enough` ends it
 * sooner. What allocates shows in every window. The new space is larger than all that could be made, so nothing is collected in one.
 */
function measure(way: (engine: Engine, blocks: number) => void, engine: Engine, enough: number): number {
  way(engine, WARM_BLOCKS)
  let least = Number.POSITIVE_INFINITY
  for (let window = 0; window < WINDOWS && least > enough; window++) {
    gc()
    const before = process.memoryUsage().heapUsed
    way(engine, BLOCKS)
    least = Math.min(least, (process.memoryUsage().heapUsed - before) / BLOCKS)
  }
  return least
}

const engines = [0, 3, 8, 17].map((i) => createEngine(sets[i]!, { sampleRate: 48000, maxDelayMs: 400 }))
const steady = engines.map((engine) => measure(play, engine, 0.5))
const edited = measure(playEdited, createEngine(sets[0]!, { sampleRate: 48000, maxDelayMs: 400 }), 2)
const sloppy = measure(playSloppily, engines[0]!, 1000)
sink += sweepPosition(engines[0]!)
process.stdout.write(JSON.stringify({ steady, edited, sloppy, sink }))
