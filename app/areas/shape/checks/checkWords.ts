// A check's figure and limit as they stand in its row.
import { quantity } from '../../../../src/checks/loopText.ts'
import type { Check, CheckValue } from '../../../../src/checks/types.ts'
import { showIn } from '../../../fields/quantity.ts'
import { duration, hertz, milliseconds, radius } from '../../../plots/words.ts'

type Group = { readonly [key: string]: CheckValue }

/** Figures that need more than number and unit: by check id. */
const FIGURES: Readonly<Record<string, (value: CheckValue) => string | null>> = {
  'loop.poles': (value) => (typeof value === 'number' ? radius(value) : null),
  // As its sentence says it: loudness is measured no closer.
  'level.loudness': (value) => (typeof value === 'number' ? quantity(Number(value.toFixed(1)), 'LU') : null),
  'loop.ring': (value) => (typeof value === 'number' ? duration(value) : null),
  'response.extremes': (value) => span(part(value, 'firstNotchHz'), hertz, 'Hz'),
  // As its field writes it: 1.0, not 1.
  'sweep.detune': (value) => (typeof value === 'number' ? showIn(value, 'cents').replace('\u00a0', ' ') : null),
  'sweep.range': (value) => span([part(value, 'smallestMs'), part(value, 'largestMs')], (ms) => milliseconds(ms).replace(' ms', ''), 'ms'),
  'shaper.harmonics': strongestHarmonic,
}

/** "4.2 dB", "proven", "1.00 – 6.00 ms"; "none" where there is no figure. */
export function checkFigure({ id, status, value, unit }: Pick<Check, 'id' | 'status' | 'value' | 'unit'>): string {
  const own = FIGURES[id]?.(value)
  if (own) return own
  if (typeof value === 'number') return quantity(value, unit)
  if (typeof value === 'string') return value
  // A ring without a figure that does not hold is one that never ends.
  return id === 'loop.ring' && status !== 'holds' ? 'endless' : 'none'
}

const WHAT: Readonly<Record<string, string>> = {
  'response.extremes': 'first notch over the sweep',
  'shaper.harmonics': 'strongest, of −6 dBFS',
}

/** What panel.box says in its row: the figure of the worst check it found, and that check's name; `checks` are the others listed. */
export function panelWords({ worst = [] }: Check, checks: readonly Check[]): { readonly figure: string; readonly what: string } {
  const [first] = worst
  if (!first) return { figure: 'none', what: 'no knobs' }
  if (first.status === 'holds' || first.status === 'note') return { figure: 'all hold', what: 'at every position' }
  const own = checks.find(({ id }) => id === first.id)
  return { figure: checkFigure({ ...first, unit: own?.unit ?? '' }), what: (own?.label ?? first.id).toLowerCase() }
}

/** "limit 3 s", "own limit 4 s" where it is the set's; "at least computed" where words are ranked; what the figure is, or nothing, where none is judged. */
export function checkLimit({ id, limit, unit }: Pick<Check, 'id' | 'limit' | 'unit'>, own: number | null = null): string {
  if (limit === null) return WHAT[id] ?? ''
  if (typeof limit === 'string') return `at least ${limit}`
  // A limit that a check has no use for stays where the set has it.
  return `${own === limit ? 'own limit' : 'limit'} ${unit === 'ms' && limit < 0.1 ? milliseconds(limit) : quantity(limit, unit)}`
}

const part = (value: CheckValue, key: string): CheckValue =>
  value !== null && typeof value === 'object' && !Array.isArray(value) ? ((value as Group)[key] ?? null) : null

/** Two figures as their span, one where they read the same. */
function span(value: CheckValue, write: (figure: number) => string, unit: string): string | null {
  if (!Array.isArray(value)) return null
  const ends = value.filter((end) => typeof end === 'number').map(write)
  return ends.length === 0 ? null : `${[...new Set(ends)].join(' – ')} ${unit}`
}

/** "−13.9 dB": of all shapers and harmonics. */
function strongestHarmonic(value: CheckValue): string | null {
  if (value === null || typeof value !== 'object') return null
  const levels = Object.values(value).flatMap((shaper) => part(shaper as CheckValue, 'harmonicsDb') as readonly (number | null)[])
  const strongest = levels.filter((level) => level !== null).reduce((most, level) => Math.max(most, level), Number.NEGATIVE_INFINITY)
  return strongest > Number.NEGATIVE_INFINITY ? quantity(Number(strongest.toFixed(1)), 'dB') : null
}
