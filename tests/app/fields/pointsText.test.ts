import { describe, expect, it } from 'vitest'
import { pointsToText, readPoints } from '../../../app/fields/pointsText.ts'
import { SHAPER_POINTS, SWEEP_POINTS } from '../../../src/set/drawnPoints.ts'

describe('drawn points as text', () => {
  it('come back as they were', () => {
    const points = [
      [0, -1],
      [0.25, 0.5],
      [0.75, 1],
    ] as const
    expect(readPoints(pointsToText(points), SWEEP_POINTS)).toEqual({ ok: true, points })
  })

  it.each(['0 0\n0.5 1', '0;0\n0.5;1', '0\t0\n\n0.5\t1\n'])('%j is read whatever stands between the two numbers', (text) => {
    expect(readPoints(text, SWEEP_POINTS)).toEqual({
      ok: true,
      points: [
        [0, 0],
        [0.5, 1],
      ],
    })
  })

  it.each([
    ['0, 0\nhalf, 1', 'line 2'],
    ['0, 0\n0.5', 'line 2'],
    ['0, 0', '2 to 64'],
    ['0, 0\n0.5, 3', 's from -1 to 1'],
    ['0.5, 0\n0.25, 1', 'larger phase'],
    ['0, 0\n1, 1', 'below 1'],
  ])('%j is refused and says %j', (text, what) => {
    const read = readPoints(text, SWEEP_POINTS)
    expect(read.ok).toBe(false)
    expect(read.ok ? '' : read.why).toContain(what)
  })

  it('a shaper starts at the origin', () => {
    expect(readPoints('0.1, 0\n1, 1', SHAPER_POINTS).ok).toBe(false)
  })
})
