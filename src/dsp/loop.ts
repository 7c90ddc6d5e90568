// The loop and the write: s = loopShaper(lowCut(damping(q))), q the line read before w[n] is written, and w = u + g X s. Worked in pieces
// no longer than the shortest loop delay allows, so that all a piece reads was written before it.
import type { Core } from './core.ts'
import { smallestLoopDelay } from './delays.ts'
import { highPass, highPassMoving, lowPass, lowPassMoving } from './filterPasses.ts'
import { writeLine } from './line.ts'
import { CROSS_FEED, DAMPING, FEEDBACK, LOW_CUT, SHAPER_VALUES, SHAPERS } from './ramps.ts'
import { addPiece } from './reads.ts'
import { LOOPS } from './runs.ts'
import { LOOP } from './settings.ts'
import { shape, shapeMoving } from './shaperPass.ts'

/** Writes the lines for u[0 … n) as the loops of the chunk need it; `moving` while the ramps move. */
export function writeByPieces(core: Core, moving: boolean): void {
  const { settings, trajectory, position, written } = core
  const { count, starts } = trajectory.runs
  const longest = longestPiece(core)
  for (let k = 0; k < count; k++) {
    const runEnd = starts[k + 1]!
    for (let j = starts[k]!; j < runEnd; j += longest) {
      const end = Math.min(j + longest, runEnd)
      for (let c = 0; c < settings.lines; c++) readLoop(core, c, k, j, end, moving)
      feed(core, j, end, moving)
      for (let c = 0; c < settings.lines; c++) writeLine(core.lines[c]!, position + j, written[c]!, j, end - j)
    }
  }
}

/** Samples that can be read before the first of them is written: the newest point of the first read is then still older than the piece. */
function longestPiece({ settings, trajectory }: Core): number {
  let smallest = Number.POSITIVE_INFINITY
  for (let c = 0; c < settings.lines; c++) smallest = Math.min(smallest, smallestLoopDelay(trajectory, c))
  const cubic = settings.loopRead === 'lagrange3' || settings.loopRead === 'hermite4'
  return Math.max(1, Math.floor(cubic ? smallest - 1 : smallest - 0.5))
}

/** s of line c for samples j to end, inside run k. */
function readLoop(core: Core, c: number, k: number, j: number, end: number, moving: boolean): void {
  const { settings, ramps, states, read } = core
  const s = core.loop[c]!
  const n = end - j
  const shaper = settings.shapers[LOOP]!
  s.fill(0, j, end)
  read.read = LOOPS + c
  read.line = core.lines[c]!
  read.at = core.position
  read.out = s
  addPiece(settings.loopRead, read, k, j, end)
  if (moving) {
    const since = ramps.elapsed + j
    lowPassMoving(s, j, n, ramps, since, DAMPING, states.damping, c)
    highPassMoving(s, j, n, ramps, since, LOW_CUT, states.lowCut, 2 * c)
    shapeMoving(shaper, s, j, n, ramps, since, SHAPERS + LOOP * SHAPER_VALUES, states.shapers, 2 * LOOP + c)
    return
  }
  if (ramps.target[DAMPING + 1]) lowPass(s, j, n, ramps, DAMPING, states.damping, c)
  if (ramps.target[LOW_CUT + 1]) highPass(s, j, n, ramps, LOW_CUT, states.lowCut, 2 * c)
  shape(shaper, s, j, n, states.shapers, 2 * LOOP + c)
}

/** w = u + g X s for samples j to end. */
function feed({ settings, ramps, u, uAt, loop, written }: Core, first: number, end: number, moving: boolean): void {
  const { target, start, slope, elapsed } = ramps
  const u0 = u[0]
  const u1 = u[1]
  const s0 = loop[0]
  const s1 = loop[1]
  const w0 = written[0]
  const w1 = written[1]
  let g = target[FEEDBACK]!
  let k = target[CROSS_FEED]!
  for (let j = first; j < end; j++) {
    if (moving) {
      g = start[FEEDBACK]! + slope[FEEDBACK]! * (elapsed + j)
      k = start[CROSS_FEED]! + slope[CROSS_FEED]! * (elapsed + j)
    }
    const a = s0[j]!
    if (settings.lines === 1) {
      w0[j] = u0[uAt + j]! + g * a
    } else {
      const b = s1[j]!
      w0[j] = u0[uAt + j]! + g * ((1 - k) * a + k * b)
      w1[j] = u1[uAt + j]! + g * (k * a + (1 - k) * b)
    }
  }
}
