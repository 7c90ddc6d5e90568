// Where the levels are worst over all knob positions: the bound of the gain goes one way with every parameter, the gain itself follows it closely.
import { searchPanel } from '../analysis/panelSearch.ts'
import { judge, limitOf } from './limits.ts'
import type { PanelJudge } from './panelBoxLook.ts'
import { rankOf } from './panelBoxLook.ts'
import { gainCover } from './panelDirections.ts'

/** Places of the largest bound where the level itself is worked out. */
const MOST_LEVELS = 4

/** Found this close to the bound, dB, no place can be worse by more than is written. */
const MET_DB = 0.03

const levels = (id: 'level.peak' | 'level.line'): PanelJudge =>
  function* ({ space, figureAt }, entry) {
    const cover = yield* searchPanel(space, gainCover(id === 'level.peak' ? 'peak' : 'line'))
    const places = cover.places.slice(0, MOST_LEVELS)
    let worst = { positions: cover.positions, rank: -1, db: Number.NEGATIVE_INFINITY }
    for (const { positions } of [cover, ...places]) {
      const { status, value } = figureAt(entry, positions)
      const db = typeof value === 'number' ? value : status === 'fails' ? Number.POSITIVE_INFINITY : Number.NEGATIVE_INFINITY
      if (rankOf(status) > worst.rank || (rankOf(status) === worst.rank && db > worst.db)) worst = { positions, rank: rankOf(status), db }
      if (db >= cover.bound - MET_DB) break
      yield
    }
    const common = {
      positions: worst.positions,
      knobs: cover.knobs,
      looks: cover.looks + places.length,
      formula:
        'gain ≤ input gain · (|dry| + |wet| √V |F_wet| …/(1 − |g F|)) · output gain, or a shaper’s ceiling; worst samples at the places tried',
      source: '|A| ≤ 1 of every held read: each factor goes one way with its parameter',
    }
    if (cover.by === 'samples') return { ...common, by: 'samples', bound: null }
    if (worst.db >= cover.bound - 1e-6) return { ...common, by: cover.by }
    const value = cover.bound === Number.POSITIVE_INFINITY ? null : cover.bound
    return { ...common, by: 'intervals', bound: { value, status: value === null ? 'fails' : judge(limitOf(space.set, id), value) } }
  }

export const panelPeak = levels('level.peak')
export const panelLine = levels('level.line')
