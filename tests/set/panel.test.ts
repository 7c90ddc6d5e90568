import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { defaultSet } from '../../src/set/defaults.ts'
import { knobDisagreements, knobForField, movePosition, moveValue, steppedPosition, turnKnob } from '../../src/set/panel.ts'
import { isMovable } from '../../src/set/panelProblems.ts'
import { PARAMETERS } from '../../src/set/parameters.ts'
import { getAt, withAt } from '../../src/set/path.ts'
import type { Move } from '../../src/set/types.ts'
import { setProblems } from '../../src/set/validity.ts'
import { anySet } from './anySet.ts'

const move = (
  parameter: string,
  min: Move['min'],
  max: Move['max'],
  taper: Move['taper'] = 'linear',
  points: Move['points'] = [],
): Move => ({
  parameter,
  min,
  max,
  taper,
  points,
})

describe('what a knob makes of its parameter', () => {
  it.each<[string, Move, readonly (readonly [number, unknown])[]]>([
    [
      'linear',
      move('mix.wet', 0, 1),
      [
        [0, 0],
        [0.25, 0.25],
        [1, 1],
      ],
    ],
    [
      'linear, reversed',
      move('mix.wet', 1, -1),
      [
        [0, 1],
        [0.25, 0.5],
        [1, -1],
      ],
    ],
    [
      'log',
      move('sweep.rateHz', 0.1, 10, 'log'),
      [
        [0, 0.1],
        [0.5, 1],
        [0.75, 10 ** 0.5],
        [1, 10],
      ],
    ],
    [
      'log below zero',
      move('mix.wet', -0.1, -1, 'log'),
      [
        [0, -0.1],
        [0.5, -(0.1 ** 0.5)],
        [1, -1],
      ],
    ],
    [
      'drawn',
      move('mix.wet', 0, 2, 'drawn', [
        [0, 0],
        [0.5, 0.75],
        [1, 1],
      ]),
      [
        [0, 0],
        [0.25, 0.75],
        [0.5, 1.5],
        [0.75, 1.75],
        [1, 2],
      ],
    ],
    [
      'drawn, ends held',
      move('mix.wet', 0, 1, 'drawn', [
        [0.25, 0.5],
        [0.5, 1],
      ]),
      [
        [0, 0.5],
        [0.25, 0.5],
        [0.5, 1],
        [1, 1],
      ],
    ],
    [
      'whole numbers',
      move('voices.count', 1, 4),
      [
        [0, 1],
        [0.1, 1],
        [0.2, 2],
        [0.5, 3],
        [1, 4],
      ],
    ],
    [
      'listed values',
      move('sweep.updateEvery', 1, 8),
      [
        [0, 1],
        [0.24, 1],
        [0.25, 2],
        [0.5, 4],
        [0.75, 8],
        [1, 8],
      ],
    ],
    [
      'choices',
      move('sweep.shape', 'sine', 'square'),
      [
        [0, 'sine'],
        [0.34, 'triangle'],
        [0.5, 'triangle'],
        [0.67, 'square'],
        [1, 'square'],
      ],
    ],
    [
      'choices, reversed',
      move('sweep.shape', 'square', 'sine'),
      [
        [0, 'square'],
        [0.5, 'triangle'],
        [1, 'sine'],
      ],
    ],
    [
      'a switch',
      move('mix.invertRight', false, true),
      [
        [0, false],
        [0.49, false],
        [0.5, true],
        [1, true],
      ],
    ],
  ])('%s', (_, one, places) => {
    for (const [position, value] of places) {
      const found = moveValue(one, position)
      if (typeof value === 'number') expect(found).toBeCloseTo(value, 12)
      else expect(found).toBe(value)
    }
  })

  it('the ends are exact', () => {
    const log = move('sweep.rateHz', 0.07, 3.3, 'log')
    expect([moveValue(log, 0), moveValue(log, 1)]).toEqual([0.07, 3.3])
  })

  it('throws for a position off the scale', () => {
    for (const position of [-0.1, 1.1, Number.NaN]) expect(() => moveValue(move('mix.wet', 0, 1), position)).toThrow(RangeError)
  })

  it('the way back gives a position that gives the value, for every move of any set', () => {
    let tried = 0
    fc.assert(
      fc.property(anySet, fc.double({ min: 0, max: 1, noNaN: true }), (set, position) => {
        for (const knob of set.panel)
          for (const one of knob.moves) {
            const value = moveValue(one, position)
            const back = movePosition(one, value)
            tried++
            // A drawn taper may be flat or its value rounded out of reach: then any of its positions, or none, will do.
            if (back === null) expect(one.taper).toBe('drawn')
            else if (typeof value === 'number') {
              const span = Math.abs((one.max as number) - (one.min as number))
              expect(Math.abs((moveValue(one, back) as number) - value)).toBeLessThanOrEqual(1e-9 * (span + Math.abs(value)) + 1e-300)
            } else expect(moveValue(one, back)).toBe(value)
          }
      }),
      { numRuns: 150 },
    )
    expect(tried).toBeGreaterThan(100)
  })

  it('no position gives a value outside', () => {
    expect(movePosition(move('mix.wet', 0, 1), 1.5)).toBeNull()
    expect(movePosition(move('sweep.shape', 'sine', 'square'), 'drift')).toBeNull()
    expect(movePosition(move('loop.dampingHz', 100, 1000), null)).toBeNull()
  })

  it('steps lie evenly and hold both ends', () => {
    expect([0, 0.1, 0.3, 0.8, 1].map((p) => steppedPosition({ steps: 3 }, p))).toEqual([0, 0, 0.5, 1, 1])
    expect(steppedPosition({ steps: 0 }, 0.123)).toBe(0.123)
  })
})

describe('turning knobs', () => {
  const set = {
    ...defaultSet(),
    panel: [{ knob: 'A', position: 0.5, steps: 0, smoothMs: 30, moves: [move('mix.wet', 0, 1), move('mix.dry', 1, 0)] }],
  }

  it('moves everything the knob moves and keeps the position', () => {
    const turned = turnKnob(set, 0, 0.25)
    expect([turned.mix.wet, turned.mix.dry, turned.panel[0]?.position]).toEqual([0.25, 0.75, 0.25])
    expect(set.mix.wet).toBe(0.7071)
    expect(knobDisagreements(turned)).toEqual([])
  })

  it('says where knobs and values disagree', () => {
    expect(knobDisagreements(set)).toEqual([
      { knob: 'A', parameter: 'mix.wet', stored: 0.7071, atKnob: 0.5 },
      { knob: 'A', parameter: 'mix.dry', stored: 0.7071, atKnob: 0.5 },
    ])
  })

  it('throws for a knob that is not there', () => {
    expect(() => turnKnob(set, 1, 0)).toThrow(RangeError)
  })
})

describe('a field put on a knob', () => {
  const fields = PARAMETERS.filter((p) => isMovable(p) && !p.path.includes('.shaper.')).map((p) => p.path)

  it.each(fields)('%s: from where it stands, without changing it', (path) => {
    const set = withAt(
      withAt(withAt(withAt(defaultSet(), 'loop.dampingHz', 3000), 'loop.lowCutHz', 50), 'mix.wetLowCutHz', 90),
      'mix.wetHighCutHz',
      9000,
    )
    const knob = knobForField(set, path)
    if (!knob) throw new Error('no knob')
    const withKnob = { ...set, panel: [knob] }
    expect(setProblems(withKnob)).toEqual([])
    expect(knobDisagreements(withKnob)).toEqual([])
  })

  it('widens its scale to a value outside the usual part', () => {
    const knob = knobForField(withAt(defaultSet(), 'mix.wet', 3), 'mix.wet')
    expect(knob).toMatchObject({ position: 1, moves: [{ min: -1, max: 3 }] })
  })

  it('is refused for what is off, not there, or fixed when the unit is built', () => {
    for (const path of ['loop.dampingHz', 'loop.shaper.drive', 'sampleRate', 'name', 'target.part'])
      expect(knobForField(defaultSet(), path)).toBeNull()
    expect(getAt(defaultSet(), 'loop.dampingHz')).toBeNull()
  })
})
