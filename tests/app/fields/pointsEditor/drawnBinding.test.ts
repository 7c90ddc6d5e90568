import { beforeEach, describe, expect, it } from 'vitest'
import { applyPoints, tryPoints } from '../../../../app/fields/pointsEditor/drawnBinding.ts'
import { currentSet } from '../../../../app/state/current.ts'
import { committedSet, restoreDocument, undo, useDocument } from '../../../../app/state/document.ts'
import { dropGesture, endGesture } from '../../../../app/state/draft.ts'
import { defaultSet } from '../../../../src/set/defaults.ts'
import type { ParameterSet, Point } from '../../../../src/set/types.ts'
import { setProblems } from '../../../../src/set/validity.ts'

const POINTS: readonly Point[] = [
  [0, 0],
  [0.5, -0.5],
]

/** 3 ms ± 4 ms: s below −0.75 would read ahead of the write point. */
function drawnSet(): ParameterSet {
  const set = defaultSet()
  return {
    ...set,
    line: { ...set.line, baseMs: 3 },
    voices: { count: 1, phaseSpread: 0, spreadMs: 0 },
    sweep: { ...set.sweep, shape: 'drawn', depthMs: 4, points: POINTS },
  }
}

const tryTo = (s: number) =>
  tryPoints('sweep.points', 'sweep.shape', [
    [0, 0],
    [0.5, s],
  ])
const lowest = () => Math.min(...currentSet().sweep.points.map(([, s]) => s))

beforeEach(() => {
  dropGesture()
  restoreDocument({ slots: { A: drawnSet() }, slot: 'A' })
})

describe('drawing points', () => {
  it('sounds at once and ends as one step of history', () => {
    for (const s of [-0.4, -0.3, 0.2]) expect(tryTo(s)).toBeNull()
    expect(currentSet().sweep.points[1]).toEqual([0.5, 0.2])
    expect(committedSet().sweep.points).toBe(POINTS)
    endGesture()
    expect(committedSet().sweep.points[1]).toEqual([0.5, 0.2])
    expect(useDocument.getState().step.name).toBe('Sweep shape, points')
    undo()
    expect(committedSet().sweep.points).toBe(POINTS)
  })

  it('dropped, leaves what was', () => {
    tryTo(0.9)
    dropGesture()
    expect(currentSet().sweep.points).toBe(POINTS)
  })

  // Oracle: 3 + 4 s ms = one sample at 48 kHz for s = (1/48 − 3)/4.
  it('stops where the delay would pass the write point, says why, and never leaves an invalid set', () => {
    const why = tryTo(-1)
    expect(why).toMatch(/^Held: the delay would come to −1.00\sms; a voice reads no closer than 0.021\sms$/)
    expect(setProblems(currentSet())).toEqual([])
    expect(lowest()).toBeGreaterThanOrEqual((1 / 48 - 3) / 4 - 1e-9)
    expect(lowest()).toBeLessThan(-0.744)
    expect(tryTo(-0.6)).toBeNull()
    expect(lowest()).toBe(-0.6)
  })

  it('of one more point is one step; one that would read too close is refused with the reason, and nothing changes', () => {
    expect(applyPoints('sweep.points', 'sweep.shape', [...POINTS, [0.75, 0.5]])).toBeNull()
    expect(committedSet().sweep.points).toHaveLength(3)
    const refused = applyPoints('sweep.points', 'sweep.shape', [...POINTS, [0.75, -1]])
    expect(refused?.why).toMatch(/reads no closer/)
    expect(committedSet().sweep.points).toHaveLength(3)
  })
})
