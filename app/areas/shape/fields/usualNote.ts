// What is usual for the set's intent, and that a value is not: with the range, where it is from and how sure that is. Never a failure.
import { parameter } from '../../../../src/set/parameters.ts'
import { getAt } from '../../../../src/set/path.ts'
import type { ParameterSet } from '../../../../src/set/types.ts'
import { isUnusual, MARK_WORDS, type UsualRange, usualRange } from '../../../../src/set/usualRanges.ts'

/** "usual for a flanger 0 to 10 ms"; null where nothing is known. */
export function usualWords(path: string, set: ParameterSet): string | null {
  const range = usualRange(set.intent, path)
  return range && `usual for a ${set.intent} ${span(path, range)}`
}

/** "· unusual for a flanger: 0 to 10 ms (Dattorro 1997, Table 7; read in the paper)"; null for a usual value and where nothing is known. */
export function unusualNote(path: string, set: ParameterSet): string | null {
  const range = usualRange(set.intent, path)
  const value = getAt(set, path)
  if (!range || typeof value !== 'number' || !applies(path, set) || !isUnusual(range, value)) return null
  return `· unusual: ${set.intent} ${span(path, range)} (${range.cite}; ${MARK_WORDS[range.mark]})`
}

/** A field without effect is neither usual nor unusual. */
const applies = (path: string, { layout, sweep }: ParameterSet) =>
  path === 'sweep.stereoPhase' ? layout !== 'mono' : path !== 'sweep.depthMs' || (sweep.law === 'time' && sweep.rateHz > 0)

function span(path: string, { low, high }: UsualRange): string {
  const row = parameter(path)
  const unit = 'unit' in row ? row.unit : ''
  const end = unit === '' ? shortNumber(high) : `${shortNumber(high)}${unit === '°' ? '' : ' '}${unit}`
  return low === high ? end : `${shortNumber(low)} to ${end}`
}

export const shortNumber = (value: number): string => String(Number(value.toFixed(2))).replace('-', '−')
