// Live changes make no click: on a smooth input the output's steepest step from sample to sample stays near the steepest of the steady
// sound before and after. A break of the signal would be a step of its own size, ten and more times as steep.
import { describe, expect, it } from 'vitest'
import {
  createEngine,
  type DelayChange,
  type Engine,
  engineCounters,
  holdPosition,
  processEngine,
  resetEngine,
  retargetEngine,
  setBypass,
  setDelayChange,
  sweepPosition,
} from '../../src/dsp/engine.ts'
import { FLAT_PARAMETERS, flatIndex, flatten } from '../../src/set/flat.ts'
import { withAt } from '../../src/set/path.ts'
import type { ParameterSet, Shaper } from '../../src/set/types.ts'
import { largestDifference } from './close.ts'
import { changedSet } from './sets.ts'

const FS = 48000
const TONE_HZ = 220

const shaper: Shaper = {
  curve: 'tanh',
  drive: 2,
  ceiling: 0.5,
  positive: 1,
  negative: 1,
  deadZone: 0.01,
  points: [
    [0, 0],
    [1, 0.8],
    [2, 1],
  ],
  tableSize: 1024,
  tableRange: 1,
  tableInterpolation: 'linear',
  antialias: 'none',
}

const start = changedSet((s) => {
  s.sampleRate = FS
  s.line.baseMs = 9
  s.sweep.rateHz = 0.7
  s.sweep.depthMs = 2
  s.sweep.points = [
    [0, -1],
    [0.4, 0.5],
    [0.8, 1],
  ]
  s.voices = { count: 2, phaseSpread: 180, spreadMs: 2 }
  Object.assign(s.loop, { feedback: 0.5, dampingHz: 4000, lowCutHz: 60, crossFeed: 0.2, shaper })
  Object.assign(s.mix, { wetLowCutHz: 40, wetHighCutHz: 9000, dryDelayMs: 1, shaper })
  s.input.shaper = shaper
})

/** Another value for every parameter that is heard. */
const changes: Record<string, unknown> = {
  layout: 'mono',
  'input.gainDb': -9,
  'input.shaper': null,
  'line.baseMs': 14,
  'line.interpolation': 'allpass1',
  'sweep.shape': 'drawn',
  'sweep.rateHz': 2,
  'sweep.law': 'ratio',
  'sweep.depthMs': 0.3,
  'sweep.depthOctaves': 0.2,
  'sweep.startPhase': 0.6,
  'sweep.stereoPhase': -100,
  'sweep.edgeMs': 200,
  'sweep.seed': 77,
  'sweep.points': [
    [0, 1],
    [0.5, -1],
  ],
  'sweep.updateEvery': 1,
  'sweep.between': 'hold',
  'voices.count': 6,
  'voices.phaseSpread': -90,
  'voices.spreadMs': 6,
  'loop.feedback': -0.6,
  'loop.delay': 'fixed',
  'loop.interpolation': 'hermite4',
  'loop.dampingHz': null,
  'loop.lowCutHz': null,
  'loop.crossFeed': 0.9,
  'loop.shaper': null,
  'mix.dry': -0.2,
  'mix.wet': -1,
  'mix.dryTap': 'line',
  'mix.dryDelayMs': 7,
  'mix.wetLowCutHz': null,
  'mix.wetHighCutHz': 700,
  'mix.invertRight': true,
  'mix.outputGainDb': 6,
  'mix.shaper': null,
}
const shaperChanges: Readonly<Record<string, unknown>> = {
  curve: 'diode',
  drive: 0.7,
  ceiling: 0.8,
  positive: 0.3,
  negative: 0.2,
  deadZone: 0,
  points: [
    [0, 0],
    [1, 0.2],
    [3, 0.4],
  ],
  antialias: 'adaa1',
}

for (const [field, value] of Object.entries(shaperChanges)) changes[`loop.shaper.${field}`] = value

/** What has to be so before a change means anything. */
const before: Readonly<Record<string, Readonly<Record<string, unknown>>>> = {
  'sweep.depthOctaves': { 'sweep.law': 'ratio' },
  'sweep.edgeMs': { 'sweep.shape': 'square' },
  'sweep.seed': { 'sweep.shape': 'drift' },
  'sweep.points': { 'sweep.shape': 'drawn' },
  'loop.shaper.deadZone': { 'loop.shaper.curve': 'deadZone' },
  'loop.shaper.points': { 'loop.shaper.curve': 'drawn' },
}

const changed = (set: ParameterSet, values: Readonly<Record<string, unknown>>) =>
  Object.entries(values).reduce((at, [path, value]) => withAt(at, path, value), set)

function tone(seconds: number): Float64Array[] {
  const x = Float64Array.from({ length: Math.round(seconds * FS) }, (_, n) => 0.4 * Math.sin((2 * Math.PI * TONE_HZ * n) / FS))
  return [x, x.map((v) => 0.8 * v)]
}

/** The steepest step of either channel over samples from … to. */
function steepest(y: readonly Float64Array[], from: number, to: number): number {
  let most = 0
  for (const channel of y) for (let n = from + 1; n < to; n++) most = Math.max(most, Math.abs(channel[n]! - channel[n - 1]!))
  return most
}

type Act = (engine: Engine) => void

/**
 * Sounds `set` for 1.5 s, does the acts a twentieth of a second apart, sounds on for 1 s and 1 s more; returns the steepest step from the
 * first act on as a multiple of the steepest of the 0.8 s before and the last second.
 */
function clickOf(set: ParameterSet, ...acts: readonly Act[]): number {
  const first = 1.5 * FS + 37
  const input = tone(4)
  const y = [new Float64Array(4 * FS), new Float64Array(4 * FS)]
  const engine = createEngine(set, { maxDelayMs: 60 })
  let n = 0
  const until = (stop: number) => {
    processEngine(engine, input, y, stop - n, n)
    n = stop
  }
  acts.forEach((act, i) => {
    until(first + (i * FS) / 20)
    act(engine)
  })
  until(4 * FS)
  const steady = Math.max(steepest(y, 0.7 * FS, first), steepest(y, 3 * FS, 4 * FS))
  return steepest(y, first - 1, 3 * FS) / steady
}

const apart = (a: readonly Float64Array[], b: readonly Float64Array[], from: number, to: number): number =>
  Math.max(...a.map((channel, c) => largestDifference(channel, b[c]!, from, to)))

/** Glides bend the tone up by half, and two signals that cross-fade may each be at their steepest; more would be a break. */
const NO_CLICK = 2

describe.each<DelayChange>(['glide', 'crossfade'])('no click when delays %s', (how) => {
  it.each(Object.entries(changes))('%s', (path, value) => {
    const from = changed(start, before[path] ?? {})
    const flat = flatten(changed(from, { [path]: value }))
    const forth = clickOf(from, (engine) => {
      setDelayChange(engine, how)
      retargetEngine(engine, flat)
    })
    expect(forth).toBeLessThan(NO_CLICK)
    const back = clickOf(changed(from, { [path]: value }), (engine) => {
      setDelayChange(engine, how)
      retargetEngine(engine, flatten(from))
    })
    expect(back).toBeLessThan(NO_CLICK)
  })
})

// The line takes in what the loop gives: a step there would be heard a delay later, long after the 20 ms of the cross-fade.
describe.each<DelayChange>(['glide', 'crossfade'])('no click a delay later when delays %s', (how) => {
  const strong = changed(start, {
    'line.baseMs': 40,
    'loop.feedback': 0.8,
    'loop.dampingHz': null,
    'loop.shaper': { ...shaper, drive: 4, ceiling: 0.25 },
    'input.shaper': { ...shaper, drive: 3, ceiling: 0.4, antialias: 'adaa1' },
  })
  it.each([
    ['loop.delay', 'fixed'],
    ['loop.interpolation', 'allpass1'],
    ['loop.shaper', null],
    ['loop.shaper.curve', 'hardClip'],
    ['loop.shaper.antialias', 'adaa1'],
    ['input.shaper', null],
    ['layout', 'mono'],
    ['layout', 'monoToStereo'],
    ['line.baseMs', 47],
    ['sweep.startPhase', 0.5],
  ])('%s %s', (path, value) => {
    const to = changed(strong, { [path]: value })
    const send =
      (set: ParameterSet): Act =>
      (engine) => {
        setDelayChange(engine, how)
        retargetEngine(engine, flatten(set))
      }
    expect(clickOf(strong, send(to))).toBeLessThan(NO_CLICK)
    expect(clickOf(to, send(strong))).toBeLessThan(NO_CLICK)
  })
})

it('every parameter that is heard has its change above', () => {
  const heard = FLAT_PARAMETERS.map((p) => p.path).filter((path) => path !== 'sampleRate' && !path.includes('.table'))
  const missing = heard.filter((path) => !(path in changes) && !/^(input|mix)\.shaper\./.test(path))
  expect(missing).toEqual([])
})

it('the measure finds a click: the same change made by a new engine is one', () => {
  const input = tone(2)
  const y = [new Float64Array(input[0]!.length), new Float64Array(input[0]!.length)]
  const at = FS + 37
  processEngine(createEngine(start), input, y, at)
  processEngine(createEngine(changed(start, { 'mix.dry': -0.2 })), input, y, FS - 37, at)
  expect(steepest(y, at - 1, at + 10) / steepest(y, FS / 2, at)).toBeGreaterThan(10)
})

describe('no click from', () => {
  it.each(['hard', 'tails', 'wetOnly'] as const)('bypass %s and back', (mode) => {
    expect(clickOf(start, (engine) => setBypass(engine, mode))).toBeLessThan(NO_CLICK)
    const there: Act = (engine) => setBypass(engine, mode)
    const back: Act = (engine) => setBypass(engine, 'off')
    expect(clickOf(start, there, back)).toBeLessThan(NO_CLICK)
    expect(clickOf(start, there, back, there, back)).toBeLessThan(NO_CLICK)
  })

  it('holding a position, moving it and letting go', () => {
    expect(clickOf(start, (engine) => holdPosition(engine, 0.1))).toBeLessThan(NO_CLICK)
    const moves = [0.2, 0.9, 0.4, null].map(
      (position): Act =>
        (engine) =>
          holdPosition(engine, position),
    )
    expect(clickOf(start, ...moves)).toBeLessThan(NO_CLICK)
  })

  it('many changes of structure, the later ones during the cross-fade of the one before', () => {
    const kinds = ['nearest', 'linear', 'lagrange3', 'hermite4', 'allpass1'] as const
    const all: Act = (engine) => {
      for (const [i, kind] of kinds.entries()) {
        retargetEngine(engine, flatten(changed(start, { 'line.interpolation': kind, 'voices.count': 1 + i, 'mix.wet': 0.1 * i })))
      }
    }
    expect(clickOf(start, all)).toBeLessThan(NO_CLICK)
  })

  it('a hand on two knobs: thirty edits of feedback and base a second', () => {
    const edits = Array.from({ length: 20 }, (_, i): Act => {
      const flat = flatten(changed(start, { 'line.baseMs': 9 + Math.sin(i), 'loop.feedback': 0.5 + 0.3 * Math.cos(i) }))
      return (engine) => retargetEngine(engine, flat)
    })
    expect(clickOf(start, ...edits)).toBeLessThan(NO_CLICK)
  })
})

describe('a change that was accepted arrives', () => {
  it.each([
    ['glide', 3],
    ['crossfade', 0.5],
  ] as const)('%s: after its time the engine sounds as one started with the new set', (how, seconds) => {
    const to = changed(start, {
      'line.baseMs': 11,
      'mix.wet': 0.4,
      'sweep.depthMs': 1,
      'loop.feedback': 0.3,
      'line.interpolation': 'linear',
    })
    const length = Math.round((seconds + 1) * FS)
    const input = [tone(seconds + 1)[0]!, tone(seconds + 1)[0]!]
    const edited = [new Float64Array(length), new Float64Array(length)]
    const fresh = [new Float64Array(length), new Float64Array(length)]
    const engine = createEngine(start, { maxDelayMs: 60 })
    setDelayChange(engine, how)
    processEngine(engine, input, edited, 1000)
    retargetEngine(engine, flatten(to))
    processEngine(engine, input, edited, length - 1000, 1000)
    processEngine(createEngine(to), input, fresh, length)
    expect(apart(edited, fresh, length - FS / 2, length)).toBeLessThan(1e-7)
  })

  it('before the first sample a change is no change: the result is that of the new set, bit for bit', () => {
    const to = changed(start, { 'line.baseMs': 11, layout: 'mono', 'sweep.startPhase': 0.3 })
    const input = tone(0.1)
    const y = [new Float64Array(4800), new Float64Array(4800)]
    const expected = [new Float64Array(4800), new Float64Array(4800)]
    const engine = createEngine(start, { maxDelayMs: 60 })
    retargetEngine(engine, flatten(to))
    processEngine(engine, input, y, 4800)
    processEngine(createEngine(to, { maxDelayMs: 60 }), input, expected, 4800)
    expect(y).toEqual(expected)
  })

  it('a set sent again changes no bit', () => {
    const input = tone(0.2)
    const y = [new Float64Array(9600), new Float64Array(9600)]
    const expected = [new Float64Array(9600), new Float64Array(9600)]
    const engine = createEngine(start)
    for (let n = 0; n < 9600; n += 960) {
      retargetEngine(engine, flatten(start))
      processEngine(engine, input, y, 960, n)
    }
    processEngine(createEngine(start), input, expected, 9600)
    expect(y).toEqual(expected)
  })
})

describe('the sweep', () => {
  it('keeps its phase through a new rate', () => {
    const engine = createEngine(start)
    const y = [new Float64Array(FS), new Float64Array(FS)]
    processEngine(engine, [], y, 20000)
    const position = sweepPosition(engine)
    retargetEngine(engine, flatten(changed(start, { 'sweep.rateHz': 5 })))
    expect(sweepPosition(engine)).toBeCloseTo(position, 12)
    processEngine(engine, [], y, 960)
    expect(sweepPosition(engine)).toBeCloseTo((position + (5 * 960) / FS) % 1, 12)
  })

  it('stands at a held position and goes on from it', () => {
    const engine = createEngine(start)
    const y = [new Float64Array(FS), new Float64Array(FS)]
    processEngine(engine, [], y, 12345)
    holdPosition(engine, 0.25)
    processEngine(engine, [], y, 9999)
    expect(sweepPosition(engine)).toBe(0.25)
    holdPosition(engine, null)
    processEngine(engine, [], y, 480)
    expect(sweepPosition(engine)).toBeCloseTo(0.25 + (0.7 * 480) / FS, 12)
  })
})

describe('bypass', () => {
  const played = (mode: 'hard' | 'tails' | 'wetOnly', input: readonly Float64Array[], set = start) => {
    const engine = createEngine(set)
    const y = [new Float64Array(FS), new Float64Array(FS)]
    processEngine(engine, input, y, FS / 2)
    setBypass(engine, mode)
    processEngine(engine, input, y, FS / 2, FS / 2)
    return { engine, y }
  }

  it('hard passes the input as it is, and comes back empty', () => {
    const input = tone(1)
    const { engine, y } = played('hard', input)
    expect(apart(y, input, FS / 2 + 960, FS)).toBe(0)
    setBypass(engine, 'off')
    const after = [new Float64Array(FS / 2), new Float64Array(FS / 2)]
    processEngine(engine, [], after, FS / 2)
    expect(Math.max(...after[0]!.map(Math.abs))).toBe(0)
  })

  it('tails passes the input as it is and lets the line ring out', () => {
    const input = tone(1).map((x) => x.map((v, n) => (n < FS / 2 ? v : 0)))
    const { y } = played('tails', input)
    const rms = (from: number, to: number) => Math.hypot(...y[0]!.slice(from, to)) / Math.sqrt(to - from)
    expect(rms(FS / 2 + 1000, FS / 2 + 1500)).toBeGreaterThan(1e-3)
    expect(rms(FS - 500, FS)).toBeLessThan(1e-6)
    const steady = tone(1)
    const { y: dry } = played('tails', steady)
    expect(apart(dry, steady, FS - 1000, FS)).toBeLessThan(1e-6)
  })

  it('wetOnly shuts the dry path and nothing else', () => {
    const input = tone(1)
    const { y } = played('wetOnly', input)
    const wet = [new Float64Array(FS), new Float64Array(FS)]
    processEngine(createEngine(changed(start, { 'mix.dry': 0 })), input, wet, FS)
    expect(apart(y, wet, FS - 1000, FS)).toBeLessThan(1e-9)
  })
})

describe('what cannot be done is held and counted', () => {
  it('values out of range, unknown choices, NaN and bad points keep what was', () => {
    const engine = createEngine(start)
    const y = [new Float64Array(480), new Float64Array(480)]
    processEngine(engine, tone(0.01), y, 480)
    const flat = flatten(start)
    const bad: Readonly<Record<string, number>> = {
      'loop.feedback': 3,
      'line.baseMs': Number.NaN,
      'line.interpolation': 9,
      'sweep.updateEvery': 3,
      'voices.count': 2.5,
      'mix.dry': Number.POSITIVE_INFINITY,
      'sweep.shape': -1,
    }
    for (const [path, value] of Object.entries(bad)) flat[flatIndex(path)] = value
    const kept = Float64Array.from(engine.accepted)
    retargetEngine(engine, flat)
    expect(engine.accepted).toEqual(kept)
    expect(engineCounters(engine).refusedValues).toBe(Object.keys(bad).length)
    retargetEngine(engine, new Float64Array(3))
    expect(engineCounters(engine).refusedValues).toBeGreaterThan(Object.keys(bad).length)
    expect(engine.accepted).toEqual(kept)
  })

  it('drawn without its points is refused', () => {
    const engine = createEngine(changed(start, { 'sweep.points': [] }))
    retargetEngine(engine, flatten(changed(start, { 'sweep.shape': 'drawn', 'sweep.points': [] })))
    expect(engineCounters(engine).refusedValues).toBe(1)
    expect(engine.core.settings.sweep.shape).toBe('sine')
  })

  it('reads closer than the interpolator can, or further than the line reaches', () => {
    const engine = createEngine(start, { maxDelayMs: 20 })
    const y = [new Float64Array(FS), new Float64Array(FS)]
    processEngine(engine, tone(1), y, FS)
    expect(engineCounters(engine).heldDelays).toBe(0)
    retargetEngine(engine, flatten(changed(start, { 'line.baseMs': 1 })))
    processEngine(engine, tone(1), y, FS)
    const close = engineCounters(engine).heldDelays
    expect(close).toBeGreaterThan(1000)
    retargetEngine(engine, flatten(changed(start, { 'line.baseMs': 300 })))
    processEngine(engine, tone(1), y, FS)
    expect(engineCounters(engine).heldDelays).toBeGreaterThan(close + FS)
    expect(y[0]!.every(Number.isFinite)).toBe(true)
  })

  it('samples that are not finite, until the engine is reset', () => {
    const engine = createEngine(start)
    const input = [new Float64Array(4800), new Float64Array(4800)]
    const y = [new Float64Array(4800), new Float64Array(4800)]
    input[0]![100] = Number.NaN
    processEngine(engine, input, y, 4800)
    const bad = y.reduce((sum, channel) => sum + channel.filter((v) => !Number.isFinite(v)).length, 0)
    expect(bad).toBeGreaterThan(0)
    expect(engineCounters(engine).nonFinite).toBe(bad)
    resetEngine(engine)
    expect(engineCounters(engine)).toEqual({ heldDelays: 0, nonFinite: 0, refusedValues: 0 })
    const x = tone(0.1)
    const expected = [new Float64Array(4800), new Float64Array(4800)]
    processEngine(engine, x, y, 4800)
    processEngine(createEngine(start), x, expected, 4800)
    expect(y).toEqual(expected)
  })
})
