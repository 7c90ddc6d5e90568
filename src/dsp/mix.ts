// The mix: outputGain · outputShaper(dry · d ± wet · m).
import type { Channel, Core } from './core.ts'
import { DRY, OUTPUT_GAIN, rampsMove, SHAPER_VALUES, SHAPERS, scale, WET } from './ramps.ts'
import { OUTPUT } from './settings.ts'
import { shape, shapeMoving } from './shaperPass.ts'

/** y of channel c, outputGain · outputShaper(dry · d ± wet · m), into `output`. */
export function mix(core: Core, c: number, n: number): void {
  const { settings, ramps, states } = core
  const { start, slope, elapsed } = ramps
  const y = core.output[c]!
  const shaper = settings.shapers[OUTPUT]!
  const moving = rampsMove(ramps)
  if (moving) {
    const d = dryOf(core, c)
    const at = dryAt(core)
    const m = core.wet[c]!
    for (let j = 0; j < n; j++) {
      const dry = start[DRY]! + slope[DRY]! * (elapsed + j)
      const wet = start[WET + c]! + slope[WET + c]! * (elapsed + j)
      y[j] = dry * d[at + j]! + wet * (settings.voiceScale * m[j]!)
    }
    shapeMoving(shaper, y, 0, n, ramps, elapsed, SHAPERS + OUTPUT * SHAPER_VALUES, states.shapers, 2 * OUTPUT + c)
  } else {
    mixTo(core, c, y, 0, n, false)
    shape(shaper, y, 0, n, states.shapers, 2 * OUTPUT + c)
  }
  scale(y, 0, n, ramps, OUTPUT_GAIN, moving)
}

/** Whether mixTo gives y as it is to be heard. */
export function mixesPlainly({ settings, ramps }: Core): boolean {
  return !rampsMove(ramps) && !settings.shapers[OUTPUT]!.on
}

/** dry · d ± wet · m of channel c, times outputGain if `gained`, while no ramp moves. Returns how many samples are not finite. */
export function mixTo(core: Core, c: number, y: Channel, yAt: number, n: number, gained: boolean): number {
  const { settings, ramps } = core
  const d = dryOf(core, c)
  const at = dryAt(core)
  const m = core.wet[c]!
  const gain = gained ? ramps.target[OUTPUT_GAIN]! : 1
  const dry = gain * ramps.target[DRY]!
  const wet = gain * ramps.target[WET + c]! * settings.voiceScale
  let sum = 0
  let j = 0
  // Two samples a turn: the turn itself costs as much as a sample.
  for (; j < n - 1; j += 2) {
    const v = dry * d[at + j]! + wet * m[j]!
    const next = dry * d[at + j + 1]! + wet * m[j + 1]!
    sum += v + next
    y[yAt + j] = v
    y[yAt + j + 1] = next
  }
  if (j < n) {
    const v = dry * d[at + j]! + wet * m[j]!
    sum += v
    y[yAt + j] = v
  }
  // A sum is finite when all its parts are.
  return Math.abs(sum) < Number.POSITIVE_INFINITY ? 0 : countNotFinite(y, yAt, n)
}

/** How many of y[at … at + n) are not finite. */
export function countNotFinite(y: Channel, at: number, n: number): number {
  let count = 0
  for (let j = at; j < at + n; j++) if (!Number.isFinite(y[j])) count++
  return count
}

/** Where the dry signal of channel c stands, and the index there of the chunk's first sample. */
function dryOf({ settings, lines }: Core, c: number): Float64Array {
  return (settings.dryFromLine ? lines.w : lines.u)[settings.lines === 2 ? c : 0]!
}

function dryAt({ settings, lines }: Core): number {
  return (settings.dryFromLine ? lines.position : lines.uAt) - settings.dryDelay
}
