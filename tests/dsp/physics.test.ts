// What must hold of the signal path whatever the numbers are.
import { describe, expect, it } from 'vitest'
import { createEngine, inputChannels, outputChannels, processEngine } from '../../src/dsp/engine.ts'
import { renderSet } from '../../src/dsp/render.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { largestDifference } from './close.ts'
import { noise } from './noise.ts'
import { changedSet, randomSet } from './sets.ts'

const FRAMES = 3000
const seeds = Array.from({ length: 12 }, (_, i) => 300 + i)
const inputs = (set: ParameterSet, seed: number) =>
  Array.from({ length: inputChannels(set.layout) }, (_, c) => noise(seed * 10 + c, FRAMES))
const linear = (set: ParameterSet): ParameterSet => ({
  ...set,
  input: { ...set.input, shaper: null },
  loop: { ...set.loop, shaper: null },
  mix: { ...set.mix, shaper: null },
})
const peak = (y: readonly Float64Array[]) => Math.max(...y.map((channel) => channel.reduce((m, v) => Math.max(m, Math.abs(v)), 0)))

it.each(seeds)('mix 0 returns the input bit for bit, seed %i', (seed) => {
  const random = randomSet(seed)
  const set: ParameterSet = {
    ...random,
    layout: 'stereo',
    input: { gainDb: 0, shaper: null },
    mix: { ...random.mix, dry: 1, wet: 0, dryTap: 'input', dryDelayMs: 0, outputGainDb: 0, shaper: null },
  }
  const x = inputs(set, seed)
  expect(renderSet(set, x)).toEqual(x)
})

it.each(seeds)('without shapers the path is linear, seed %i', (seed) => {
  const set = linear(randomSet(seed))
  const a = inputs(set, seed)
  const b = inputs(set, seed + 50)
  const sum = a.map((x, c) => x.map((v, n) => 2 * v - 0.5 * b[c]![n]!))
  const [ya, yb, ysum] = [renderSet(set, a), renderSet(set, b), renderSet(set, sum)]
  const scale = peak(ysum)
  ysum.forEach((y, c) => {
    const expected = ya[c]!.map((v, n) => 2 * v - 0.5 * yb[c]![n]!)
    expect(largestDifference(y, expected)).toBeLessThan(1e-12 * (scale + 1))
  })
})

it.each(seeds)('silence in is silence out, seed %i', (seed) => {
  const set = randomSet(seed)
  const y = renderSet(set, [new Float64Array(FRAMES)])
  expect(peak(y)).toBe(0)
})

it.each(seeds)('a symmetric path turns a turned input around, seed %i', (seed) => {
  const random = randomSet(seed)
  const even = <T extends { shaper: ParameterSet['loop']['shaper'] }>(block: T): T =>
    block.shaper ? { ...block, shaper: { ...block.shaper, positive: 0.7, negative: 0.7 } } : block
  const set = { ...random, input: even(random.input), loop: even(random.loop), mix: even(random.mix) }
  const x = inputs(set, seed)
  const y = renderSet(set, x)
  const turned = renderSet(
    set,
    x.map((channel) => channel.map((v) => -v)),
  )
  turned.forEach((channel, c) => {
    expect(channel.findIndex((v, n) => v !== -y[c]![n]!)).toBe(-1)
  })
})

it('the same input on both channels without stereo phase gives the same output on both', () => {
  const set = { ...changedSet(() => {}), layout: 'stereo' as const }
  const alike: ParameterSet = { ...set, sweep: { ...set.sweep, stereoPhase: 0 }, loop: { ...set.loop, feedback: 0.5, crossFeed: 0.3 } }
  const x = noise(3, FRAMES)
  const [left, right] = renderSet(alike, [x, x])
  expect(largestDifference(left!, right!)).toBeLessThan(1e-14)
})

describe('channels', () => {
  const set = (layout: ParameterSet['layout']) => changedSet((s) => void Object.assign(s, { layout }))
  const [a, b] = [noise(1, 400), noise(2, 400)]

  it('one input feeds every line, more inputs than lines are averaged, none is silence', () => {
    expect(renderSet(set('stereo'), [a])).toEqual(renderSet(set('stereo'), [a, a]))
    const mean = a.map((v, n) => (v + b[n]!) / 2)
    expect(renderSet(set('mono'), [a, b])).toEqual(renderSet(set('mono'), [mean]))
    expect(renderSet(set('monoToStereo'), [a, b])).toEqual(renderSet(set('monoToStereo'), [mean]))
    const y = [new Float64Array(64).fill(1), new Float64Array(64).fill(1)]
    processEngine(createEngine(set('stereo')), [], y, 64)
    expect(peak(y)).toBe(0)
  })

  it('invertRight turns the wet of the right channel only', () => {
    const wet = changedSet((s) => void Object.assign(s.mix, { dry: 0, invertRight: true }))
    const [left, right] = renderSet(wet, [a, b])
    const [plainLeft, plainRight] = renderSet({ ...wet, mix: { ...wet.mix, invertRight: false } }, [a, b])
    expect(left).toEqual(plainLeft)
    expect(
      largestDifference(
        right!,
        plainRight!.map((v) => -v),
      ),
    ).toBe(0)
  })

  it('output arrays past the layout repeat its last channel; input and output may be the same arrays', () => {
    const engine = createEngine(set('mono'))
    const y = [new Float64Array(300), new Float64Array(300)]
    processEngine(engine, [a], y, 300)
    expect(y[1]).toEqual(y[0])
    for (const layout of ['mono', 'stereo', 'monoToStereo'] as const) {
      const expected = renderSet(set(layout), [a, b])
      const both = [a.slice(), b.slice()]
      processEngine(createEngine(set(layout), { live: false }), both, both.slice(0, outputChannels(layout)), 400)
      expect(both.slice(0, outputChannels(layout))).toEqual(expected)
    }
  })

  it('single precision arrays give the same samples, rounded once', () => {
    const x = Float32Array.from(a)
    const y = [new Float32Array(400), new Float32Array(400)]
    processEngine(createEngine(set('stereo'), { live: false }), [x], y, 400)
    expect(y).toEqual(renderSet(set('stereo'), [Float64Array.from(x)]).map((channel) => Float32Array.from(channel)))
  })
})

describe('what is refused', () => {
  const set = changedSet(() => {})
  it.each([
    ['a value out of range', () => createEngine({ ...set, loop: { ...set.loop, feedback: 3 } }), /loop\.feedback .*-2 to 2, got 3/],
    ['a missing value', () => createEngine({ ...set, mix: { ...set.mix, wet: undefined as never } }), /mix\.wet is missing/],
    ['a drawn sweep without points', () => createEngine({ ...set, sweep: { ...set.sweep, shape: 'drawn' } }), /sweep\.points/],
    ['a rate out of range', () => createEngine(set, { sampleRate: 10 }), /sampleRate must be in \[1000, 768000\] Hz, got 10/],
    ['a longest delay out of range', () => createEngine(set, { maxDelayMs: 1e6 }), /maxDelayMs must be in/],
    ['no input', () => renderSet(set, []), /at least one channel/],
    ['unequal inputs', () => renderSet(set, [new Float64Array(3), new Float64Array(4)]), /equal lengths/],
    ['a negative tail', () => renderSet(set, [new Float64Array(3)], { tailSeconds: -1 }), /tailSeconds/],
  ])('%s', (_, act, message) => {
    expect(act).toThrow(RangeError)
    expect(act).toThrow(message)
  })
})

it('a tail goes on after the input, at the rate asked for', () => {
  const set = changedSet((s) => void Object.assign(s.loop, { feedback: 0.7 }))
  const y = renderSet(set, [noise(1, 480)], { sampleRate: 96000, tailSeconds: 0.1 })
  expect(y.map((channel) => channel.length)).toEqual([480 + 9600, 480 + 9600])
  expect(peak(y.map((channel) => channel.slice(2000)))).toBeGreaterThan(0)
})
