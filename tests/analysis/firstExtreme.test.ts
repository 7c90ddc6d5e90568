// Oracles: FACTS 1 closed forms (first notch 1/(2τ) or 1/τ, first peak 1/τ or 1/(2τ)); the solver is checked by what it was solved from:
// the set it proposes must have its first extremes where they were asked for.
import { describe, expect, it } from 'vitest'
import { firstExtreme, firstExtremeRange, sweepEnds } from '../../src/analysis/firstExtreme.ts'
import { solveFirstExtremes } from '../../src/analysis/solveFirstExtremes.ts'
import type { ParameterSet, SweepShape } from '../../src/set/types.ts'
import { changedSet } from '../dsp/sets.ts'
import { combSet } from './combs.ts'

type Change = Parameters<typeof changedSet>[0]

/** One voice, 1.4 ± 1.1 ms, linear, changed as said. */
const swept = (change: Change = () => {}) =>
  changedSet((s) => {
    s.voices.count = 1
    s.line.baseMs = 1.4
    s.line.interpolation = 'linear'
    s.sweep.depthMs = 1.1
    change(s)
  })

describe('firstExtreme', () => {
  it.each([
    [{ dry: 1, wet: 1 }, 500, 1000],
    [{ dry: 1, wet: -1 }, 1000, 500],
    [{ dry: 1, wet: 0, tap: 'line', feedback: 0.6 } as const, 500, 1000],
    [{ dry: 1, wet: 0, tap: 'line', feedback: -0.6 } as const, 1000, 500],
  ])('%o at 1 ms: first notch %i Hz, first peak %i Hz', (gains, notch, peak) => {
    const set = combSet({ samples: 48, ...gains })
    expect(firstExtreme(set, 'notch', 0)?.frequencyHz).toBeCloseTo(notch, 3)
    expect(firstExtreme(set, 'peak', 0)?.frequencyHz).toBeCloseTo(peak, 3)
  })

  it('none where there is nothing to comb', () => {
    expect(firstExtreme(combSet({ samples: 48, dry: 0 }), 'notch', 0)).toBeNull()
    expect(firstExtreme(combSet({ samples: 0 }), 'peak', 0)).toBeNull()
  })

  it('the hump a low cut leaves is passed over', () => {
    const set = combSet({ samples: 120, feedback: 0.8 })
    const cut = { ...set, loop: { ...set.loop, lowCutHz: 80 } }
    expect(firstExtreme(cut, 'peak', 0)?.frequencyHz).toBeGreaterThan(300)
  })

  it('a dry delay is what the teeth are measured from', () => {
    const set = combSet({ samples: 96 })
    const behind = { ...set, mix: { ...set.mix, dryDelayMs: 1 } }
    expect(firstExtreme(behind, 'notch', 0)?.frequencyHz).toBeCloseTo(500, 3)
  })
})

describe('the ends of the sweep', () => {
  const SHAPES: readonly SweepShape[] = ['sine', 'triangle', 'square', 'rampUp', 'rampDown', 'drift']
  it.each(SHAPES)('%s reaches s = ±1 there', (shape) => {
    for (const edgeMs of [0, 30]) {
      const { longest, shortest } = sweepEnds(
        swept((s) => {
          s.sweep.shape = shape
          s.sweep.edgeMs = edgeMs
        }),
      )
      expect(longest.s).toBeCloseTo(1, 9)
      expect(shortest.s).toBeCloseTo(-1, 9)
    }
  })

  it('a drawn sweep has its own, a standing one a single place', () => {
    const drawn = swept((s) => {
      s.sweep.shape = 'drawn'
      s.sweep.points = [
        [0.1, 0.5],
        [0.4, -0.25],
        [0.7, 0.1],
      ]
    })
    expect(sweepEnds(drawn)).toEqual({ longest: { position: 0.1, s: 0.5 }, shortest: { position: 0.4, s: -0.25 } })
    const stands = swept((s) => {
      s.sweep.rateHz = 0
      s.sweep.startPhase = 0.3
    })
    expect(sweepEnds(stands).longest).toEqual(sweepEnds(stands).shortest)
  })

  it('1.4 ± 1.1 ms: first notch from 200 Hz to 1/(0.6 ms)', () => {
    const { lowHz, highHz } = firstExtremeRange(
      swept((s) => {
        s.line.interpolation = 'lagrange3'
      }),
      'notch',
    )
    expect(lowHz).toBeCloseTo(200, 3)
    expect(Math.abs(highHz! - 1000 / 0.6)).toBeLessThan(1)
  })
})

const SOLVABLE: readonly (readonly [string, Change])[] = [
  ['dry and wet alike', () => {}],
  [
    'wet inverted',
    (s) => {
      s.mix.wet = -0.7
    },
  ],
  [
    'feedback 0.7',
    (s) => {
      s.loop.feedback = 0.7
    },
  ],
  [
    'feedback −0.7',
    (s) => {
      s.loop.feedback = -0.7
    },
  ],
  [
    'dry from the line',
    (s) => {
      s.mix.dryTap = 'line'
      s.loop.feedback = 0.6
    },
  ],
  ['damped and cut loop', (s) => void Object.assign(s.loop, { feedback: 0.8, dampingHz: 2000, lowCutHz: 80 })],
  [
    'ratio law',
    (s) => {
      s.sweep.law = 'ratio'
    },
  ],
  [
    'cubic reads',
    (s) => {
      s.line.interpolation = 'lagrange3'
    },
  ],
  [
    'all-pass reads',
    (s) => {
      s.line.interpolation = 'allpass1'
    },
  ],
  ['wet filters', (s) => void Object.assign(s.mix, { wetLowCutHz: 30, wetHighCutHz: 9000 })],
  [
    'a ramp',
    (s) => {
      s.sweep.shape = 'rampUp'
    },
  ],
  ['cross-feed', (s) => void Object.assign(s.loop, { feedback: 0.3, crossFeed: 0.2 })],
  ['three voices together', (s) => void Object.assign(s.voices, { count: 3, phaseSpread: 0, spreadMs: 0.2 })],
  [
    'the dry sound a little late',
    (s) => {
      s.mix.dryDelayMs = 0.2
    },
  ],
  [
    'a drawn sweep',
    (s) => {
      s.sweep.shape = 'drawn'
      s.sweep.points = [
        [0.2, 0.6],
        [0.7, -0.9],
      ]
    },
  ],
]

const withSolution = (set: ParameterSet, { baseMs, depth }: { readonly baseMs: number; readonly depth: number }): ParameterSet => ({
  ...set,
  line: { ...set.line, baseMs },
  sweep: { ...set.sweep, [set.sweep.law === 'time' ? 'depthMs' : 'depthOctaves']: depth },
})

describe('solveFirstExtremes', () => {
  describe.each(['notch', 'peak'] as const)('first %s', (kind) => {
    it.each(SOLVABLE)('%s: from 210 to 1930 Hz, within 0.05 Hz', (_, change) => {
      const set = swept(change)
      const solved = solveFirstExtremes(set, kind, 210, 1930)
      if (!solved.ok) throw new Error(solved.problems.map((p) => p.message).join('; '))
      const { lowHz, highHz } = firstExtremeRange(withSolution(set, solved.value), kind)
      expect(Math.abs(lowHz! - 210)).toBeLessThan(0.05)
      expect(Math.abs(highHz! - 1930)).toBeLessThan(0.05)
    })
  })

  it('dry and wet alike: base and depth of the closed form 1/(2 f)', () => {
    const solved = solveFirstExtremes(swept(), 'notch', 200, 2000)
    expect(solved.ok && solved.value.baseMs).toBeCloseTo((2.5 + 0.25) / 2, 6)
    expect(solved.ok && solved.value.depth).toBeCloseTo((2.5 - 0.25) / 2, 6)
  })

  it('a static comb: the base alone, depth as it was', () => {
    const set = combSet({ samples: 48 })
    const solved = solveFirstExtremes(set, 'peak', 441, 441)
    expect(solved.ok && solved.value.depth).toBe(0)
    expect(solved.ok && firstExtremeRange(withSolution(set, solved.value), 'peak').lowHz).toBeCloseTo(441, 3)
  })

  it('through zero: each end stays on its side of the dry delay', () => {
    const set = swept((s) => {
      s.line.baseMs = 3
      s.sweep.depthMs = 2.5
      s.mix.dryDelayMs = 3
    })
    const solved = solveFirstExtremes(set, 'notch', 250, 300)
    if (!solved.ok) throw new Error(solved.problems[0]!.message)
    expect(solved.value.baseMs + solved.value.depth).toBeCloseTo(3 + 1000 / 500, 2)
    expect(solved.value.baseMs - solved.value.depth).toBeCloseTo(3 - 1000 / 600, 2)
  })

  const reason = (set: ParameterSet, kind: 'notch' | 'peak', low: number, high: number) => {
    const solved = solveFirstExtremes(set, kind, low, high)
    expect(solved.ok).toBe(false)
    return solved.ok ? '' : solved.problems.map((p) => p.message).join('; ')
  }

  it('says why not', () => {
    expect(
      reason(
        swept((s) => {
          s.mix.dry = 0
        }),
        'notch',
        200,
        2000,
      ),
    ).toMatch(/no first notch/)
    expect(reason(swept(), 'notch', 2000, 200)).toMatch(/lowest where the delay is largest/)
    expect(reason(swept(), 'notch', 200, 24000)).toMatch(/below 24000 Hz, got 24000/)
    expect(reason(swept(), 'notch', Number.NaN, 2000)).toMatch(/above 0/)
    expect(reason(combSet({ samples: 48 }), 'peak', 400, 500)).toMatch(/stands still/)
    // 0.4 Hz needs 1250 ms at the far end.
    expect(reason(swept(), 'notch', 0.4, 2000)).toMatch(/line\.baseMs 625\.125 ms, outside 0 to 500 ms/)
    // Whole samples cannot put a notch there: 24 samples give 1000 Hz, 23 give 1043.5.
    expect(
      reason(
        swept((s) => {
          s.line.interpolation = 'nearest'
        }),
        'notch',
        200,
        1020,
      ),
    ).toMatch(/closest found/)
  })

  it('names the reach where the interpolator is the limit', () => {
    const set = swept((s) => {
      s.line.interpolation = 'lagrange3'
      s.loop.interpolation = 'hermite4'
      s.loop.feedback = 0.2
      s.loop.delay = 'moving'
    })
    // The loop's cubic needs 2 samples: 24 kHz / 2 is its highest first peak of negative sign.
    expect(reason(set, 'notch', 200, 20000)).toMatch(/2 samples.*at most [\d.]+ Hz/)
  })
})
