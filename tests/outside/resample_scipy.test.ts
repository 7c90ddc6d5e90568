// Oracle: scipy.signal.resample_poly with a 130 dB filter. Both pass 0 to 0.9 of the slower Nyquist frequency, so on noise below it they must agree.
import { describe, expect, it } from 'vitest'
import { resampleTo } from '../../src/signal/resample.ts'
import { itIsMadeAgain, reference } from './reference.ts'

const made = reference<{ cases: { from: number; to: number; input: number[]; length: number; at: number; output: number[] }[] }>(
  'resample_scipy',
)

describe.each(made.cases)('$from Hz to $to Hz', ({ from, to, input, length, at, output }) => {
  const y = resampleTo([Float64Array.from(input)], from, to)[0] as Float64Array

  it('as many samples', () => {
    expect(y.length).toBe(length)
  })

  it('the same samples, 100 dB down and better', () => {
    const level = Math.sqrt(output.reduce((sum, v) => sum + v * v, 0) / output.length)
    expect(level).toBeGreaterThan(0.2)
    output.forEach((v, i) => {
      expect(Math.abs((y[at + i] as number) - v)).toBeLessThan(1e-5 * level)
    })
  })
})

itIsMadeAgain('resample_scipy', 1e-8)
