// What level.peak and level.line share: the worst gain against the headroom, the worst sample beside it.
import type { LevelFigure, LevelFigures } from '../analysis/levels.ts'
import { levelMends } from './levelMends.ts'
import { CALLED, type LevelPlace, levelStatus, levelsOf } from './levelStatus.ts'
import { levelWorking } from './levelWorking.ts'
import { type Limit, labelOf, limitOf } from './limits.ts'
import { quantity } from './loopText.ts'
import type { Check, CheckInput } from './types.ts'

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
