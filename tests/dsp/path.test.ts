// The signal path against an independent model in Python, written from the design alone (tests/outside/dsp_path.py).
import { describe, expect, it } from 'vitest'
import { renderSet } from '../../src/dsp/render.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { itIsMadeAgain, reference } from '../outside/reference.ts'
import { noise } from './noise.ts'

interface Case {
  readonly set: ParameterSet
  readonly frames: number
  readonly seeds: readonly number[]
  readonly at: readonly number[]
  readonly out: readonly (readonly number[])[]
  readonly peak: number
  readonly sum: readonly number[]
}

const { cases } = reference<{ cases: readonly Case[] }>('dsp_path')

/** Of the case's peak: double precision leaves 1e-13; the model integrates anti-aliased shapers by quadrature, which leaves less than 1e-10. */
const TOLERANCE = 1e-9

describe('renderSet equals the independent model', () => {
  it.each(cases.map((c, i) => [i, c] as const))('case %i', (_, { set, frames, seeds, at, out, peak, sum }) => {
    const y = renderSet(
      set,
      seeds.map((seed) => noise(seed, frames)),
    )
    expect(y.length).toBe(out.length)
    out.forEach((channel, c) => {
      const worst = Math.max(...channel.map((v, i) => Math.abs(v - (y[c]![at[i]!] as number))))
      expect(worst).toBeLessThan(TOLERANCE * peak)
      expect(Math.abs(y[c]!.reduce((a, b) => a + b, 0) - sum[c]!)).toBeLessThan(TOLERANCE * peak * frames)
    })
  })
})

it('the cases cover every shape, law, layout, interpolator, curve, anti-aliasing and update mode', () => {
  const seen = (of: (set: ParameterSet) => unknown) => new Set(cases.map(({ set }) => of(set)))
  expect(seen((s) => s.sweep.shape).size).toBe(7)
  expect(seen((s) => s.sweep.law).size).toBe(2)
  expect(seen((s) => s.layout).size).toBe(3)
  expect(seen((s) => s.line.interpolation).size).toBe(5)
  expect(seen((s) => (s.loop.feedback === 0 ? undefined : s.loop.interpolation)).size).toBe(6)
  expect(seen((s) => `${s.sweep.updateEvery} ${s.sweep.between}`).size).toBe(14)
  expect(seen((s) => `${s.loop.delay} ${s.mix.dryTap}`).size).toBe(4)
  for (const where of ['input', 'loop', 'mix'] as const) {
    expect(seen((s) => s[where].shaper?.curve).size, where).toBe(8)
    expect(seen((s) => s[where].shaper?.antialias).size, where).toBe(3)
  }
})

itIsMadeAgain('dsp_path')
