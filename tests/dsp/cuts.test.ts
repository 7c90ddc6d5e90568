// The result of the engine does not depend on how a signal is cut into calls: bit for bit, also while live changes are under way. Calls of
// one sample take the general way through every read and loop, long calls the fast ones, so this also proves the two alike.
import { describe, expect, it } from 'vitest'
import {
  type BypassMode,
  createEngine,
  type DelayChange,
  type Engine,
  holdPosition,
  outputChannels,
  processEngine,
  retargetEngine,
  setBypass,
  setDelayChange,
  sweepPosition,
} from '../../src/dsp/engine.ts'
import { flatten } from '../../src/set/flat.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { noise } from './noise.ts'
import { type Random, random, randomSet } from './sets.ts'

const FRAMES = 1500
const input = [noise(1, FRAMES), noise(2, FRAMES)]

/** Cuts `total` into lengths drawn by `r`: single samples, odd lengths, long ones. */
function cutsOf(r: Random, total: number): number[] {
  const cuts: number[] = []
  for (let left = total; left > 0; left -= cuts.at(-1)!) cuts.push(Math.min(left, r.of([1, 1, 2, 7, 16, 33, 64, 127, 128, 129, 500])))
  return cuts
}

interface Event {
  readonly at: number
  readonly act: (engine: Engine) => void
}

function run(set: ParameterSet, live: boolean, events: readonly Event[], cuts: (length: number) => readonly number[]): Float64Array[] {
  const engine = createEngine(set, { live, maxDelayMs: 400 })
  const output = Array.from({ length: outputChannels(set.layout) }, () => new Float64Array(FRAMES))
  const stops = [...events.map((e) => e.at), FRAMES]
  let n = 0
  stops.forEach((stop, i) => {
    for (const length of cuts(stop - n)) {
      processEngine(engine, input, output, length, n)
      n += length
    }
    events[i]?.act(engine)
  })
  return output
}

function expectSameBits(a: readonly Float64Array[], b: readonly Float64Array[]): void {
  a.forEach((channel, c) => {
    const first = channel.findIndex((v, n) => !Object.is(v, b[c]![n]))
    expect(first, `channel ${c} first differs at sample`).toBe(-1)
  })
}

const whole = (length: number) => (length > 0 ? [length] : [])
const singly = (length: number) => new Array<number>(length).fill(1)

describe('cuts change no bit of an unchanged set', () => {
  it.each(Array.from({ length: 60 }, (_, i) => 1000 + i))('seed %i', (seed) => {
    const set = randomSet(seed)
    const r = random(seed + 1)
    const expected = run(set, false, [], whole)
    expectSameBits(run(set, false, [], singly), expected)
    expectSameBits(
      run(set, false, [], (n) => cutsOf(r, n)),
      expected,
    )
  })
})

describe('cuts change no bit while live changes are under way', () => {
  it.each(Array.from({ length: 60 }, (_, i) => 5000 + i))('seed %i', (seed) => {
    const r = random(seed)
    const events = Array.from({ length: 5 }, () => ({ at: r.integer(0, FRAMES), act: eventOf(r) })).sort((a, b) => a.at - b.at)
    const set = randomSet(seed)
    const expected = run(set, true, events, whole)
    expectSameBits(run(set, true, events, singly), expected)
    expectSameBits(
      run(set, true, events, (n) => cutsOf(r, n)),
      expected,
    )
  })
})

it('half a day in, where sample numbers pass 32 bits, cuts still change no bit and the sweep is where it belongs', () => {
  const set = randomSet(1004)
  const from = 2 ** 31 - 700
  const late = (cuts: (length: number) => readonly number[]) => {
    const engine = createEngine(set, { live: false })
    engine.n = from
    const output = Array.from({ length: outputChannels(set.layout) }, () => new Float64Array(FRAMES))
    let n = 0
    for (const length of cuts(FRAMES)) {
      processEngine(engine, input, output, length, n)
      n += length
    }
    const phase = ((from + FRAMES) * set.sweep.rateHz) / set.sampleRate + set.sweep.startPhase
    expect(sweepPosition(engine)).toBeCloseTo(phase - Math.floor(phase), 9)
    return output
  }
  const r = random(99)
  expectSameBits(late(singly), late(whole))
  expectSameBits(
    late((n) => cutsOf(r, n)),
    late(whole),
  )
})

function eventOf(r: Random): (engine: Engine) => void {
  const what = r.integer(0, 5)
  if (what === 0) {
    const mode = r.of<BypassMode>(['off', 'hard', 'tails', 'wetOnly'])
    return (engine) => setBypass(engine, mode)
  }
  if (what === 1) {
    const position = r.chance(0.5) ? null : r.next()
    return (engine) => holdPosition(engine, position)
  }
  const how = r.of<DelayChange>(['glide', 'crossfade'])
  const flat = flatten(randomSet(r.integer(0, 2 ** 31)))
  return (engine) => {
    setDelayChange(engine, how)
    retargetEngine(engine, flat)
  }
}
