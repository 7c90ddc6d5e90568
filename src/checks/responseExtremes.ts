// response.extremes: what the comb does up to 20 kHz at the ends of the sweep and in its middle. Values, not judged.
import { type Extreme, type ExtremeKind, frozenExtremes } from '../analysis/extremes.ts'
import { firstChannel, firstExtremeRange, longestOwnDelay, sweepEnds } from '../analysis/firstExtreme.ts'
import { freeze } from '../analysis/frozen.ts'
import type { ParameterSet } from '../set/types.ts'
import { labelOf, limitOf } from './limits.ts'
import { quantity } from './loopText.ts'
import type { Check, CheckFunction, CheckInput } from './types.ts'

const HIGHEST_HZ = 20000
/** A longer comb repeats itself: its first thousand teeth are looked at. */
const MOST_TEETH = 1000
/** Deeper than this only rounding is left. */
const NULL_DB = -150
/** Ends the search for each extreme: nothing here is written more finely. */
const WITHIN_HZ = 0.02
/** Intents whose sound is notches and peaks: one without any is unusual. */
const COMBING: readonly ParameterSet['intent'][] = ['flanger', 'comb']

export const responseExtremes: CheckFunction = (input): Check => {
  const { set, sampleRate } = input
  const { places, upToHz } = lookedAt(input)
  const found = places.map((place) => place.extremes)
  const notches = figuresOf(found, 'notch')
  const peaks = figuresOf(found, 'peak')
  const first = { notch: firstExtremeRange(set, 'notch', sampleRate), peak: firstExtremeRange(set, 'peak', sampleRate) }
  const none = notches.most === 0 && peaks.most === 0
  return {
    id: 'response.extremes',
    status: none && COMBING.includes(set.intent) ? 'note' : 'holds',
    value: {
      notches,
      peaks,
      firstNotchHz: [first.notch.lowHz, first.notch.highHz],
      firstPeakHz: [first.peak.lowHz, first.peak.highHz],
      upToHz,
    },
    limit: limitOf(set, 'response.extremes').limit,
    unit: 'Hz',
    label: labelOf('response.extremes'),
    text: none
      ? nothingThere(set)
      : `${sentence([firstText('notch', first.notch), firstText('peak', first.peak), depthText(notches, peaks)])}.`,
    working: places.map(({ position, delayMs, extremes }) => ({
      formula: 'd|H|²/dω = 0, of the first channel',
      numbers: `sweep held at ${quantity(position)}, voice 0 at ${quantity(delayMs, 'ms')}`,
      result: `${countText(extremes, 'notch')}, ${countText(extremes, 'peak')} up to ${quantity(upToHz, 'Hz')}`,
      source: 'exact response of the held sweep; teeth 1/τ apart: J. O. Smith, PASP, "Feedforward Comb Filters"',
    })),
  }
}

/** Only the first output is looked at. */
const nothingThere = ({ layout }: ParameterSet): string =>
  layout === 'mono' ? 'There are no notches and no peaks.' : 'There are no notches and no peaks in the first output.'

interface Place {
  readonly position: number
  readonly delayMs: number
  readonly extremes: readonly Extreme[]
}

/** Both ends of the sweep and the position between them, one place where it stands, and how far up they are looked at. */
function lookedAt({ set, sampleRate }: CheckInput): { places: Place[]; upToHz: number } {
  const { longest, shortest } = sweepEnds(set)
  const positions = [...new Set([longest.position, (longest.position + shortest.position) / 2, shortest.position])]
  const held = positions.map((position) => firstChannel(freeze(set, position, sampleRate)))
  const teeth = sampleRate / Math.max(...held.map(longestOwnDelay))
  const upToHz = Math.min(HIGHEST_HZ, sampleRate / 2, MOST_TEETH * teeth)
  const places = held.map((frozen) => ({
    position: frozen.position,
    delayMs: ((frozen.channels[0]?.voices[0]?.delaySamples ?? 0) * 1000) / sampleRate,
    extremes: frozenExtremes(frozen, { maxHz: upToHz, withinHz: WITHIN_HZ }),
  }))
  return { places, upToHz }
}

/** How many, and the level that goes furthest: the deepest notch, the highest peak. A type, so that it is JSON like the value it stands in. */
type Figures = { readonly fewest: number; readonly most: number; readonly furthestDb: number | null }

function figuresOf(places: readonly (readonly Extreme[])[], kind: ExtremeKind): Figures {
  let fewest = Number.POSITIVE_INFINITY
  let most = 0
  let furthestDb: number | null = null
  for (const extremes of places) {
    const own = extremes.filter((extreme) => extreme.kind === kind)
    fewest = Math.min(fewest, own.length)
    most = Math.max(most, own.length)
    for (const { db } of own) furthestDb = kind === 'notch' ? Math.min(furthestDb ?? db, db) : Math.max(furthestDb ?? db, db)
  }
  return { fewest, most, furthestDb }
}

function firstText(kind: ExtremeKind, { lowHz, highHz }: { readonly lowHz: number | null; readonly highHz: number | null }): string | null {
  if (lowHz === null && highHz === null) return null
  if (lowHz === null || highHz === null)
    return `first ${kind} at ${quantity(lowHz ?? highHz ?? 0, 'Hz')} at the ${highHz === null ? 'largest' : 'smallest'} delay and none at the other end`
  const [low, high] = [quantity(lowHz, 'Hz'), quantity(highHz, 'Hz')]
  return low === high ? `first ${kind} at ${low}` : `first ${kind} from ${low} to ${high}`
}

function depthText(notches: Figures, peaks: Figures): string | null {
  const depth = notches.furthestDb
  const deepest = depth === null ? null : depth < NULL_DB ? 'deepest notch a full null' : `deepest notch ${quantity(depth, 'dB')}`
  const highest = peaks.furthestDb === null ? null : `highest peak ${quantity(peaks.furthestDb, 'dB')}`
  return [deepest, highest].filter((text) => text !== null).join(', ') || null
}

function sentence(parts: readonly (string | null)[]): string {
  const text = parts.filter((part) => part !== null).join(', ')
  return text.charAt(0).toUpperCase() + text.slice(1)
}

function countText(extremes: readonly Extreme[], kind: ExtremeKind): string {
  const count = extremes.filter((extreme) => extreme.kind === kind).length
  const plural = kind === 'notch' ? 'notches' : 'peaks'
  return `${count} ${count === 1 ? kind : plural}`
}
