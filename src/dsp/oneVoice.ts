// The smallest effect in one go: one voice and the loop both read linearly; nothing scaled at the input, filtered, shaped, crossed, or
// delayed on the dry path. The same operations in the same order as the general way, so the same bits, but from input to output, sample
// after sample.
import type { Channel, Core } from './core.ts'
import { isLinearLoop } from './linearLoop.ts'
import { countNotFinite, mixesPlainly } from './mix.ts'
import { DAMPING, DRY, FEEDBACK, INPUT_GAIN, LOW_CUT, OUTPUT_GAIN, rampsMove, WET, WET_HIGH_CUT, WET_LOW_CUT } from './ramps.ts'
import { LOOPS, MAX_VOICES, READS } from './runs.ts'

/** Whether oneVoice plays this core. `output` is asked because it must not be written before all of the input is read. */
export function isOneVoice(core: Core, output: readonly Channel[]): boolean {
  const { settings, ramps, source } = core
  const { target } = ramps
  if (rampsMove(ramps) || settings.voices.count !== 1 || settings.voiceRead !== 'linear' || !isLinearLoop(core, false)) return false
  if (target[INPUT_GAIN] !== 1) return false
  if (target[DAMPING + 1] || target[LOW_CUT + 1] || target[WET_HIGH_CUT + 1] || target[WET_LOW_CUT + 1]) return false
  if (core.lines.keepsInput || settings.dryFromLine || settings.dryDelay > 0 || !mixesPlainly(core)) return false
  return settings.lines === settings.outputs && output.length === settings.outputs && (settings.lines === 1 || output[0] !== source[1])
}

/** Plays channel c of the chunk that is planned, to y[at …]. Returns how many samples are not finite. */
export function oneVoice(core: Core, c: number, y: Channel, at: number): number {
  const { settings, ramps, trajectory, lines, sourceAt } = core
  const { position } = lines
  const { target } = ramps
  const { ends, part, starts, into, count } = trajectory.runs
  const x = core.source[c]!
  const line = lines.w[c]!
  const g = target[FEEDBACK]!
  const dry = target[OUTPUT_GAIN]! * target[DRY]!
  const wet = target[OUTPUT_GAIN]! * target[WET + c]! * settings.voiceScale
  let sum = 0
  for (let k = 0; k < count; k++) {
    const from = ends[k * READS + c * MAX_VOICES]!
    const slope = (ends[(k + 1) * READS + c * MAX_VOICES]! - from) * part
    const loopFrom = ends[k * READS + LOOPS + c]!
    const loopSlope = (ends[(k + 1) * READS + LOOPS + c]! - loopFrom) * part
    const end = starts[k + 1]!
    const since = into[k]! - starts[k]!
    // Cut where either delay passes a whole sample: two of stretchEnd's in one, since here every step counts.
    for (let j = starts[k]!; j < end; ) {
      const whole = (from + slope * (since + j)) | 0
      const loopWhole = (loopFrom + loopSlope * (since + j)) | 0
      let stop = end
      const last = since + end - 1
      if (((from + slope * last) | 0) !== whole || ((loopFrom + loopSlope * last) | 0) !== loopWhole) {
        stop = j + 1
        while (((from + slope * (since + stop)) | 0) === whole && ((loopFrom + loopSlope * (since + stop)) | 0) === loopWhole) stop++
      }
      let a2 = line[position + j - loopWhole - 1]!
      let b2 = line[position + j - whole - 1]!
      for (; j < stop - 1; j += 2) {
        const now = position + j
        const t = since + j
        let u = x[sourceAt + j]!
        const a1 = line[now - loopWhole]!
        line[now] = u + g * (a1 + (loopFrom + loopSlope * t - loopWhole) * (a2 - a1))
        const b1 = line[now - whole]!
        const v = dry * u + wet * (b1 + (from + slope * t - whole) * (b2 - b1))
        y[at + j] = v
        u = x[sourceAt + j + 1]!
        a2 = line[now - loopWhole + 1]!
        line[now + 1] = u + g * (a2 + (loopFrom + loopSlope * (t + 1) - loopWhole) * (a1 - a2))
        b2 = line[now - whole + 1]!
        const next = dry * u + wet * (b2 + (from + slope * (t + 1) - whole) * (b1 - b2))
        sum += v + next
        y[at + j + 1] = next
      }
      if (j < stop) {
        const now = position + j
        const t = since + j
        const u = x[sourceAt + j]!
        const a1 = line[now - loopWhole]!
        line[now] = u + g * (a1 + (loopFrom + loopSlope * t - loopWhole) * (a2 - a1))
        const b1 = line[now - whole]!
        const v = dry * u + wet * (b1 + (from + slope * t - whole) * (b2 - b1))
        sum += v
        y[at + j] = v
        j++
      }
    }
  }
  return Math.abs(sum) < Number.POSITIVE_INFINITY ? 0 : countNotFinite(y, at, starts[count]!)
}
