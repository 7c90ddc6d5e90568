// The loop and the write: s = loopShaper(lowCut(damping(q))), q the line read before w[n] is written, and w = u + g X s. Worked in runs
// no longer than the shortest loop delay allows, so that a run's reads were all written before it.
import type { Core } from './core.ts'
import { highPass, highPassMoving, lowPass, lowPassMoving } from './filterPasses.ts'
import { CHUNK, writeLine } from './line.ts'
import { CROSS_FEED, DAMPING, FEEDBACK, LOW_CUT, SHAPER_VALUES, SHAPERS } from './ramps.ts'
import { addRead } from './reads.ts'
import { LOOP } from './settings.ts'
import { shape, shapeMoving } from './shaperPass.ts'
import { LOOPS, smallestLoopDelay } from './trajectory.ts'

/** Writes the lines for u[0 … n); `moving` while the ramps move. */
export function writeLines(core: Core, n: number, moving: boolean): void {
  const { settings, trajectory, position, flush } = core
  const run = trajectory.loops ? longestRun(core, n) : n
  for (let j = 0; j < n; j += run) {
    const m = Math.min(run, n - j)
    if (trajectory.loops) {
      for (let c = 0; c < settings.lines; c++) readLoop(core, c, j, m, moving)
      feed(core, j, m, moving)
    }
    const from = trajectory.loops ? core.written : core.input
    for (let c = 0; c < settings.lines; c++) writeLine(core.lines[c]!, position + j, from[c]!, j, m, flush)
  }
}

/** Samples that can be read before the first of them is written: the newest point of the first read is then still older than the run. */
function longestRun({ settings, trajectory }: Core, n: number): number {
  const smallest = smallestLoopDelay(trajectory, settings.lines, n)
  const newest = settings.loopRead === 'lagrange3' || settings.loopRead === 'hermite4' ? smallest - 1 : smallest - 0.5
  return Math.max(1, Math.min(n, Math.floor(newest)))
}

/** s of line c for a run from index j of the chunk. */
function readLoop(core: Core, c: number, j: number, run: number, moving: boolean): void {
  const { settings, ramps, states, read } = core
  const s = core.loop[c]!
  const shaper = settings.shapers[LOOP]!
  s.fill(0, j, j + run)
  read.line = core.lines[c]!
  read.at = core.position + core.length + j
  read.d = (LOOPS + c) * CHUNK + j
  read.state = LOOPS + c
  read.out = s
  read.o = j
  addRead(settings.loopRead, read, run)
  if (moving) {
    const k = ramps.elapsed + j
    lowPassMoving(s, j, run, ramps, k, DAMPING, states.damping, c)
    highPassMoving(s, j, run, ramps, k, LOW_CUT, states.lowCut, 2 * c)
    shapeMoving(shaper, s, j, run, ramps, k, SHAPERS + LOOP * SHAPER_VALUES, states.shapers, 2 * LOOP + c)
    return
  }
  if (ramps.target[DAMPING + 1]) lowPass(s, j, run, ramps.target[DAMPING]!, states.damping, c)
  if (ramps.target[LOW_CUT + 1]) highPass(s, j, run, ramps.target[LOW_CUT]!, states.lowCut, 2 * c)
  shape(shaper, s, j, run, states.shapers, 2 * LOOP + c)
}

/** w = u + g X s over a run. */
function feed({ settings, ramps, input, loop, written }: Core, at: number, run: number, moving: boolean): void {
  const { target, start, slope, elapsed } = ramps
  const [u0, u1] = input
  const [s0, s1] = loop
  const [w0, w1] = written
  let g = target[FEEDBACK]!
  let k = target[CROSS_FEED]!
  for (let j = at; j < at + run; j++) {
    if (moving) {
      g = start[FEEDBACK]! + slope[FEEDBACK]! * (elapsed + j)
      k = start[CROSS_FEED]! + slope[CROSS_FEED]! * (elapsed + j)
    }
    const a = s0[j]!
    if (settings.lines === 1) {
      w0[j] = u0[j]! + g * a
    } else {
      const b = s1[j]!
      w0[j] = u0[j]! + g * ((1 - k) * a + k * b)
      w1[j] = u1[j]! + g * (k * a + (1 - k) * b)
    }
  }
}
