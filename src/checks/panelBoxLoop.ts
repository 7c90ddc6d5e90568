// Where the checks of the loop are worst over all knob positions. Their words and radii go no one way with the knobs, but gains that bound them do.
import { loopBounds } from '../analysis/panelLoopBounds.ts'
import { type PanelFind, searchPanel } from '../analysis/panelSearch.ts'
import { type PanelSpace, setAt } from '../analysis/panelSpace.ts'
import { ringSeconds } from '../analysis/poles.ts'
import { judge, limitOf } from './limits.ts'
import { marginDb } from './loopText.ts'
import { oneFind, type PanelFinding, type PanelJudge, type PanelLook, type Positions } from './panelBoxLook.ts'
import { loopGainCover, loopGainOf, poleCover, unboundedOf } from './panelDirections.ts'
import type { CheckEntry, Figure, Status } from './types.ts'

/** Places where a word is worked out in full: some milliseconds each. */
const MOST_WORDS = 6
const MOST_RINGS = 6

interface LoopFind {
  /** The gain below 1 of which the loop is proven, at its worst. */
  readonly gain: PanelFind
  /** Below 1: no held position has a gain of 1; below 1e9: a shaper holds the level. */
  readonly level: PanelFind
}

const cache = new WeakMap<PanelSpace, LoopFind>()

function* loopFind(space: PanelSpace): Generator<void, LoopFind> {
  const known = cache.get(space)
  if (known) return known
  const { sampleRate } = space
  const sides = [yield* searchPanel(space, loopGainOf('rise', sampleRate)), yield* searchPanel(space, loopGainOf('fall', sampleRate))]
  const exact = oneFind(sides)
  // Where the sweep's chords go no one way, its steepest place still does.
  const cover = exact.by === 'samples' ? yield* searchPanel(space, loopGainCover) : null
  const gain: PanelFind =
    cover === null || cover.by === 'samples' ? exact : { ...exact, by: 'intervals', bound: cover.bound, looks: exact.looks + cover.looks }
  const find = { gain, level: yield* searchPanel(space, unboundedOf) }
  cache.set(space, find)
  return find
}

const same = (a: Positions, b: Positions): boolean => a.every((position, k) => position === b[k])

/** The worst places of a loop, where its word is worked out: the same for stability and margin, which share what that costs. */
function wordPlaces(space: PanelSpace, { gain, level }: LoopFind): Positions[] {
  const places = [...gain.places.slice(0, MOST_WORDS - 2), ...level.places.slice(0, 2)].map(({ positions }) => positions)
  return [...places, space.own].filter((place, i, all) => all.findIndex((other) => same(place, other)) === i).slice(0, MOST_WORDS)
}

const WORDS = ['proven', 'computed', 'frozen', 'bounded', 'diverges']

export const panelStability: PanelJudge = function* (look, entry) {
  const { space } = look
  const find = yield* loopFind(space)
  const { gain, level } = find
  const knobs = [...new Set([...gain.knobs, ...level.knobs])].sort((a, b) => a - b)
  const common = {
    formula: 'γ∞ or γ2 < 1 at the worst corner: proven at all; |g| σ max|F| < 1 there: every held position stable',
    source: 'γ∞, γ2 and |g| σ max|F| grow with |g|, drive, ceiling, damping, speed of the sweep, and fall with the low cut',
    knobs,
  }
  const looks = gain.looks + level.looks
  if (gain.by !== 'samples' && gain.bound < 1) return { ...common, looks, positions: gain.positions, by: gain.by }
  const places = wordPlaces(space, find)
  let worst = { positions: places[0] as Positions, rank: -1 }
  for (const positions of places) {
    const rank = WORDS.indexOf(String(look.figureAt(entry, positions).value))
    if (rank > worst.rank) worst = { positions, rank }
    yield
  }
  const word = level.by === 'samples' ? 'diverges' : level.bound < 1 ? 'frozen' : level.bound < 1e9 ? 'bounded' : 'diverges'
  const found = { ...common, looks: looks + places.length, positions: worst.positions }
  if (worst.rank >= WORDS.indexOf(word)) return { ...found, by: gain.by === 'samples' ? 'intervals' : gain.by }
  return { ...found, by: 'samples', bound: { value: word, status: word === 'diverges' ? 'fails' : 'near' } }
}

export const panelMargin: PanelJudge = function* (look, entry) {
  const { space } = look
  const find = yield* loopFind(space)
  const { gain, level } = find
  const common = {
    formula: '−20 log₁₀ of the largest γ over all positions; where none is certified, down to 0 dB beside',
    source:
      'γ∞, γ2 and |g| σ max|F| each go one way with every parameter; that ‖f‖₁ does with the filters is tried on random sets, not proven',
    knobs: [...new Set([...gain.knobs, ...level.knobs])].sort((a, b) => a - b),
  }
  const limit = limitOf(space.set, 'loop.margin')
  if (gain.by !== 'samples' && gain.bound < 1) {
    const result = { ...common, looks: gain.looks, positions: gain.positions, by: gain.by }
    const bound = marginDb(gain.bound)
    const found = look.figureAt(entry, gain.positions).value
    const met = bound === null || (typeof found === 'number' && found <= bound + 1e-6)
    return met ? result : { ...result, by: 'intervals', bound: { value: bound, status: judge(limit, bound) } }
  }
  const edge = provenEdge(space, gain.positions)
  const places = [...wordPlaces(space, find), ...(edge ? [edge] : [])]
  let worst = { positions: places[0] as Positions, value: Number.POSITIVE_INFINITY }
  for (const positions of places) {
    const { value } = look.figureAt(entry, positions)
    if (typeof value === 'number' && value < worst.value) worst = { positions, value }
    yield
  }
  const looks = gain.looks + level.looks + places.length
  const largest = Math.max(...places.map((positions) => loopBounds(look.inputAt(positions).set, space.sampleRate).gain))
  // Beside where a proof ends the certified gain comes up to 1; past it a held one may be larger.
  const value = level.by === 'corners' && gain.by === 'corners' ? Math.min(0, marginDb(largest) ?? 0) : null
  const status: Status = space.set.loop.shaper !== null || (value !== null && value >= 0 && largest < 1) ? 'near' : 'fails'
  return { ...common, looks, positions: worst.positions, by: 'intervals', bound: { value, status } }
}

/** The last place still proven on the way from one that is to the worst. */
function provenEdge(space: PanelSpace, worst: Positions): Positions | null {
  const proven = (positions: Positions) => loopBounds(setAt(space, positions), space.sampleRate).certified < 1
  const starts = [space.own, ...space.own.flatMap((_, k) => [0, 1].map((end) => worst.map((position, i) => (i === k ? end : position))))]
  const start = starts.find(proven)
  if (start === undefined || proven(worst)) return null
  const at = (t: number) => worst.map((position, k) => (start[k] as number) * (1 - t) + position * t)
  let [inside, outside] = [0, 1]
  for (let i = 0; i < 30; i++) {
    const middle = (inside + outside) / 2
    if (proven(at(middle))) inside = middle
    else outside = middle
  }
  return at(inside)
}

/** Ring and pole radius follow one another: the largest bound of a radius, then the places most likely to reach it. */
function* poleFind(look: PanelLook, entry: CheckEntry, size: (figure: Figure) => number) {
  const cover = yield* searchPanel(look.space, poleCover)
  const places = cover.places.slice(0, MOST_RINGS).map(({ positions }) => positions)
  let worst = { positions: places[0] ?? look.space.own, size: Number.NEGATIVE_INFINITY }
  for (const positions of places) {
    const figure = look.figureAt(entry, positions)
    if (size(figure) > worst.size) worst = { positions, size: size(figure) }
    yield
  }
  const result = {
    knobs: cover.knobs,
    looks: cover.looks + places.length,
    positions: worst.positions,
    formula: POLES,
    source: 'maximum principle; the bound goes one way with every parameter',
  }
  return { cover, worst, result }
}

const POLES = 'no pole lies outside r with |g| σ₀ r^−(D + …) · largest filter gain on that circle = 1'

/** No figure and near: it does not die away; no figure and nothing wrong: no loop. */
const endless = ({ value, status }: Figure): number =>
  typeof value === 'number' ? value : status === 'near' ? Number.POSITIVE_INFINITY : 0

export const panelRing: PanelJudge = function* (look, entry): Generator<void, PanelFinding> {
  const { cover, worst, result } = yield* poleFind(look, entry, endless)
  if (cover.bound <= -1e9) return { ...result, by: cover.by }
  const seconds = ringSeconds(cover.bound, look.space.sampleRate)
  const status = seconds === null ? 'near' : judge(limitOf(look.space.set, 'loop.ring'), seconds)
  if (worst.size === Number.POSITIVE_INFINITY) return { ...result, by: 'corners' }
  return {
    ...result,
    by: cover.by === 'samples' ? 'samples' : 'intervals',
    bound: cover.by === 'samples' ? null : { value: seconds, status },
  }
}

export const panelPoles: PanelJudge = function* (look, entry): Generator<void, PanelFinding> {
  const radius = ({ value }: Figure): number => (Array.isArray(value) ? Number(value[1]) : typeof value === 'number' ? value : 0)
  const { cover, result } = yield* poleFind(look, entry, radius)
  if (cover.bound <= -1e9) return { ...result, by: cover.by }
  // At |g| σ₀ ≥ 1 the bound says nothing: a radius past 1 is then looked for at the corners only.
  if (cover.by === 'samples' || cover.bound > 0) return { ...result, by: 'samples', bound: null }
  return { ...result, by: 'intervals', bound: { value: Math.exp(cover.bound), status: 'holds' } }
}
