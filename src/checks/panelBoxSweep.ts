// Where the checks of the sweep are worst over all knob positions.

import { type PanelFigure, type PanelFind, searchPanel } from '../analysis/panelSearch.ts'
import type { PanelBox } from '../analysis/panelSpace.ts'
import { centsOfSlope } from '../analysis/sweepTable.ts'
import { CLOSE_TOLERANCE } from '../set/delayRange.ts'
import { judge, limitOf } from './limits.ts'
import { oneFind, type PanelFinding, type PanelJudge } from './panelBoxLook.ts'
import { closestRead, detuneOf, longestRead, longestVoice, slopeCover } from './panelDirections.ts'
import type { Status } from './types.ts'

const CORNERS = 'each parameter at the end of its range where the figure is worst'

/** As if the sweep moved: it then reaches every place where it could stand. */
function moved(figure: PanelFigure): PanelFigure {
  const asMoving = (box: PanelBox): PanelBox => ({ ...box, range: (path) => (path === 'sweep.rateHz' ? [1, 1] : box.range(path)) })
  return {
    ...figure,
    directions: (box) => figure.directions(asMoving(box)),
    convex: (box) => figure.convex?.(asMoving(box)) ?? [],
    worse: (set, sampleRate) => figure.worse({ ...set, sweep: { ...set.sweep, rateHz: 1 } }, sampleRate),
  }
}

const base = (find: PanelFind): Pick<PanelFinding, 'positions' | 'by' | 'knobs' | 'looks'> => {
  const { positions, by, knobs, looks } = find
  return { positions, by, knobs, looks }
}

/** How far a search's bound lies past what it found, when it does. */
const isOpen = ({ by, bound, value }: PanelFind): boolean => by === 'samples' || bound > value + 1e-9 * Math.max(1, Math.abs(value))

export const panelRange: PanelJudge = function* ({ space }) {
  const close = yield* searchPanel(space, closestRead)
  const far = yield* searchPanel(space, longestRead)
  const find = oneFind([close, far])
  const { margin } = limitOf(space.set, 'sweep.range')
  const formula = 'room = smallest delay − what its interpolator needs; base + offset ± depth, each at its worst end'
  const result = { ...base(find), formula, source: 'closed form over s; straight in base, offset and depth (ratio law: one way with each)' }
  if (!isOpen(find)) return result
  const cover =
    find.by === 'samples' ? oneFind([yield* searchPanel(space, moved(closestRead)), yield* searchPanel(space, moved(longestRead))]) : find
  if (cover.by === 'samples') return { ...result, bound: null }
  const room = -cover.bound
  const status: Status = room < -CLOSE_TOLERANCE ? 'fails' : room < margin ? 'near' : 'holds'
  return { ...result, by: 'intervals', looks: find.looks + cover.looks, bound: { value: { roomSamples: room }, status } }
}

export const panelFusion: PanelJudge = function* ({ space }) {
  const find = yield* searchPanel(space, longestVoice)
  const result = { ...base(find), formula: 'largest base + offset + depth · s', source: CORNERS }
  if (!isOpen(find)) return result
  const cover = find.by === 'samples' ? yield* searchPanel(space, moved(longestVoice)) : find
  if (cover.by === 'samples') return { ...result, bound: null }
  const status = judge(limitOf(space.set, 'sweep.fusion'), cover.bound)
  return { ...result, by: 'intervals', looks: find.looks + cover.looks, bound: { value: cover.bound, status } }
}

export const panelDetune: PanelJudge = function* ({ space }) {
  const { sampleRate, set } = space
  const find = oneFind([yield* searchPanel(space, detuneOf('rise', sampleRate)), yield* searchPanel(space, detuneOf('fall', sampleRate))])
  const formula = 'largest 1200 log₂(1 − dτ/dt): grows with rate, depth, shorter edges and (ratio law) longer delays'
  const result = { ...base(find), formula, source: `${CORNERS}; a longer part of the cycle has no smaller largest chord` }
  if (!isOpen(find)) return result
  const bound = (cents: number): PanelFinding['bound'] => {
    if (cents >= 1e5) return { value: 'reversed', status: 'fails' }
    return { value: cents, status: judge(limitOf(set, 'sweep.detune'), cents) }
  }
  if (find.by !== 'samples') return { ...result, bound: bound(find.bound) }
  const cover = yield* searchPanel(space, slopeCover)
  if (cover.by === 'samples') return { ...result, bound: null }
  const cents = cover.bound < 1 ? -(centsOfSlope(cover.bound) ?? Number.NEGATIVE_INFINITY) : Number.POSITIVE_INFINITY
  const steepest = { formula: `${formula}; no chord is steeper than the sweep’s steepest place`, looks: find.looks + cover.looks }
  return { ...result, ...steepest, by: 'intervals', bound: bound(cents) }
}
