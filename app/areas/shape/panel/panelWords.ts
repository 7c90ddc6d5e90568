// The panel in words: what a knob moves and gives, why an edit of it cannot stand.
import { MAX_KNOBS, MAX_MOVES, moveOf } from '../../../../src/set/panelEdit.ts'
import { isParameterPath, parameter } from '../../../../src/set/parameters.ts'
import { getAt } from '../../../../src/set/path.ts'
import type { Problem } from '../../../../src/set/result.ts'
import type { Knob, Move, ParameterSet } from '../../../../src/set/types.ts'
import { rangeText } from '../../../../src/set/valueProblem.ts'
import { sentence, whyNot, withMinus } from '../../../fields/fieldWords.ts'
import { showQuantity, speakQuantity } from '../../../fields/quantity.ts'
import { stepName } from '../../../state/edit.ts'
import { knobName } from '../../../state/panel.ts'

/** "Rate", "Loop shaper, drive". */
export const parameterLabel = (path: string): string => (isParameterPath(path) ? stepName(path) : path)

/** "0.40 Hz", "sine", "on", "off". */
export function valueWords(path: string, value: unknown): string {
  const row = parameter(path)
  if (value === null || value === undefined) return 'off'
  if (typeof value === 'boolean') return value ? 'on' : 'off'
  if (typeof value === 'number' && 'unit' in row) return showQuantity(value, row)
  return (row.kind === 'choice' && row.options.find((option) => option.value === value)?.label) || String(value)
}

/** The same as it is spoken: "0.4 hertz". */
export function spokenValue(path: string, value: unknown): string {
  const row = parameter(path)
  return typeof value === 'number' && 'unit' in row ? speakQuantity(value, row) : valueWords(path, value)
}

/** What a slider says of a knob: "rate 0.4 hertz, depth 2 milliseconds". */
export function spokenKnob(set: ParameterSet, { moves }: Knob): string {
  return moves.map(({ parameter: path }) => `${parameterLabel(path).toLowerCase()} ${spokenValue(path, getAt(set, path))}`).join(', ')
}

/** "Rate 0.05 Hz to 3.00 Hz". */
export const moveSpan = ({ parameter: path, min, max }: Move): string =>
  `${parameterLabel(path)} ${valueWords(path, min)} to ${valueWords(path, max)}`

/** Where a knob stands: "at its left end", "at 0.62". */
export function placeWords(position: number): string {
  if (position === 0) return 'at its left end'
  if (position === 1) return 'at its right end'
  return `at ${position.toFixed(2)}`
}

/** "Regrowth at its right end, 1.05; Tone at 0.50, 6000 Hz", for the knobs there are and the values `at` knows. */
export const placesWords = (set: ParameterSet, positions: readonly number[], at: Readonly<Record<string, unknown>>): string =>
  set.panel
    .flatMap((knob, index) => {
      const position = positions[index]
      if (position === undefined) return []
      const values = knob.moves.map(({ parameter: path }) => path).filter((path) => at[path] !== undefined)
      const given = values.map((path) => valueWords(path, at[path])).join(', ')
      return [`${knobName(knob, index)} ${placeWords(position)}${given === '' ? '' : `, ${given}`}`]
    })
    .join('; ')

/** Why an edit of the panel cannot stand, in a sentence; `set` is what it would have become. */
export function whyNotPanel(problem: Problem, set: ParameterSet | null): string {
  const [, k, m, part] = /^panel\[(\d+)\](?:\.moves\[(\d+)\])?\.?(.*)$/.exec(problem.path) ?? []
  const move = set?.panel[Number(k)]?.moves[Number(m)]
  if (k === undefined || !move) return k === undefined ? whyNot('line.baseMs', problem, set) : plain(problem)
  const label = parameterLabel(move.parameter)
  if (part === 'taper')
    return typeof move.min === 'number'
      ? 'A logarithmic taper goes by ratios: both ends must lie above zero, or both below'
      : `${label} has no ratios to go by: its taper is even or drawn`
  if (part === 'min' || part === 'max') return `${label} takes ${withMinus(rangeText(parameter(move.parameter)).replace(', or null', ''))}`
  if (part === 'parameter') {
    const other = set.panel.find((knob, index) => index !== Number(k) && knob.moves.some((one) => one.parameter === move.parameter))
    if (other) return `${label} is on knob ${other.knob} already`
    if (problem.message.includes('is already moved')) return `This knob moves ${label.toLowerCase()} already`
    if (problem.message.includes('no shaper')) return `${label}: there is no shaper to move`
  }
  return plain(problem)
}

const plain = ({ path, message, range }: Problem): string => {
  const name = path.replace(/^.*\./, '')
  const rows: Readonly<Record<string, string>> = { knob: 'A name', position: 'The position', steps: 'Steps', smoothMs: 'Smoothing' }
  return rows[name] && range !== undefined ? `${rows[name]} takes ${withMinus(range)}` : withMinus(sentence(message))
}

/** Why the panel takes no more; null while it does. */
export const fullPanel = ({ panel }: ParameterSet): string | null =>
  panel.length >= MAX_KNOBS ? `A panel has at most ${MAX_KNOBS} knobs` : null
export const fullKnob = ({ moves }: Knob): string | null =>
  moves.length >= MAX_MOVES ? `A knob moves at most ${MAX_MOVES} parameters` : null

/** The knob a field is on, by name; null when it is on none. */
export function knobNameOf(set: ParameterSet, path: string): string | null {
  const found = moveOf(set, path)
  return found && knobName(found.knob, found.index)
}
