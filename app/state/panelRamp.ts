// A turned knob's smoothing, heard as the unit will sound: what it moves follows the knob's own curve, evenly, and arrives smoothMs after the last
// turn. Shown values do not wait for it.
import { moveValue } from '../../src/set/panel.ts'
import { withAt } from '../../src/set/path.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { setProblems } from '../../src/set/validity.ts'
import { currentSet } from './current.ts'
import { onFrame } from './frames.ts'
import { hear } from './heard.ts'

/** The engine itself glides over about this long; a shorter smoothing needs no help. */
const ENGINE_MS = 20

interface Ramp {
  /** Where the knob is heard to stand. */
  at: number
  startMs: number
  from: number
}

const ramps = new Map<number, Ramp>()
let stop: (() => void) | null = null
let lastGood: ParameterSet | null = null

/** Called before the knob number `index` is turned away from `before`. */
export function rampTurn(index: number, before: number): void {
  const knob = currentSet().panel[index]
  if (!knob || knob.smoothMs <= ENGINE_MS) {
    ramps.delete(index)
    return
  }
  const at = ramps.get(index)?.at ?? before
  ramps.set(index, { at, from: at, startMs: performance.now() })
  hear(rampedSet)
  stop ??= onFrame(step)
}

function step(): void {
  const { panel } = currentSet()
  for (const [index, ramp] of ramps) {
    const knob = panel[index]
    const part = knob ? (performance.now() - ramp.startMs) / knob.smoothMs : 1
    if (!knob || part >= 1) ramps.delete(index)
    else ramp.at = rampedPosition(ramp.from, knob.position, part)
  }
  if (ramps.size > 0) hear(rampedSet)
  else {
    hear(null)
    lastGood = null
    stop?.()
    stop = null
  }
}

/** Evenly from one position to another, `part` of the smoothing's time gone, 0 to 1. */
export const rampedPosition = (from: number, to: number, part: number): number => from + (to - from) * Math.min(1, Math.max(0, part))

function rampedSet(set: ParameterSet): ParameterSet {
  let heard = set
  for (const [index, { at }] of ramps)
    for (const move of set.panel[index]?.moves ?? []) heard = withAt(heard, move.parameter, moveValue(move, at))
  // Two good places may have one between them that reads too close: the ramp waits before it.
  if (setProblems(heard).length === 0) lastGood = heard
  return lastGood ?? set
}
