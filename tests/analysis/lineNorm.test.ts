// Oracle: the engine. Its impulse response summed, and inputs of ±1 made to hit hardest, rendered.
import { describe, expect, it } from 'vitest'
import { freezeAtLargestSlope, lineAsOutput } from '../../src/analysis/levelsSet.ts'
import { peakBounds } from '../../src/analysis/lineNorm.ts'
import { impulseNorm } from '../../src/analysis/lineNormFrozen.ts'
import { renderSet } from '../../src/dsp/render.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { peak } from '../../src/signal/levels.ts'
import { random, randomSet } from '../dsp/sets.ts'
import { combSet } from './combs.ts'

/** A random set without shapers, its sweep standing, one line or lines that do not hear each other. */
function standingSet(seed: number): ParameterSet {
  const set = randomSet(seed)
  const r = random(seed)
  return {
    ...set,
    sampleRate: 48000,
    input: { ...set.input, shaper: null },
    line: { ...set.line, baseMs: r.between(1, 4) },
    sweep: { ...set.sweep, rateHz: 0, depthMs: 0, depthOctaves: 0 },
    voices: { ...set.voices, spreadMs: 0.3 },
    loop: { ...set.loop, feedback: r.between(-0.8, 0.8), crossFeed: 0, shaper: null },
    mix: { ...set.mix, shaper: null, dryDelayMs: r.of([0, 1]) },
  }
}

const FRAMES = 24000
const impulse = Float64Array.from({ length: FRAMES }, (_, i) => (i === 0 ? 1 : 0))

describe('l1 norm of a held sweep', () => {
  it('is the sum of the engine’s impulse response, within its bound on the tail', () => {
    for (let seed = 1; seed <= 30; seed++) {
      const set = standingSet(seed)
      const norm = impulseNorm(freezeAtLargestSlope(set, set.sweep.startPhase, set.sampleRate), 200000)
      renderSet(set, [impulse]).forEach((h, c) => {
        const sum = h.reduce((all, value) => all + Math.abs(value), 0)
        const { sum: run, bound } = norm.outputs[c]!
        expect(run, `seed ${seed}`).toBeGreaterThan(sum * 0.998 - 1e-12)
        expect(bound, `seed ${seed}`).toBeGreaterThan(sum * (1 - 1e-9))
        expect(bound! - run).toBeLessThan(0.002 * run + 1e-9)
      })
      const line = renderSet(lineAsOutput(set), [impulse])[0]!
      const lineSum = line.reduce((all, value) => all + Math.abs(value), 0)
      expect(norm.lines[0]!.bound).toBeGreaterThan(lineSum * (1 - 1e-9))
    }
  })

  it('is reached by an input of ±1 that takes the signs of the impulse response backwards, and by no other', () => {
    for (let seed = 1; seed <= 12; seed++) {
      const set = { ...standingSet(seed), layout: 'mono' as const }
      const h = renderSet(set, [impulse])[0]!
      const { bound } = impulseNorm(freezeAtLargestSlope(set, set.sweep.startPhase, set.sampleRate), 200000).outputs[0]!
      const worst = renderSet(set, [Float64Array.from(h, (_, i) => Math.sign(h[FRAMES - 1 - i]!))])[0]!
      expect(Math.abs(worst[FRAMES - 1]!)).toBeGreaterThan(bound! * 0.995)
      expect(peak(worst)).toBeLessThan(bound! * (1 + 1e-9))
      const r = random(seed)
      const other = renderSet(set, [Float64Array.from(h, () => (r.chance(0.5) ? 1 : -1))])[0]!
      expect(peak(other)).toBeLessThan(bound!)
    }
  })

  it('both inputs of crossed lines count', () => {
    const set: ParameterSet = { ...combSet({ samples: 48, dry: 0, feedback: 0.5 }), layout: 'stereo' }
    const crossed = { ...set, loop: { ...set.loop, crossFeed: 0.4 } }
    // From the left and from the right input to one output: together what one line alone has, 1/(1 − g).
    const { outputs } = impulseNorm(freezeAtLargestSlope(crossed, 0, 48000), 60000)
    expect(outputs[0]!.bound).toBeCloseTo(2, 2)
  })

  it('a loop that does not decay has no bound', () => {
    expect(impulseNorm(freezeAtLargestSlope(combSet({ samples: 20, feedback: 1 }), 0, 48000), 20000).outputs[0]!.bound).toBeNull()
  })
})

describe('bound for any movement', () => {
  it('no input within ±1 passes it, whatever moves, bends and crosses', () => {
    let judged = 0
    for (let seed = 1; seed <= 60; seed++) {
      const set = randomSet(seed)
      const r = random(500 + seed)
      const signs = () => Float64Array.from({ length: 6000 }, () => (r.chance(0.5) ? 1 : -1))
      const input = [signs(), signs()]
      for (const target of [set, lineAsOutput(set)]) {
        const { output } = peakBounds(target)
        if (output === null) continue
        judged++
        for (const y of renderSet(target, input)) expect(peak(y), `seed ${seed}`).toBeLessThanOrEqual(output * (1 + 1e-9))
      }
    }
    expect(judged).toBeGreaterThan(40)
  })

  it('a swept comb with positive gains reaches it: a constant input adds everything', () => {
    const set: ParameterSet = {
      ...combSet({ samples: 200, feedback: 0.8, dry: 0.5, wet: 0.5 }),
      sweep: { ...combSet({ samples: 200 }).sweep, rateHz: 1, depthMs: 2 },
    }
    const y = renderSet(set, [new Float64Array(48000).fill(1)])[0]!
    expect(peak(y)).toBeCloseTo(peakBounds(set).output!, 6)
  })
})
