// Oracle: the closed form of a clipped sine's mean; the engine where the symmetry is to be shown.
import { describe, expect, it } from 'vitest'
import { asymmetricShapers, DC_TONE_PEAK, type DcFigures, dcSteps } from '../../src/analysis/dc.ts'
import { renderSet } from '../../src/dsp/render.ts'
import { defaultShaper } from '../../src/set/defaults.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { changedSet } from '../dsp/sets.ts'

function measured(set: ParameterSet): DcFigures {
  const steps = dcSteps(set)
  let step = steps.next()
  while (!step.done) step = steps.next()
  return step.value
}

const hard = (positive: number, negative: number) => ({ ...defaultShaper('hardClip'), positive, negative })

describe('DC of asymmetric shapers', () => {
  // Mean of a sine of peak A cut at −c: (A/π)(1 − …): half periods A/π above, and below (1/π)(A(1 − cos θ) + c(π/2 − θ)), θ = asin(c/A).
  it('dry sound through a clipper of unequal limits: the mean of a clipped sine', () => {
    const cut = 0.25
    const theta = Math.asin(cut / DC_TONE_PEAK)
    const mean = DC_TONE_PEAK / Math.PI - (DC_TONE_PEAK * (1 - Math.cos(theta)) + cut * (Math.PI / 2 - theta)) / Math.PI
    const set = changedSet((s) => {
      Object.assign(s.mix, { dry: 1, wet: 0, shaper: hard(1, cut) })
    })
    const { output, line } = measured(set)
    // 48 samples a period sample the clipped sine finely enough for two digits.
    expect(Math.abs(output! / mean - 1)).toBeLessThan(1e-2)
    expect(line).toBe(0)
  })

  it('a shaper at the input leaves its DC in the line, and the loop adds to it: times 1/(1 − g)', () => {
    const still = (feedback: number) =>
      changedSet((s) => {
        s.layout = 'mono'
        s.input.shaper = hard(1, 0.25)
        s.loop.feedback = feedback
        s.sweep.rateHz = 0
        s.sweep.depthMs = 0
      })
    expect(measured(still(0.6)).line! / measured(still(0)).line!).toBeCloseTo(2.5, 3)
  })

  it('a wet low cut takes it from the output, not from the line', () => {
    const set = changedSet((s) => {
      s.input.shaper = hard(1, 0.25)
      s.mix.dry = 0
      s.mix.wetLowCutHz = 40
    })
    const { line, output } = measured(set)
    expect(line).toBeGreaterThan(0.05)
    expect(output! / line!).toBeLessThan(1e-3)
  })

  it('limits that the tone does not reach leave none', () => {
    const set = changedSet((s) => {
      s.mix.shaper = hard(4, 3)
    })
    expect(measured(set).output).toBeLessThan(1e-6)
  })

  it('a loop that grows has no mean', () => {
    const set = changedSet((s) => {
      s.loop.feedback = 1.5
      s.mix.shaper = null
      s.input.shaper = hard(1, 0.5)
    })
    expect(measured(set).line).toBeNull()
  })

  it('without unequal limits the path turns over with its input, sample by sample', () => {
    const set = changedSet((s) => {
      s.input.shaper = hard(0.4, 0.4)
      s.loop.feedback = 0.5
      s.loop.shaper = defaultShaper('tanh')
      s.mix.shaper = { ...defaultShaper('cubic'), antialias: 'adaa1' }
    })
    expect(asymmetricShapers(set)).toEqual([])
    const x = Float64Array.from({ length: 4000 }, (_, i) => Math.sin(i / 9))
    const y = renderSet(set, [x])[0]!
    const turned = renderSet(set, [x.map((value) => -value)])[0]!
    expect(Math.max(...y.map((value, i) => Math.abs(value + turned[i]!)))).toBeLessThan(1e-12)
  })
})
