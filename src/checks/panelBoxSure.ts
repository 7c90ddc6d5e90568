// Whether a check holds at every knob position, as far as can be told quickly: from its bound alone, or where it is tried. What a changed end of a knob is tried with.
import { boundPanel } from '../analysis/panelSearch.ts'
import type { PanelSpace } from '../analysis/panelSpace.ts'
import { ringSeconds } from '../analysis/poles.ts'
import { type CheckId, judge, limitOf } from './limits.ts'
import { panelLook } from './panelBoxLook.ts'
import { panelTried } from './panelBoxTried.ts'
import { closestRead, detuneOf, gainCover, longestRead, loopGainOf, poleCover } from './panelDirections.ts'
import { CHECKS } from './registry.ts'

type Sure = (space: PanelSpace) => Generator<void, boolean>

function* rangeHolds(space: PanelSpace): Generator<void, boolean> {
  const { margin } = limitOf(space.set, 'sweep.range')
  for (const figure of [closestRead, longestRead]) {
    const { bound, by } = yield* boundPanel(space, figure)
    if (by === 'samples' || -bound < margin) return false
  }
  return true
}

function* detuneHolds(space: PanelSpace): Generator<void, boolean> {
  for (const side of ['rise', 'fall'] as const) {
    const { bound, by } = yield* boundPanel(space, detuneOf(side, space.sampleRate))
    if (by === 'samples' || judge(limitOf(space.set, 'sweep.detune'), bound) !== 'holds') return false
  }
  return true
}

/** The gain below 1 of which the loop is proven stays below `most`. */
function* gainBelow(space: PanelSpace, most: number): Generator<void, boolean> {
  for (const side of ['rise', 'fall'] as const) {
    const { bound, by } = yield* boundPanel(space, loopGainOf(side, space.sampleRate))
    if (by === 'samples' || bound >= 1 || bound > most) return false
  }
  return true
}

function* stabilityHolds(space: PanelSpace): Generator<void, boolean> {
  return yield* gainBelow(space, 1)
}

function* marginHolds(space: PanelSpace): Generator<void, boolean> {
  const { limit, margin } = limitOf(space.set, 'loop.margin')
  return yield* gainBelow(space, 10 ** (-((limit ?? 0) + margin) / 20))
}

function* ringHolds(space: PanelSpace): Generator<void, boolean> {
  const { bound, by } = yield* boundPanel(space, poleCover)
  const seconds = bound <= -1e9 ? 0 : ringSeconds(bound, space.sampleRate)
  return by !== 'samples' && seconds !== null && judge(limitOf(space.set, 'loop.ring'), seconds) === 'holds'
}

function gainHolds(place: 'peak' | 'line'): Sure {
  return function* (space) {
    const { bound, by } = yield* boundPanel(space, gainCover(place))
    return by !== 'samples' && judge(limitOf(space.set, `level.${place}`), bound) === 'holds'
  }
}

/** Of a check that is only tried: that it holds where it is tried. */
function* aliasHolds(space: PanelSpace): Generator<void, boolean> {
  const entry = CHECKS.find(({ id }) => id === 'shaper.alias')
  if (entry === undefined) return false
  const look = panelLook(space)
  const { positions } = yield* panelTried(look, entry)
  return look.figureAt(entry, positions).status === 'holds'
}

/** By check; where one is missing nothing is known, or trying it would take too long. */
export const SURE: Partial<Record<CheckId, Sure>> = {
  'loop.stability': stabilityHolds,
  'loop.margin': marginHolds,
  'loop.ring': ringHolds,
  'sweep.range': rangeHolds,
  'sweep.detune': detuneHolds,
  'shaper.alias': aliasHolds,
  'level.peak': gainHolds('peak'),
  'level.line': gainHolds('line'),
}
