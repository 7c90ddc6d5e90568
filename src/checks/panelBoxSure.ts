// Whether a check surely holds at every knob position, from its bound alone: what a changed end of a knob is tried with.
import { searchPanel } from '../analysis/panelSearch.ts'
import type { PanelSpace } from '../analysis/panelSpace.ts'
import { ringSeconds } from '../analysis/poles.ts'
import { type CheckId, judge, limitOf } from './limits.ts'
import { oneFind } from './panelBoxLook.ts'
import { loopFind } from './panelBoxLoop.ts'
import { closestRead, detuneOf, longestRead, poleCover } from './panelDirections.ts'

type Sure = (space: PanelSpace) => Generator<void, boolean>

function* rangeHolds(space: PanelSpace): Generator<void, boolean> {
  const find = oneFind([yield* searchPanel(space, closestRead), yield* searchPanel(space, longestRead)])
  return find.by !== 'samples' && -find.bound >= limitOf(space.set, 'sweep.range').margin
}

function* detuneHolds(space: PanelSpace): Generator<void, boolean> {
  const { sampleRate } = space
  const find = oneFind([yield* searchPanel(space, detuneOf('rise', sampleRate)), yield* searchPanel(space, detuneOf('fall', sampleRate))])
  return find.by !== 'samples' && judge(limitOf(space.set, 'sweep.detune'), find.bound) === 'holds'
}

function* stabilityHolds(space: PanelSpace): Generator<void, boolean> {
  const { gain } = yield* loopFind(space)
  return gain.by !== 'samples' && gain.bound < 1
}

function* marginHolds(space: PanelSpace): Generator<void, boolean> {
  const { gain } = yield* loopFind(space)
  const { limit, margin } = limitOf(space.set, 'loop.margin')
  return gain.by !== 'samples' && gain.bound < 1 && gain.bound <= 10 ** (-((limit ?? 0) + margin) / 20)
}

function* ringHolds(space: PanelSpace): Generator<void, boolean> {
  const { bound, by } = yield* searchPanel(space, poleCover)
  const seconds = bound <= -1e9 ? 0 : ringSeconds(bound, space.sampleRate)
  return by !== 'samples' && seconds !== null && judge(limitOf(space.set, 'loop.ring'), seconds) === 'holds'
}

/** By check; where one is missing nothing sure is known. */
export const SURE: Partial<Record<CheckId, Sure>> = {
  'loop.stability': stabilityHolds,
  'loop.margin': marginHolds,
  'loop.ring': ringHolds,
  'sweep.range': rangeHolds,
  'sweep.detune': detuneHolds,
}
