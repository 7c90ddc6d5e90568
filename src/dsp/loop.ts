// The loop and the write: s = loopShaper(lowCut(damping(q))), q the line read before w[n] is written, and w = u + g X s. Worked in pieces
// no longer than the shortest loop delay allows, so that all a piece reads was written before it.
import type { Core } from './core.ts'
import { loopReach } from './delays.ts'
import { highPass, highPassMoving, lowPass, lowPassMoving } from './filterPasses.ts'
import { CHUNK } from './line.ts'
import { CROSS_FEED, DAMPING, FEEDBACK, LOW_CUT, SHAPER_VALUES, SHAPERS } from './ramps.ts'
import { addPiece } from './reads.ts'
import { LOOPS } from './runs.ts'
import { LOOP } from './settings.ts'
import { shape, shapeMoving } from './shaperPass.ts'

/** Writes the lines as u and the loops of the chunk need it; `moving` while the ramps move. */
export function writeByPieces(core: Core, moving: boolean): void {
  const { settings, trajectory } = core
  const { count, starts } = trajectory.runs
  const longest = longestPiece(core)
  for (let k = 0; k < count; k++) {
    const runEnd = starts[k + 1]!
    for (let j = starts[k]!; j < runEnd; j += longest) {
      const end = Math.min(j + longest, runEnd)
      feedBack(core, k, j, end, moving)
      for (let c = 0; c < settings.lines; c++) write(core, c, j, end)
    }
  }
}

function write({ lines, fed }: Core, c: number, first: number, end: number): void {
  const { position, uAt } = lines
  const line = lines.w[c]!
  const u = lines.u[c]!
  const back = fed[c]!
  for (let j = first; j < end; j++) line[position + j] = u[uAt + j]! + back[j]!
}

/** Samples that can be read before the first of them is written: the newest point of the first read is then still older than the piece. */
export function longestPiece({ settings, trajectory }: Core): number {
  const cubic = settings.loopRead === 'lagrange3' || settings.loopRead === 'hermite4'
  let longest = CHUNK
  for (let c = 0; trajectory.loops && c < settings.lines; c++) longest = Math.min(longest, loopReach(trajectory, c, cubic))
  return longest
}

/** s of line c for samples j to end, inside run k. */
function readLoop(core: Core, c: number, k: number, j: number, end: number, moving: boolean): void {
  const { settings, ramps, states, read } = core
  const s = core.loop[c]!
  const n = end - j
  const shaper = settings.shapers[LOOP]!
  s.fill(0, j, end)
  read.read = LOOPS + c
  read.line = core.lines.w[c]!
  read.at = core.lines.position
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

/** g X s of both lines for samples first to end, inside run k, into `fed`; the second like the first where there is one line. */
export function feedBack(core: Core, k: number, first: number, end: number, moving: boolean): void {
  const { settings, ramps, loop, fed, trajectory } = core
  const { target, start, slope, elapsed } = ramps
  const s0 = loop[0]
  const s1 = loop[1]
  const w0 = fed[0]
  const w1 = fed[1]
  if (!trajectory.loops) {
    w0.fill(0, first, end)
    w1.fill(0, first, end)
    return
  }
  for (let c = 0; c < settings.lines; c++) readLoop(core, c, k, first, end, moving)
  let g = target[FEEDBACK]!
  let cross = target[CROSS_FEED]!
  for (let j = first; j < end; j++) {
    if (moving) {
      g = start[FEEDBACK]! + slope[FEEDBACK]! * (elapsed + j)
      cross = start[CROSS_FEED]! + slope[CROSS_FEED]! * (elapsed + j)
    }
    const a = s0[j]!
    if (settings.lines === 1) {
      w0[j] = g * a
      w1[j] = w0[j]!
    } else {
      const b = s1[j]!
      w0[j] = g * ((1 - cross) * a + cross * b)
      w1[j] = g * (cross * a + (1 - cross) * b)
    }
  }
}
