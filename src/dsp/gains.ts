// The targets of the ramps, decoded from the flat form: gains as factors, frequencies as coefficients.
import { flatIndex } from '../set/flat.ts'
import { highPassCoefficient, onePoleCoefficient } from './filters.ts'
import {
  CROSS_FEED,
  DAMPING,
  DRY,
  FEEDBACK,
  INPUT_GAIN,
  INPUT_OPEN,
  LOW_CUT,
  OUTPUT_GAIN,
  type Ramps,
  SHAPER_VALUES,
  SHAPERS,
  snapRamp,
  WET,
  WET_HIGH_CUT,
  WET_LOW_CUT,
} from './ramps.ts'
import { SHAPER_PATHS } from './settings.ts'

const AT = {
  inputGain: flatIndex('input.gainDb'),
  feedback: flatIndex('loop.feedback'),
  crossFeed: flatIndex('loop.crossFeed'),
  dry: flatIndex('mix.dry'),
  wet: flatIndex('mix.wet'),
  invertRight: flatIndex('mix.invertRight'),
  outputGain: flatIndex('mix.outputGainDb'),
  damping: flatIndex('loop.dampingHz'),
  lowCut: flatIndex('loop.lowCutHz'),
  wetHighCut: flatIndex('mix.wetHighCutHz'),
  wetLowCut: flatIndex('mix.wetLowCutHz'),
} as const
const SHAPER_AT = SHAPER_PATHS.map((path) =>
  ['drive', 'ceiling', 'positive', 'negative', 'deadZone'].map((field) => flatIndex(`${path}.${field}`)),
)

/** Factor of a gain in dB: 10^(dB/20), exactly 1 for 0 dB. */
export function gainOf(db: number): number {
  return 10 ** (db / 20)
}

/** Sets every target from the flat set. `inputOpen`, `dryOpen`: 1, or 0 while bypass shuts the input from the line, or the dry path. */
export function setTargets(r: Ramps, flat: Float64Array, fs: number, inputOpen: number, dryOpen: number): void {
  const { target } = r
  target[INPUT_GAIN] = gainOf(flat[AT.inputGain]!)
  target[INPUT_OPEN] = inputOpen
  target[FEEDBACK] = flat[AT.feedback]!
  target[CROSS_FEED] = flat[AT.crossFeed]!
  target[DRY] = flat[AT.dry]! * dryOpen
  target[WET] = flat[AT.wet]!
  target[WET + 1] = flat[AT.invertRight] ? -flat[AT.wet]! : flat[AT.wet]!
  target[OUTPUT_GAIN] = gainOf(flat[AT.outputGain]!)
  setFilter(r, DAMPING, flat[AT.damping]!, onePoleCoefficient(flat[AT.damping]!, fs))
  setFilter(r, WET_HIGH_CUT, flat[AT.wetHighCut]!, onePoleCoefficient(flat[AT.wetHighCut]!, fs))
  setFilter(r, LOW_CUT, flat[AT.lowCut]!, highPassCoefficient(flat[AT.lowCut]!, fs))
  setFilter(r, WET_LOW_CUT, flat[AT.wetLowCut]!, highPassCoefficient(flat[AT.wetLowCut]!, fs))
  for (let i = 0; i < SHAPER_AT.length; i++) {
    const slots = SHAPER_AT[i]!
    for (let k = 0; k < SHAPER_VALUES; k++) target[SHAPERS + SHAPER_VALUES * i + k] = flat[slots[k]!]!
  }
}

/** A filter that is off keeps its coefficient while its amount goes to 0; one that was silent starts at its new coefficient. */
function setFilter(r: Ramps, slot: number, hz: number, coefficient: number): void {
  const silent = r.start[slot + 1] === 0
  const on = !Number.isNaN(hz)
  r.target[slot + 1] = on ? 1 : 0
  if (on) r.target[slot] = coefficient
  if (silent) snapRamp(r, slot)
}
