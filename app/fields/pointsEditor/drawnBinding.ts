// Ties drawn points of the set to their editor: gestures try them, what is refused stops at the last valid place on the way there.
import { getAt, withAt } from '../../../src/set/path.ts'
import type { Point } from '../../../src/set/types.ts'
import { useCurrent } from '../../state/current.ts'
import { commit, committedSet } from '../../state/document.ts'
import { dropGesture, endGesture, tryOut, useDraft } from '../../state/draft.ts'
import { judge, stepName } from '../../state/edit.ts'
import { type Refusal, refusal } from '../binding.ts'
import { whyNot } from '../fieldWords.ts'

export interface DrawnBinding {
  readonly points: readonly Point[]
  readonly attempt: (points: readonly Point[]) => string | null
  readonly settle: () => void
  readonly drop: () => void
  readonly apply: (points: readonly Point[]) => Refusal
}

/** The points at `path`; steps are named for the field at `curvePath` that says the curve is drawn. */
export function useDrawnPoints(path: string, curvePath: string): DrawnBinding {
  const points = useCurrent((s) => getAt(s.set, path)) as readonly Point[]
  return {
    points,
    attempt: (next) => tryPoints(path, curvePath, next),
    settle: endGesture,
    drop: dropGesture,
    apply: (next) => applyPoints(path, curvePath, next),
  }
}

/** Points of a drawn curve as one step, named for the field that draws it. */
export function applyPoints(path: string, curvePath: string, points: readonly Point[]): Refusal {
  endGesture()
  const set = withAt(committedSet(), path, points)
  const proposal = judge(set, path)
  if (proposal.ok) commit(pointsStep(curvePath), set)
  return refusal(curvePath, proposal, set)
}

/** Tries points within a gesture. Where they would make the set invalid they stop on the way; returns why, null when they did not. */
export function tryPoints(path: string, curvePath: string, points: readonly Point[]): string | null {
  const gesture = pointsStep(curvePath)
  if (useDraft.getState().gesture !== gesture) endGesture()
  const from = committedSet()
  const asked = withAt(from, path, points)
  const proposal = judge(asked, path)
  if (proposal.ok) {
    tryOut(gesture, asked)
    return null
  }
  const good = getAt(useDraft.getState().set ?? from, path) as readonly Point[]
  const held = withAt(
    from,
    path,
    lastValid(good, points, (some) => judge(withAt(from, path, some), path).ok),
  )
  tryOut(gesture, held)
  const [problem] = proposal.problems
  return problem ? `Held: ${lower(whyNot(path, problem, asked))}` : null
}

const pointsStep = (curvePath: string) => `${stepName(curvePath)}, points`
const STEPS = 12

/** On the straight way from valid points to invalid ones, as many of each, as far as it is valid. */
function lastValid(good: readonly Point[], bad: readonly Point[], isValid: (points: readonly Point[]) => boolean): readonly Point[] {
  if (good.length !== bad.length) return good
  let valid = good
  let low = 0
  let high = 1
  for (let i = 0; i < STEPS; i++) {
    const part = (low + high) / 2
    const between = good.map(([x, y], k): Point => {
      const [bx, by] = bad[k] as Point
      return [mix(x, bx, part), mix(y, by, part)]
    })
    if (isValid(between)) {
      valid = between
      low = part
    } else high = part
  }
  return valid
}

/** Six digits are more than a hand can place. */
const mix = (a: number, b: number, part: number) => (a === b ? a : Number((a + (b - a) * part).toPrecision(6)))
const lower = (text: string) => text.charAt(0).toLowerCase() + text.slice(1)
