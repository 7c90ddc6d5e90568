import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { added, corners, halfWay, moved, quantumOf, removed, straightAt, xLimits } from '../../../../app/fields/pointsEditor/pointMoves.ts'
import { pointProblems, SHAPER_POINTS, SWEEP_POINTS, TAPER_POINTS } from '../../../../src/set/drawnPoints.ts'
import { drawn } from '../../../../src/set/sweepShape.ts'
import type { Point } from '../../../../src/set/types.ts'

const QUANTA: Point = [1e-4, 1e-4]
const THREE: readonly Point[] = [
  [0, -1],
  [0.25, 1],
  [0.5, 0],
]

/** Valid points of a closed curve, 2 to 12. */
const sweeps = fc
  .uniqueArray(fc.integer({ min: 0, max: 999 }), { minLength: 2, maxLength: 12 })
  .chain((phases) =>
    fc.tuple(
      ...phases.sort((a, b) => a - b).map((phase) => fc.integer({ min: -1000, max: 1000 }).map((s): Point => [phase / 1000, s / 1000])),
    ),
  )

describe('a point that is moved', () => {
  it('goes exactly where it is put while there is room: nothing snaps', () => {
    expect(moved(THREE, 1, [0.3127, 0.0403], SWEEP_POINTS, QUANTA)[1]).toEqual([0.3127, 0.0403])
  })

  it('stops at its neighbours and at the ends of the rule', () => {
    expect(moved(THREE, 1, [0.7, 3], SWEEP_POINTS, QUANTA)[1]).toEqual([0.4999, 1])
    expect(moved(THREE, 2, [1.4, -3], SWEEP_POINTS, QUANTA)[2]).toEqual([0.9999, -1])
    expect(moved(THREE, 0, [-0.2, 0], SWEEP_POINTS, QUANTA)[0]).toEqual([0, 0])
    const taper: readonly Point[] = [
      [0, 0],
      [1, 1],
    ]
    expect(moved(taper, 1, [1.2, 1.2], TAPER_POINTS, QUANTA)).toBe(taper)
  })

  it('stays at 0, 0 where the rule fixes the first', () => {
    const curve: readonly Point[] = [
      [0, 0],
      [1, 1],
    ]
    expect(moved(curve, 0, [0.2, 0.2], SHAPER_POINTS, QUANTA)).toBe(curve)
    expect(removed(curve, 0, SHAPER_POINTS)).toMatchObject({ ok: false })
  })

  it('never makes a list the set would refuse, wherever it is put', () => {
    fc.assert(
      fc.property(
        sweeps,
        fc.nat(),
        fc.double({ min: -2, max: 2, noNaN: true }),
        fc.double({ min: -2, max: 2, noNaN: true }),
        (points, k, x, y) => {
          const next = moved(points, k % points.length, [x, y], SWEEP_POINTS, QUANTA)
          expect(pointProblems(next, SWEEP_POINTS, 'points', true)).toEqual([])
        },
      ),
    )
  })

  it('keeps its x where typed neighbours leave no room', () => {
    const tight: readonly Point[] = [
      [0, 0],
      [0.00005, 0.5],
      [0.0001, 0],
    ]
    expect(moved(tight, 1, [0.5, 0.25], SWEEP_POINTS, QUANTA)[1]).toEqual([0.00005, 0.25])
  })
})

describe('a point that is added', () => {
  it('stands in the row where its x is', () => {
    const change = added(THREE, [0.4, 0.1], SWEEP_POINTS, QUANTA)
    expect(change).toMatchObject({ ok: true, index: 2 })
    expect(change.ok && change.points.map(([x]) => x)).toEqual([0, 0.25, 0.4, 0.5])
  })

  it('is refused on another, past the end, and past 64', () => {
    expect(added(THREE, [0.25, 0.5], SWEEP_POINTS, QUANTA).ok).toBe(false)
    expect(added(THREE, [1, 0], SWEEP_POINTS, QUANTA).ok).toBe(false)
    const full = Array.from({ length: 64 }, (_, i): Point => [i / 64, 0])
    expect(added(full, [0.001, 0], SWEEP_POINTS, QUANTA)).toMatchObject({ ok: false, why: expect.stringContaining('64') })
  })

  it('comes half-way to the next one, around the end of a closed curve, and always finds room in open ones', () => {
    expect(halfWay(THREE, 0, SWEEP_POINTS, true)).toEqual([0.125, 0])
    expect(halfWay(THREE, 2, SWEEP_POINTS, true)).toEqual([0.75, -0.5])
    expect(
      halfWay(
        [
          [0.3, 1],
          [0.9, 0],
        ],
        1,
        SWEEP_POINTS,
        true,
      )?.[0],
    ).toBeCloseTo(0.1, 12)
    const taper: readonly Point[] = [
      [0, 0],
      [1, 1],
    ]
    expect(halfWay(taper, 1, TAPER_POINTS, false)).toEqual([0.5, 0.5])
  })
})

describe('a point that is removed', () => {
  it('leaves the others, and never fewer than 2', () => {
    expect(removed(THREE, 1, SWEEP_POINTS)).toEqual({ ok: true, index: 1, points: [THREE[0], THREE[2]] })
    expect(removed(THREE.slice(0, 2), 1, SWEEP_POINTS)).toMatchObject({ ok: false })
    expect(removed(THREE, 2, SWEEP_POINTS)).toMatchObject({ index: 1 })
  })
})

describe('the line drawn through the points', () => {
  // Oracle: the signal path's own closed straight lines (src/set/sweepShape.ts).
  it('is the sweep that sounds', () => {
    fc.assert(
      fc.property(sweeps, fc.double({ min: 0, max: 0.999999, noNaN: true }), (points, x) => {
        expect(straightAt(points, x, SWEEP_POINTS, true)).toBeCloseTo(drawn(points, x), 9)
      }),
    )
  })

  it('is level past the ends of an open curve, and reaches both ends of what is shown', () => {
    const points: readonly Point[] = [
      [0.2, 0.1],
      [0.6, 0.9],
    ]
    expect(straightAt(points, 0, TAPER_POINTS, false)).toBe(0.1)
    expect(straightAt(points, 1, TAPER_POINTS, false)).toBe(0.9)
    expect(straightAt(points, 0.4, TAPER_POINTS, false)).toBeCloseTo(0.5, 12)
    expect(corners(points, [0, 1], TAPER_POINTS, false).map(([x]) => x)).toEqual([0, 0.2, 0.6, 1])
  })
})

describe('the rounding of points', () => {
  it('is far below a pixel of what is shown', () => {
    expect(quantumOf([0, 1])).toBeCloseTo(1e-4, 15)
    expect(quantumOf([-1, 1])).toBeCloseTo(1e-4, 15)
    expect(quantumOf([0, 500])).toBeCloseTo(1e-2, 15)
    expect(xLimits(THREE, 1, SWEEP_POINTS, 1e-4)).toEqual([1e-4, 0.4999])
  })
})
