// The engine plays common sets in loops of their own (a linear loop, a single linear voice, the sine). They must give what the general way gives.
import { describe, expect, it } from 'vitest'
import type { Core } from '../../src/dsp/core.ts'
import { createEngine, outputChannels, processEngine } from '../../src/dsp/engine.ts'
import { isLinearLoop } from '../../src/dsp/linearLoop.ts'
import { isOneVoice } from '../../src/dsp/oneVoice.ts'
import { renderSet } from '../../src/dsp/render.ts'
import { defaultShaper } from '../../src/set/defaults.ts'
import type { ParameterSet, Shaper } from '../../src/set/types.ts'
import { largestDifference } from './close.ts'
import { noise } from './noise.ts'
import { randomSet } from './sets.ts'

/** A shaper that changes no bit: dividing and multiplying by 1. It is only in the way of the special loops. */
const nothing: Shaper = { ...defaultShaper('deadZone'), deadZone: 0 }

const input = [noise(5, 2500), noise(6, 2500)]
const seeds = Array.from({ length: 25 }, (_, i) => 700 + i)

const special = (seed: number, change: (set: ParameterSet) => ParameterSet): ParameterSet => {
  const set = randomSet(seed)
  const shaperless = {
    ...set,
    input: { ...set.input, shaper: null },
    loop: { ...set.loop, shaper: null },
    mix: { ...set.mix, shaper: null },
  }
  return change({ ...shaperless, loop: { ...shaperless.loop, feedback: 0.6, interpolation: 'linear', crossFeed: 0 } })
}

/** The sounding core after a first block. */
function coreOf(set: ParameterSet): Core {
  const engine = createEngine(set, { live: false })
  const y = Array.from({ length: outputChannels(set.layout) }, () => new Float64Array(64))
  processEngine(engine, input, y, 64)
  return engine.core
}

const inTheWay = (set: ParameterSet): ParameterSet => ({ ...set, input: { ...set.input, shaper: nothing } })

it.each(seeds)('the linear loop gives the bits of the general one, seed %i', (seed) => {
  const set = special(seed, (s) => s)
  expect(isLinearLoop(coreOf(set), false)).toBe(true)
  expect(isLinearLoop(coreOf(inTheWay(set)), false)).toBe(false)
  expect(renderSet(set, input)).toEqual(renderSet(inTheWay(set), input))
})

it.each(seeds)('the single linear voice gives the bits of the general way, seed %i', (seed) => {
  const set = special(seed, (s) => ({
    ...s,
    layout: seed % 2 === 0 ? 'mono' : 'stereo',
    input: { gainDb: 0, shaper: null },
    line: { ...s.line, interpolation: 'linear' },
    voices: { ...s.voices, count: 1 },
    loop: { ...s.loop, dampingHz: null, lowCutHz: null },
    mix: { ...s.mix, dryTap: 'input', dryDelayMs: 0, wetLowCutHz: null, wetHighCutHz: null },
  }))
  const output = Array.from({ length: outputChannels(set.layout) }, () => new Float64Array(1))
  expect(isOneVoice(coreOf(set), output)).toBe(true)
  expect(isOneVoice(coreOf(inTheWay(set)), output)).toBe(false)
  expect(renderSet(set, input)).toEqual(renderSet(inTheWay(set), input))
})

describe('the sine by the addition theorem', () => {
  it.each(seeds)('gives the samples of the direct formula, seed %i', (seed) => {
    const set = special(seed, (s) => ({
      ...s,
      line: { ...s.line, interpolation: 'lagrange3' },
      sweep: { ...s.sweep, shape: 'sine', law: 'time', rateHz: Math.max(s.sweep.rateHz, 0.1) },
    }))
    // A nearest loop read whose feedback is 0 sounds the same and is not continuous: it sends the voices the general way.
    const silentLoop = { ...set, loop: { ...set.loop, feedback: 0 } }
    const general = { ...silentLoop, loop: { ...silentLoop.loop, interpolation: 'nearest' as const } }
    expect(coreOf(silentLoop).settings.plainSine).toBe(true)
    expect(coreOf(general).settings.plainSine).toBe(false)
    const [a, b] = [renderSet(silentLoop, input), renderSet(general, input)]
    a.forEach((y, c) => {
      expect(largestDifference(y, b[c]!)).toBeLessThan(1e-11)
    })
  })
})
