// Static combs and first-order filters against scipy.signal.lfilter and freqz (tests/outside/dsp_static.py).
import { describe, expect, it } from 'vitest'
import { highPassHalfPowerHz, lowPassHalfPowerHz } from '../../src/dsp/filters.ts'
import { renderSet } from '../../src/dsp/render.ts'
import { itIsMadeAgain, reference } from '../outside/reference.ts'
import { noise } from './noise.ts'
import { changedSet } from './sets.ts'

interface Reference {
  readonly fs: number
  readonly frames: number
  readonly cases: readonly {
    readonly name: string
    readonly samples: number
    readonly dry: number
    readonly wet: number
    readonly feedback: number
    readonly dryTap: 'input' | 'line'
    readonly dampingHz: number | null
    readonly lowCutHz: number | null
    readonly wetHighCutHz: number | null
    readonly wetLowCutHz: number | null
    readonly at: readonly number[]
    readonly y: readonly number[]
  }[]
  readonly halfPower: readonly { readonly hz: number; readonly lowPass: number | null; readonly highPass: number }[]
}

const { fs, frames, cases, halfPower } = reference<Reference>('dsp_static')

describe('a standing sweep is the comb that scipy.signal.lfilter filters', () => {
  it.each(cases.map((c) => [c.name, c] as const))('%s', (_, c) => {
    const set = changedSet((s) => {
      s.sampleRate = fs
      s.layout = 'mono'
      s.line = { baseMs: (c.samples * 1000) / fs, interpolation: 'linear' }
      s.sweep.rateHz = 0
      s.sweep.depthMs = 0
      s.voices = { count: 1, phaseSpread: 0, spreadMs: 0 }
      Object.assign(s.loop, { feedback: c.feedback, interpolation: 'linear', dampingHz: c.dampingHz, lowCutHz: c.lowCutHz })
      Object.assign(s.mix, { dry: c.dry, wet: c.wet, dryTap: c.dryTap, wetHighCutHz: c.wetHighCutHz, wetLowCutHz: c.wetLowCutHz })
    })
    const y = renderSet(set, [noise(1, frames)])[0]!
    const worst = Math.max(...c.at.map((n, i) => Math.abs(y[n]! - c.y[i]!)))
    // lfilter runs the loop as one long polynomial, which rounds differently; peaks reach about 5.
    expect(worst).toBeLessThan(1e-11)
  })
})

describe('true half-power points are those of the response scipy.signal.freqz gives', () => {
  it.each(halfPower.map((h) => [h.hz, h] as const))('%d Hz', (hz, h) => {
    if (h.lowPass === null) expect(lowPassHalfPowerHz(hz, fs)).toBeNull()
    else expect(lowPassHalfPowerHz(hz, fs)).toBeCloseTo(h.lowPass, 4)
    expect(highPassHalfPowerHz(hz, fs)).toBeCloseTo(h.highPass, 4)
  })
})

itIsMadeAgain('dsp_static')
