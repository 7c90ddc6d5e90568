// The commonest loop in one go: read linearly, filtered, not shaped, not crossed. The same operations in the same order as loop.ts, so
// the same bits, but sample after sample, with everything kept at hand.
import type { Core } from './core.ts'
import { CHUNK } from './line.ts'
import { CROSS_FEED, DAMPING, FEEDBACK, LOW_CUT } from './ramps.ts'
import { LOOP } from './settings.ts'
import { LOOPS } from './trajectory.ts'

/** Whether the loop is one that fusedLoop plays. */
export function canFuse({ settings, ramps }: Core, moving: boolean): boolean {
  if (moving || settings.loopRead !== 'linear' || settings.shapers[LOOP]!.on) return false
  return settings.lines === 1 || ramps.target[CROSS_FEED] === 0
}

/** Writes line c for the whole chunk. */
export function fusedLoop({ ramps, trajectory, states, lines, position, length, input, flush }: Core, c: number): void {
  const { from, slope, starts, into, count } = trajectory.runs
  const line = lines[c]!
  const u = input[c]!
  const g = ramps.target[FEEDBACK]!
  const damped = ramps.target[DAMPING + 1] !== 0
  const cut = ramps.target[LOW_CUT + 1] !== 0
  const a = ramps.target[DAMPING]!
  const b = ramps.target[LOW_CUT]!
  const oneLessA = 1 - a
  const half = (1 + b) / 2
  let low = states.damping[c]!
  let before = states.lowCut[2 * c]!
  let high = states.lowCut[2 * c + 1]!
  for (let k = 0; k < count; k++) {
    const start = from[(LOOPS + c) * CHUNK + k]!
    const step = slope[(LOOPS + c) * CHUNK + k]!
    const since = into[k]! - starts[k]!
    const end = starts[k + 1]!
    for (let j = starts[k]!; j < end; j++) {
      const delay = start + step * (since + j)
      const whole = delay | 0
      const at = position + j
      const i = at + length - whole
      const x1 = line[i]!
      let s = x1 + (delay - whole) * (line[i - 1]! - x1)
      if (damped) {
        low = oneLessA * s + a * low
        s = low
      }
      if (cut) {
        high = half * (s - before) + b * high
        before = s
        s = high
      }
      let w = u[j]! + g * s
      if (Math.abs(w) < flush) w = 0
      line[at] = w
      line[at + length] = w
    }
  }
  states.damping[c] = low
  states.lowCut[2 * c] = before
  states.lowCut[2 * c + 1] = high
}
