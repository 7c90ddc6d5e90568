// Rendered checks cost too much for a search: each is rendered where it is likely to be worst, and where the knobs stand.
import { drivenSine } from '../analysis/harmonics.ts'
import { isListed, listedSpans } from '../analysis/panelKnobs.ts'
import { moveValue } from '../set/panel.ts'
import type { Knob } from '../set/types.ts'
import type { CheckId } from './limits.ts'
import { type Judged, judgedAt } from './panelBoxJudged.ts'
import { type PanelFinding, type PanelLook, type Positions, rankOf } from './panelBoxLook.ts'
import { triedPlaces } from './panelBoxTried.ts'
import { heardShapers } from './shaperFigures.ts'
import { finished } from './steps.ts'
import type { Check, CheckEntry } from './types.ts'

interface Likely {
  readonly places: readonly Positions[]
  readonly formula: string
}

type LikelyPlaces = (look: PanelLook, closed: readonly Judged[], concerned: readonly number[]) => Likely

/** Parameters that cannot change what is rendered. */
const SILENT: Partial<Record<CheckId, RegExp>> = {
  'sweep.steps': /^mix\.(dry|dryTap|dryDelayMs|outputGainDb|invertRight)$|^mix\.shaper\.|^input\.gainDb$/,
}

const findingOf = (closed: readonly Judged[], id: CheckId): Judged | undefined => closed.find(({ worst }) => worst.id === id)
const placeOf = ({ space }: PanelLook, closed: readonly Judged[], id: CheckId): Positions =>
  findingOf(closed, id)?.worst.positions ?? space.own

/** The coarsest first: what leaves more artefacts at the same movement. */
const COARSE: Readonly<Record<string, readonly unknown[]>> = {
  'line.interpolation': ['nearest', 'linear', 'allpass1', 'hermite4', 'lagrange3'],
  'loop.interpolation': ['nearest', 'linear', 'allpass1', 'hermite4', 'lagrange3'],
  'sweep.updateEvery': [64, 32, 16, 8, 4, 2, 1],
  'sweep.between': ['hold', 'ramp'],
}

/** Steps grow with the speed of the delay and with what goes round, and with coarse reads and updates. */
const steps: LikelyPlaces = (look, closed) => {
  const fast = findingOf(closed, 'sweep.detune')
  const round = placeOf(look, closed, 'loop.margin')
  const place = placeOf(look, closed, 'sweep.detune').map((position, k) =>
    fast?.finding.knobs.includes(k) ? position : (round[k] as number),
  )
  const coarse = place.map((position, k) => coarsest(look.space.knobs[k] as Knob, position))
  return {
    places: [coarse, look.space.own],
    formula: 'rendered where sweep.detune, then loop.margin is worst, with the coarsest read and update a knob chooses',
  }
}

function coarsest({ moves }: Knob, position: number): number {
  const choices = moves.filter((move) => isListed(move.parameter) && COARSE[move.parameter] !== undefined)
  const fineness = (at: number) => choices.reduce((sum, move) => sum + (COARSE[move.parameter] ?? []).indexOf(moveValue(move, at)), 0)
  return choices
    .flatMap(listedSpans)
    .map(({ from, to }) => (from === 0 ? 0 : to === 1 ? 1 : (from + to) / 2))
    .reduce((best, at) => (fineness(at) < fineness(best) ? at : best), position)
}

/** DC comes from curves with unequal limits: the most where a sine's mean is largest behind one of them. */
const dc: LikelyPlaces = (look, closed, concerned) => {
  const mean = (place: Positions) =>
    Math.max(
      0,
      ...heardShapers(look.inputAt(place).set).map(({ shaper, amplitude }) =>
        Math.abs(drivenSine(shaper, amplitude, 1).amplitudes[0] as number),
      ),
    )
  const uneven = triedPlaces(look.space.knobs, look.space.own, concerned)
    .map((place) => ({ place, size: mean(place) }))
    .reduce((a, b) => (b.size > a.size ? b : a))
  return {
    places: [uneven.place, placeOf(look, closed, 'level.line'), look.space.own],
    formula: 'rendered where a shaper leaves a sine the largest mean of all places tried, and where level.line is worst',
  }
}

const loudness: LikelyPlaces = (look, closed) => ({
  places: [placeOf(look, closed, 'level.peak')],
  formula: 'rendered where level.peak is worst',
})

const LIKELY: Partial<Record<CheckId, LikelyPlaces>> = { 'sweep.steps': steps, 'level.dc': dc, 'level.loudness': loudness }

/** One entry, or null where no knob moves anything that is rendered: the check beside panel.box says it then. */
export function* panelRendered(look: PanelLook, entry: CheckEntry, closed: readonly Judged[]): Generator<number, Judged | null> {
  const { knobs, own } = look.space
  const concerned = [...knobs.keys()].filter((k) => concerns(knobs[k] as Knob, entry.id))
  if (concerned.length === 0) return null
  const likely = LIKELY[entry.id]?.(look, closed, concerned) ?? { places: [own], formula: 'rendered where the knobs stand' }
  const keys = likely.places.map((place) => place.join())
  const places = likely.places.filter((_, i) => keys.indexOf(keys[i] as string) === i)
  let worst: { positions: Positions; check: Check } | null = null
  for (const [i, positions] of places.entries()) {
    const check = yield* finished(entry.run(look.inputAt(positions)), (part) => (i + part) / places.length)
    if (worst === null || isWorse(check, worst.check)) worst = { positions, check }
  }
  if (worst === null) return null
  const finding: PanelFinding = {
    positions: worst.positions,
    by: 'rendered corners',
    knobs: concerned,
    looks: places.length,
    formula: likely.places.includes(own) ? `${likely.formula}, and where the knobs stand` : likely.formula,
    source: 'too costly for a search: nothing is shown of other positions',
  }
  return judgedAt(look, finding, worst.check)
}

const isWorse = (a: Check, b: Check): boolean =>
  rankOf(a.status) > rankOf(b.status) ||
  (rankOf(a.status) === rankOf(b.status) && typeof a.value === 'number' && (typeof b.value !== 'number' || a.value > b.value))

const concerns = ({ moves }: Knob, id: CheckId): boolean => moves.some(({ parameter }) => !SILENT[id]?.test(parameter))
