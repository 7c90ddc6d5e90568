// Oracle: numpy.roots on the closed-loop polynomial, every loop up to 64 samples.
import { describe, expect, it } from 'vitest'
import type { FrozenLoop } from '../../src/analysis/frozen.ts'
import { frozenRead } from '../../src/analysis/frozenRead.ts'
import { loopLine } from '../../src/analysis/loopLine.ts'
import { largestPoleOfLoop } from '../../src/analysis/poles.ts'
import { largestOfLongLine } from '../../src/analysis/polesOneLine.ts'
import { polesOutside } from '../../src/analysis/polesWinding.ts'
import type { Interpolation } from '../../src/set/types.ts'
import { itIsMadeAgain, reference } from './reference.ts'

type Line = [kind: Interpolation, delay: number, g: number, a: number | null, b: number | null, averaged: boolean, radius: number]
type Pair = [kind: Interpolation, first: number, second: number, g: number, a: number | null, b: number | null, k: number, radius: number]
const made = reference<{ lines: Line[]; pairs: Pair[] }>('loop_poles')

const RATE = 48000
function frozenLoop([kind, delay, gain, lowPass, highPass, averaged]: Line | [...Line]): FrozenLoop {
  return { gain, crossFeed: 0, slope: { slope: 1, averaged }, tone: { lowPass, highPass }, reads: [frozenRead(kind, delay)] }
}

// numpy.roots loses about 1e-13 where a slow filter's pole lies close to another; elsewhere both agree to 1e-15.
const CLUSTERED = 1e-12

describe('largest pole of one line', () => {
  it('is the one numpy.roots finds, in every case', () => {
    const errors = made.lines.map((line) => Math.abs((largestPoleOfLoop(frozenLoop(line), RATE)?.radius ?? 0) - line[6]))
    expect(Math.max(...errors)).toBeLessThan(CLUSTERED)
    expect(errors.filter((error) => error < 2e-14).length).toBeGreaterThan(0.97 * errors.length)
  })

  it('by Newton’s method as long lines are solved, the same', () => {
    const errors = made.lines
      .filter(([, delay]) => delay > 8)
      .map((line) => {
        const loop = frozenLoop(line)
        return Math.abs(Math.exp(largestOfLongLine(loopLine(loop, loop.gain, loop.reads))?.x ?? 0) - line[6])
      })
    expect(Math.max(...errors)).toBeLessThan(CLUSTERED)
  })

  it('counted by winding: none just outside, at least one just inside', () => {
    for (const line of made.lines) {
      const loop = frozenLoop(line)
      const open = loopLine(loop, loop.gain, loop.reads)
      expect(polesOutside(open, Math.log(line[6]) + 1e-9), String(line)).toBe(0)
      expect(polesOutside(open, Math.log(line[6]) - 1e-7), String(line)).toBeGreaterThan(0)
    }
  })
})

describe('largest pole of two crossed lines', () => {
  it('is the one numpy.roots finds', () => {
    // The polynomial holds each filter's pole twice: where it is slow, numpy.roots keeps half the digits.
    const errors = made.pairs.map(([kind, first, second, gain, lowPass, highPass, crossFeed, radius]) => {
      const reads = [frozenRead(kind, first), frozenRead(kind, second)]
      const loop = { gain, crossFeed, slope: { slope: 1, averaged: false }, tone: { lowPass, highPass }, reads }
      return Math.abs((largestPoleOfLoop(loop, RATE)?.radius ?? 0) - radius)
    })
    expect(Math.max(...errors)).toBeLessThan(1e-9)
    expect(errors.filter((error) => error < 1e-12).length).toBeGreaterThan(0.9 * errors.length)
  })
})

itIsMadeAgain('loop_poles', 1e-9)
