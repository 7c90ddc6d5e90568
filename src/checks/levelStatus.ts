// Figures and status of level.peak and level.line, without words.
import { type LevelFigure, type LevelFigures, levelFigures } from '../analysis/levels.ts'
import { judge, type Limit, limitOf } from './limits.ts'
import type { CheckInput, Figure, Status } from './types.ts'

/** Which of both levels, and how it is called. */
export type LevelPlace = 'peak' | 'line'
export const CALLED = { peak: { id: 'level.peak', where: 'at the output' }, line: { id: 'level.line', where: 'in the line' } } as const

const cache = new WeakMap<CheckInput, LevelFigures>()

/** The levels of an input's set, computed once a run. */
export function levelsOf(input: CheckInput): LevelFigures {
  const known = cache.get(input) ?? levelFigures(input.set, input.sampleRate)
  cache.set(input, known)
  return known
}

/** Status and value of level.peak or level.line, without words or mends. */
export function levelGainFigure(input: CheckInput, place: LevelPlace): Figure {
  const level = levelsOf(input)[place]
  return { status: levelStatus(limitOf(input.set, CALLED[place].id), level), value: level.db }
}

/** No finite gain fails; a worst sample past the limit is near, though the worst gain holds. */
export function levelStatus(limit: Limit, { db, sampleDb }: Pick<LevelFigure, 'db' | 'sampleDb'>): Status {
  if (db === null) return 'fails'
  const status = judge(limit, db)
  const over = sampleDb === null || (limit.limit !== null && sampleDb > limit.limit)
  return status === 'holds' && over ? 'near' : status
}
