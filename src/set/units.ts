// Quantities as people type them and as the page prints them.
import { bad, good, type Result } from './result.ts'
import { dimensionOf, kindOfUnit, type UnitWorth } from './units/dimensions.ts'
import { beatSeconds, noteHz } from './units/music.ts'
import { decimalValue, readNumber } from './units/number.ts'

export interface QuantityContext {
  /** Beats a minute for a fraction of a whole note without its own "@". */
  readonly tempoBpm?: number
  /** Hz: lets a time be typed in samples. */
  readonly sampleRate?: number
}

/**
 * The value of a typed quantity in `unit` ("ms", "s", "Hz", "dB", "°", "octaves", "cents", "B", "samples", "frames" or "" for plain numbers).
 * Accepts "2.5ms", "2,5 ms", "400 µs", "−6 dB", "6.5 kHz", "1.2k", "50 %", "12 000", for a plain number also "1/4"; a number alone is in `unit`. Where a time or frequency is wanted
 * also "1/8 @ 96" (part of a whole note at beats a minute; as a frequency its rate) and "A3", "Bb2+12ct" (a note's frequency; as a time its period).
 * Refuses an unknown or mismatching unit, saying what is wanted. Ranges are the parameter table's. Throws RangeError for a `unit` no quantity has.
 */
export function parseQuantity(text: string, unit: string, context: QuantityContext = {}): Result<number> {
  const typed = text.trim()
  const { wanted } = dimensionOf(unit)
  if (typed === '') return refuse(text, 'is empty', `type ${wanted}`)
  return musical(typed, unit, context) ?? plain(typed, unit, context)
}

function refuse(text: string, reason: string, hint: string): Result<number> {
  const shown = text.length > 40 ? `${text.slice(0, 39)}…` : text
  return bad({ path: '', message: `"${shown}" ${reason}`, value: text, hint })
}

/** Notes and beats; null when the text is neither, so that it may be a number. */
function musical(typed: string, unit: string, { tempoBpm }: QuantityContext): Result<number> | null {
  const perSecond = unit === 'ms' ? 1000 : unit === 's' ? 1 : null
  const hz = noteHz(typed)
  const beat = unit === '' && !typed.includes('@') ? null : beatSeconds(typed, tempoBpm)
  if (hz === null && beat === null) return null
  if (perSecond === null && unit !== 'Hz')
    return refuse(
      typed,
      `is a ${hz === null ? 'part of a whole note' : 'note'}, where ${dimensionOf(unit).wanted} is wanted`,
      `type ${dimensionOf(unit).wanted}`,
    )
  if (beat && 'reason' in beat) return refuse(typed, beat.reason, beat.hint)
  const seconds = beat ? beat.seconds : 1 / (hz as number)
  if (perSecond !== null) return good(seconds * perSecond)
  return good(hz ?? 1 / seconds)
}

function plain(typed: string, unit: string, context: QuantityContext): Result<number> {
  const { wanted, units, unclear } = dimensionOf(unit)
  const reading = readNumber(typed)
  const example = `type ${wanted}${musicalHint(unit)}`
  if (reading === null) return refuse(typed, 'is no number', example)
  if ('reason' in reading) return refuse(typed, reading.reason, reading.hint)
  const { decimal, rest } = reading
  const under = unit === '' ? /^\/\s*(\d+)$/.exec(rest) : null
  if (under) return finite(typed, decimalValue(decimal) / Number(under[1]))
  const worth = unitWorth(rest, unit, units, context)
  if (worth) return finite(typed, worth.convert ? worth.convert(decimalValue(decimal)) : decimalValue(decimal, worth.shift, worth.factor))
  if (unclear && Object.hasOwn(unclear, rest)) return refuse(typed, `has the unclear unit "${rest}"`, unclear[rest] as string)
  const kind = kindOfUnit(rest)
  if (kind) return refuse(typed, `is ${kind}, where ${wanted} is wanted`, example)
  return refuse(typed, `has the unknown unit "${rest}"`, `known here are ${unitNames(units).join(', ')}`)
}

function unitWorth(
  word: string,
  unit: string,
  units: Readonly<Record<string, UnitWorth>>,
  { sampleRate }: QuantityContext,
): UnitWorth | undefined {
  if (word === '') return {}
  if (Object.hasOwn(units, word)) return units[word]
  const perSecond = unit === 'ms' ? 1000 : unit === 's' ? 1 : null
  if (perSecond !== null && sampleRate !== undefined && /^(samples?|smp)$/.test(word))
    return { convert: (n) => (n * perSecond) / sampleRate }
  return undefined
}

/** Each unit once, by the spelling its table names first. */
function unitNames(units: Readonly<Record<string, UnitWorth>>): string[] {
  const byWorth = new Map<UnitWorth, string>()
  for (const [word, worth] of Object.entries(units)) if (!byWorth.has(worth)) byWorth.set(worth, word)
  return [...byWorth.values()]
}

const finite = (typed: string, value: number): Result<number> =>
  Number.isFinite(value) ? good(value) : refuse(typed, 'is no finite number', 'type a smaller number')

const musicalHint = (unit: string) =>
  unit === 'ms' || unit === 's' || unit === 'Hz' ? ', a note such as A3, or a beat such as 1/8 @ 96' : ''

export interface Formatted {
  /** With a real minus sign (U+2212) and thin spaces (U+2009) between thousands. */
  readonly number: string
  /** As given; "" for plain numbers. */
  readonly unit: string
}

const DECIMALS: Readonly<Record<string, number>> = { dB: 2, '°': 2, cents: 1 }

/**
 * A value for people: four significant digits, never fewer than the whole part has, at most two decimals for dB and degrees and one for cents,
 * no trailing zeros. What it prints, parseQuantity reads. Throws RangeError when the value is not finite.
 */
export function formatQuantity(value: number, unit: string): Formatted {
  if (!Number.isFinite(value)) throw new RangeError(`a quantity must be finite, got ${value}`)
  const size = Math.abs(value)
  const digits = size === 0 ? 0 : Math.floor(Math.log10(size)) + 1
  const decimals = Math.min(Math.max(0, 4 - digits), DECIMALS[unit] ?? 100)
  const text = size !== 0 && (size < 1e-6 || size >= 1e15) ? exponential(size) : grouped(trimmed(size.toFixed(decimals)))
  return { number: value < 0 && /[1-9]/.test(text) ? `−${text}` : text, unit }
}

const trimmed = (text: string) => (text.includes('.') ? text.replace(/\.?0+$/, '') : text)
const exponential = (size: number) =>
  size
    .toExponential(3)
    .replace(/\.?0+e/, 'e')
    .replace('+', '')
    .replace('-', '−')

function grouped(text: string): string {
  const [whole = '', fraction] = text.split('.')
  const spaced = whole.length > 3 ? whole.replace(/\B(?=(\d{3})+$)/g, '\u2009') : whole
  return fraction === undefined ? spaced : `${spaced}.${fraction}`
}
