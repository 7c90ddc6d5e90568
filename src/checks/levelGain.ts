// What level.peak and level.line share: the worst gain against the headroom, the worst sample beside it.
import { type LevelFigure, type LevelFigures, levelFigures } from '../analysis/levels.ts'
import { levelMends } from './levelMends.ts'
import { levelWorking } from './levelWorking.ts'
import { judge, type Limit, labelOf, limitOf } from './limits.ts'
import { quantity } from './loopText.ts'
import type { Check, CheckInput, Figure, Status } from './types.ts'

/** Which of both levels, and how it is called. */
export type LevelPlace = 'peak' | 'line'
const CALLED = { peak: { id: 'level.peak', where: 'at the output' }, line: { id: 'level.line', where: 'in the line' } } as const

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

export function levelGain(input: CheckInput, place: LevelPlace): Check {
  const { id, where } = CALLED[place]
  const figures = levelsOf(input)
  const limit = limitOf(input.set, id)
  const level = figures[place]
  const status = levelStatus(limit, level)
  const mend = status === 'holds' ? [] : levelMends(input, place, limit)
  return {
    id,
    status,
    value: level.db,
    limit: limit.limit,
    unit: 'dB',
    label: labelOf(id),
    text: `${levelText(level, limit, where)}${firstText(figures, place, limit)}.`,
    working: levelWorking(input, figures, place, limit),
    ...(mend.length > 0 && { mend }),
  }
}

const SILENT_DB = -399

function levelText({ db, sampleDb, worst, heldByShaper }: LevelFigure, { limit }: Limit, where: string): string {
  if (db === null) return `No finite gain ${where}: the loop diverges`
  if (db < SILENT_DB) return `Nothing arrives ${where}`
  const top = limit ?? 0
  const against = db > top ? `${quantity(db - top, 'dB')} over the headroom` : `${quantity(top - db, 'dB')} below the headroom`
  const sample = sampleDb !== null && sampleDb > top && db <= top ? `, but a single sample can reach ${quantity(sampleDb, 'dB')}` : ''
  if (heldByShaper) return `A shaper holds the level ${where} at ${quantity(db, 'dB')}, ${against} of ${quantity(top, 'dB')}`
  const at = worst === null ? '' : ` at ${quantity(worst.frequencyHz, 'Hz')}`
  return `The worst gain ${where} is ${quantity(db, 'dB')}${at}, ${against} of ${quantity(top, 'dB')}${sample}`
}

/** Which of output and line runs over first, where one does. */
function firstText({ peak, line }: LevelFigures, place: LevelPlace, { limit }: Limit): string {
  if (place !== 'line' || limit === null || peak.db === null || line.db === null) return ''
  if (Math.max(peak.db, line.db) <= limit || Math.abs(peak.db - line.db) < 0.05) return ''
  const [first, second] = line.db > peak.db ? ['line', 'output'] : ['output', 'line']
  return `; the ${first} overflows ${quantity(Math.abs(line.db - peak.db), 'dB')} before the ${second}`
}
