// What the audio thread accepts of a flat set, slot by slot, and what kind of change each slot makes. Nothing here throws or allocates
// after loading: a bad slot keeps its old value and is counted.
import { FLAT_LENGTH, FLAT_PARAMETERS, flatIndex, flatPointsOffset } from '../set/flat.ts'
import { MAX_POINTS, type Parameter } from '../set/parameters.ts'

/** Kinds of change, one bit each: none is heard · gains and filters ramp · the sweep's speed · delays · what only a cross-fade can change. */
export const GAIN = 1
export const RATE = 2
export const DELAY = 4
export const STRUCTURE = 8

const SHAPER_PATHS = ['input.shaper', 'loop.shaper', 'mix.shaper'] as const
const STRUCTURE_PATHS = new Set([
  'layout',
  'line.interpolation',
  'loop.interpolation',
  'voices.count',
  'mix.dryTap',
  'mix.dryDelayMs',
  ...SHAPER_PATHS.flatMap((path) => [`${path}.curve`, `${path}.antialias`]),
])

function kindOf({ path }: Parameter): number {
  if (STRUCTURE_PATHS.has(path)) return STRUCTURE
  if (path === 'sampleRate' || path.includes('.shaper.table')) return 0
  if (path === 'sweep.rateHz') return RATE
  if (/^(line|sweep|voices)\./.test(path) || path === 'loop.delay') return DELAY
  return GAIN
}

const kinds = Uint8Array.from(FLAT_PARAMETERS, kindOf)
const least = Float64Array.from(FLAT_PARAMETERS, (p) => (p.kind === 'number' || p.kind === 'integer' ? p.min : 0))
const most = Float64Array.from(FLAT_PARAMETERS, (p) => {
  if (p.kind === 'choice') return p.options.length - 1
  return p.kind === 'number' || p.kind === 'integer' ? p.max : 1
})
const whole = Uint8Array.from(FLAT_PARAMETERS, (p) => (p.kind === 'number' ? 0 : 1))
/** Whether NaN, or −1 for a choice, says "none". */
const nullable = Uint8Array.from(FLAT_PARAMETERS, (p) => ((p.kind === 'number' || p.kind === 'choice') && p.nullable ? 1 : 0))
const choice = Uint8Array.from(FLAT_PARAMETERS, (p) => (p.kind === 'choice' ? 1 : 0))
/** For each slot that belongs to a shaper the slot of that shaper's curve, else −1: without a curve the rest says nothing. */
const owner = Int16Array.from(FLAT_PARAMETERS, ({ path }) => {
  const shaper = SHAPER_PATHS.find((start) => path.startsWith(`${start}.`))
  return shaper && !path.endsWith('.curve') ? flatIndex(`${shaper}.curve`) : -1
})

const UPDATE_EVERY = flatIndex('sweep.updateEvery')

function slotGood(i: number, value: number): boolean {
  if (nullable[i] && (choice[i] ? value === -1 : Number.isNaN(value))) return true
  if (!(value >= least[i]! && value <= most[i]!)) return false
  if (!whole[i]) return true
  // The update interval is the one integer of which only powers of two count.
  return Math.floor(value) === value && (i !== UPDATE_EVERY || (value & (value - 1)) === 0)
}

/** Names of a choice in the order of its indices. */
export function choicesOf(path: string): readonly string[] {
  const p = FLAT_PARAMETERS[flatIndex(path)]!
  return p.kind === 'choice' ? p.options.map((o) => o.value) : []
}

interface Curve {
  readonly offset: number
  /** Slot of the choice that draws it, and the index it then has. */
  readonly slot: number
  readonly drawn: number
  readonly kind: number
  readonly xMax: number
  readonly yMax: number
  readonly fromOrigin: boolean
}

const CURVES: readonly Curve[] = [
  {
    offset: flatPointsOffset('sweep'),
    slot: flatIndex('sweep.shape'),
    drawn: choicesOf('sweep.shape').indexOf('drawn'),
    kind: DELAY,
    xMax: 1 - Number.EPSILON / 2,
    yMax: 1,
    fromOrigin: false,
  },
  ...SHAPER_PATHS.map((path) => ({
    offset: flatPointsOffset(path),
    slot: flatIndex(`${path}.curve`),
    drawn: choicesOf(`${path}.curve`).indexOf('drawn'),
    kind: STRUCTURE,
    xMax: 1000,
    yMax: 100,
    fromOrigin: true,
  })),
]

/** What a flat set changed: a sum of kinds, and how many of its values were refused. */
export interface Acceptance {
  changed: number
  refused: number
}

/** Takes the acceptable values of `flat` into `accepted`. Never throws; a wrong length refuses everything. */
export function acceptFlat(accepted: Float64Array, flat: Float64Array, result: Acceptance): void {
  result.changed = 0
  result.refused = 0
  if (flat.length !== FLAT_LENGTH) {
    result.refused = FLAT_LENGTH
    return
  }
  for (let c = 0; c < CURVES.length; c++) acceptPoints(CURVES[c]!, accepted, flat, result)
  for (let i = 0; i < FLAT_PARAMETERS.length; i++) {
    const value = flat[i]!
    const old = accepted[i]!
    if (value === old || (Number.isNaN(value) && Number.isNaN(old))) continue
    // Absent shapers have no numbers; the old ones stay and wait.
    if (owner[i]! >= 0 && flat[owner[i]!] === -1) continue
    if (slotGood(i, value) && !drawnWithoutPoints(i, value, accepted)) {
      accepted[i] = value
      result.changed |= kinds[i]!
    } else {
      result.refused++
    }
  }
}

function drawnWithoutPoints(i: number, value: number, accepted: Float64Array): boolean {
  for (let c = 0; c < CURVES.length; c++) {
    const curve = CURVES[c]!
    if (curve.slot === i && curve.drawn === value) return accepted[curve.offset]! < 2
  }
  return false
}

function acceptPoints(curve: Curve, accepted: Float64Array, flat: Float64Array, result: Acceptance): void {
  const { offset } = curve
  const count = flat[offset]!
  let same = count === accepted[offset]
  for (let i = 1; same && i <= 2 * count; i++) same = flat[offset + i] === accepted[offset + i]
  if (same) return
  const wasDrawn = accepted[curve.slot] === curve.drawn
  const willBeDrawn = slotGood(curve.slot, flat[curve.slot]!) ? flat[curve.slot] === curve.drawn : wasDrawn
  if (!pointsGood(curve, flat, willBeDrawn)) {
    result.refused++
    return
  }
  for (let i = 0; i <= 2 * count; i++) accepted[offset + i] = flat[offset + i]!
  if (wasDrawn || willBeDrawn) result.changed |= curve.kind
}

function pointsGood({ offset, xMax, yMax, fromOrigin }: Curve, flat: Float64Array, drawn: boolean): boolean {
  const count = flat[offset]!
  if (count === 0) return !drawn
  if (!(count >= 2 && count <= MAX_POINTS && Math.floor(count) === count)) return false
  for (let i = 0; i < count; i++) {
    const x = flat[offset + 1 + 2 * i]!
    const y = flat[offset + 2 + 2 * i]!
    if (!(x >= 0 && x <= xMax && Math.abs(y) <= yMax)) return false
    if (i > 0 && !(x > flat[offset - 1 + 2 * i]!)) return false
    if (i === 0 && fromOrigin && (x !== 0 || y !== 0)) return false
  }
  return true
}
