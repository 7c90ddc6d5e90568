// Oracles: closed forms for like, opposite and unrelated outputs; pink noise rendered.
import { describe, expect, it } from 'vitest'
import { monoLoss } from '../../src/analysis/mono.ts'
import { renderSet } from '../../src/dsp/render.ts'
import { phrase } from '../../src/material/phrases.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { changedSet } from '../dsp/sets.ts'

const power = (x: Float64Array) => x.reduce((sum, value) => sum + value * value, 0)

/** The loss of rendered pink noise, the line filled first. */
function renderedLoss(set: ParameterSet): number {
  const noise = phrase('noise', set.sampleRate)
  const [a, b] = renderSet(set, [noise]).map((y) => y.subarray(set.sampleRate)) as [Float64Array, Float64Array]
  const sum = a.map((value, i) => (value + b[i]!) / 2)
  return 10 * Math.log10((power(a) + power(b)) / 2 / power(sum))
}

describe('loss of the mono sum', () => {
  it('like outputs lose nothing, opposite ones everything', () => {
    const like = changedSet((s) => {
      s.sweep.stereoPhase = 0
    })
    expect(Math.abs(monoLoss(like).lossDb!)).toBeLessThan(1e-9)
    const opposite = { ...like, mix: { ...like.mix, dry: 0, invertRight: true } }
    expect(monoLoss(opposite).lossDb).toBe(400)
    expect(monoLoss({ ...like, mix: { ...like.mix, dry: 0, wet: 0 } }).lossDb).toBeNull()
  })

  // Dry and opposite wet of one size: the sum is the dry half alone, each output has both: 3.01 dB where they are unrelated.
  it('opposite wet beside as much dry loses 3 dB: the wet part', () => {
    const set = changedSet((s) => {
      s.sweep.stereoPhase = 0
      s.mix.invertRight = true
      s.line.baseMs = 100
      s.voices.count = 1
    })
    expect(monoLoss(set).lossDb).toBeCloseTo(3.01, 1)
  })

  it('is that of rendered pink noise within 0.5 dB, the sweep held where most is lost', () => {
    const sets = [
      changedSet(() => {}),
      changedSet((s) => {
        s.sweep.stereoPhase = 180
        s.voices.count = 1
        s.mix.dry = 0
      }),
      changedSet((s) => {
        s.layout = 'monoToStereo'
        s.mix.invertRight = true
        s.mix.wetLowCutHz = 300
      }),
    ]
    for (const set of sets) {
      const { lossDb, position } = monoLoss(set)
      const held = { ...set, sweep: { ...set.sweep, rateHz: 0, startPhase: position } }
      expect(Math.abs(renderedLoss(held) - lossDb!)).toBeLessThan(0.5)
    }
  })

  // sin φ = sin(φ + p) at φ = (180° − p)/2: both channels read one delay there, whatever the phase between them.
  it('opposite outputs whose sweeps only meet lose everything there, at any stereo phase', () => {
    for (const stereoPhase of [30, 77, 90, 100, 170]) {
      const set = changedSet((s) => {
        s.layout = 'monoToStereo'
        s.sweep.stereoPhase = stereoPhase
        s.voices.count = 1
        s.mix.dry = 0
        s.mix.invertRight = true
      })
      const { lossDb, position, averageDb } = monoLoss(set)
      expect(lossDb).toBe(400)
      expect(((position * 360) % 180) - (180 - stereoPhase) / 2).toBeCloseTo(0, 6)
      expect(averageDb).toBeLessThan(400)
    }
  })

  it('one output has no sum', () => {
    expect(() => monoLoss({ ...changedSet(() => {}), layout: 'mono' })).toThrow(RangeError)
  })
})
