// The commonest loop in one go: read linearly, filtered, not shaped, not crossed, fed by an input that is only scaled. The same operations
// in the same order as corePass.ts and loop.ts, so the same bits, but sample after sample, with everything kept at hand.
import type { Core } from './core.ts'
import { CROSS_FEED, DAMPING, FEEDBACK, INPUT_GAIN, INPUT_OPEN, LOW_CUT } from './ramps.ts'
import { LOOPS, READS, stretchEnd } from './runs.ts'
import { INPUT, LOOP } from './settings.ts'

/** Whether input and loop are those that linearLoop plays. */
export function isLinearLoop({ settings, ramps, trajectory }: Core, moving: boolean): boolean {
  if (moving || !trajectory.loops || settings.loopRead !== 'linear') return false
  if (settings.shapers[LOOP]!.on || settings.shapers[INPUT]!.on || ramps.target[INPUT_OPEN] !== 1) return false
  return settings.lines === 1 || ramps.target[CROSS_FEED] === 0
}

/** Takes u of line c from its source and writes the line, for the whole chunk. */
export function linearLoop(core: Core, c: number): void {
  const { ramps, trajectory, states, lines, sourceAt } = core
  const { position, uAt } = lines
  const { ends, part, starts, into, count } = trajectory.runs
  const x = core.source[c]!
  const line = lines.w[c]!
  const u = lines.u[c]!
  const gain = ramps.target[INPUT_GAIN]!
  const g = ramps.target[FEEDBACK]!
  const cut = ramps.target[LOW_CUT + 1] !== 0
  // Without damping its coefficient is 0: s · 1 + 0.
  const a = ramps.target[DAMPING + 1] ? ramps.target[DAMPING]! : 0
  const b = ramps.target[LOW_CUT]!
  const lessA = 1 - a
  const half = (1 + b) / 2
  let low = states.damping[c]!
  let before = states.lowCut[2 * c]!
  let high = states.lowCut[2 * c + 1]!
  for (let k = 0; k < count; k++) {
    const from = ends[k * READS + LOOPS + c]!
    const slope = (ends[(k + 1) * READS + LOOPS + c]! - from) * part
    const first = starts[k]!
    const end = starts[k + 1]!
    const since = into[k]! - first
    // Cut where the delay passes a whole sample, as in reads.ts.
    for (let j = first; j < end; ) {
      const whole = (from + slope * (since + j)) | 0
      const stop = stretchEnd(trajectory.runs, LOOPS + c, k, j, end)
      let at = position + j
      let i = at - whole
      let x2 = line[i - 1]!
      // Two samples a turn, so that the points need not be moved along.
      for (; j < stop - 1; j += 2) {
        let f = from + slope * (since + j) - whole
        const x1 = line[i]!
        let s = x1 + f * (x2 - x1)
        low = lessA * s + a * low
        s = low
        if (cut) {
          high = half * (s - before) + b * high
          before = s
          s = high
        }
        let v = x[sourceAt + j]! * gain
        u[uAt + j] = v
        line[at] = v + g * s
        f = from + slope * (since + j + 1) - whole
        x2 = line[i + 1]!
        s = x2 + f * (x1 - x2)
        low = lessA * s + a * low
        s = low
        if (cut) {
          high = half * (s - before) + b * high
          before = s
          s = high
        }
        v = x[sourceAt + j + 1]! * gain
        u[uAt + j + 1] = v
        line[at + 1] = v + g * s
        i = (i + 2) | 0
        at = (at + 2) | 0
      }
      if (j < stop) {
        const f = from + slope * (since + j) - whole
        const x1 = line[i]!
        let s = x1 + f * (x2 - x1)
        low = lessA * s + a * low
        s = low
        if (cut) {
          high = half * (s - before) + b * high
          before = s
          s = high
        }
        const v = x[sourceAt + j]! * gain
        u[uAt + j] = v
        line[at] = v + g * s
        j++
      }
    }
  }
  states.damping[c] = low
  states.lowCut[2 * c] = before
  states.lowCut[2 * c + 1] = high
}
