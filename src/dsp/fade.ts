// A chunk of a cross-fade: two cores on the same lines. What they put into the lines fades as what they give, so that nothing that is
// read later begins with a step.
import type { Core } from './core.ts'
import { readWet, takeInput } from './corePass.ts'
import type { Pair } from './line.ts'
import { feedBack, longestPiece } from './loop.ts'
import { rampsMove } from './ramps.ts'

/** How far the fade is: sample j of the chunk is (elapsed + j)/length of the way from the old core to the next. */
export interface FadePlace {
  readonly fadeElapsed: number
  readonly fadeLength: number
}

/** Runs the n samples of the chunk, begun in both, from their sources to the lines and to the wet of each. */
export function runFading(old: Core, next: Core, n: number, place: FadePlace): void {
  const { lines } = next
  takeInputs(next, lines.u, lines.uAt, n)
  takeInputs(old, old.taken, 0, n)
  for (let c = 0; c < 2; c++) blend(lines.u[c]!, lines.uAt, old.taken[c]!, n, place)
  writeBoth(old, next, n, place)
  readWet(next, n)
  readWet(old, n)
}

/** u of both lines, the second like the first where there is one. */
function takeInputs(core: Core, u: Pair, at: number, n: number): void {
  for (let c = 0; c < core.settings.lines; c++) takeInput(core, c, u[c]!, at, n)
  if (core.settings.lines === 1) for (let j = at; j < at + n; j++) u[1][j] = u[0][j]!
}

/** y = (1 − t) old + t y, in place over y[at … at + n). The two are alike enough for equal gain. */
export function blend(y: Float64Array, at: number, old: Float64Array, n: number, { fadeElapsed, fadeLength }: FadePlace): void {
  for (let j = 0; j < n; j++) {
    const t = (fadeElapsed + j) / fadeLength
    y[at + j] = (1 - t) * old[j]! + t * y[at + j]!
  }
}

/** w = u + (1 − t) g X s of the old core + t g X s of the next, in pieces that suit both. */
function writeBoth(old: Core, next: Core, n: number, place: FadePlace): void {
  const longest = Math.min(longestPiece(old), longestPiece(next))
  const oldStarts = old.trajectory.runs.starts
  const nextStarts = next.trajectory.runs.starts
  let oldRun = 0
  let nextRun = 0
  for (let j = 0; j < n; ) {
    const end = Math.min(j + longest, oldStarts[oldRun + 1]!, nextStarts[nextRun + 1]!)
    feedBack(old, oldRun, j, end, rampsMove(old.ramps))
    feedBack(next, nextRun, j, end, rampsMove(next.ramps))
    for (let c = 0; c < 2; c++) writePiece(old, next, c, j, end, place)
    if (end === oldStarts[oldRun + 1]) oldRun++
    if (end === nextStarts[nextRun + 1]) nextRun++
    j = end
  }
}

function writePiece(old: Core, next: Core, c: number, first: number, end: number, { fadeElapsed, fadeLength }: FadePlace): void {
  const { position, uAt } = next.lines
  const line = next.lines.w[c]!
  const u = next.lines.u[c]!
  const oldFed = old.fed[c]!
  const nextFed = next.fed[c]!
  for (let j = first; j < end; j++) {
    const t = (fadeElapsed + j) / fadeLength
    line[position + j] = u[uAt + j]! + ((1 - t) * oldFed[j]! + t * nextFed[j]!)
  }
}
