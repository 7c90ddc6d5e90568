// How the figures of the checks move with each parameter a knob can move, and why: the one place where panel.box knows it. A direction must hold over the whole box,
// the other parameters anywhere in it; what is not listed does not concern the figure. tests/checks/panelDirections.test.ts tries every line of it on random sets.

import { sweepDetune } from '../analysis/detune.ts'
import { gainBound } from '../analysis/panelGainBound.ts'
import { loopBounds, poleBound } from '../analysis/panelLoopBounds.ts'
import type { Direction } from '../analysis/panelOptions.ts'
import type { PanelFigure } from '../analysis/panelSearch.ts'
import type { PanelBox } from '../analysis/panelSpace.ts'
import { slopeBound, steepestDrawn } from '../analysis/panelSweepBounds.ts'
import { delayRange, MAX_DELAY_MS } from '../set/delayRange.ts'
import type { ParameterSet } from '../set/types.ts'

type Directions = Readonly<Record<string, Direction>>
const law = ['sweep.law', 'sweep.shape']
const movement = [...law, 'sweep.updateEvery', 'sweep.between']
const loopKind = ['loop.delay', 'loop.interpolation', 'loop.shaper.curve']

const moving = (box: PanelBox): boolean => box.range('sweep.rateHz')[1] > 0
const depthPath = ({ sweep }: ParameterSet): string => (sweep.law === 'time' ? 'sweep.depthMs' : 'sweep.depthOctaves')

/** s at both ends of a sweep that moves. */
function sweepEnds({ set }: PanelBox): readonly [number, number] {
  const { minSweep, maxSweep } = delayRange({ ...set, sweep: { ...set.sweep, rateHz: 1 } })
  return [minSweep, maxSweep]
}

/** At rate 0 the sweep stands, inside the range it would move over; any other rate reaches all of it. */
const fromStanding = (box: PanelBox): Directions => (box.range('sweep.rateHz')[0] === 0 && moving(box) ? { 'sweep.rateHz': 'rises' } : {})

/** Where a standing sweep stands: s may do anything between. */
const STANDING: Directions = {
  'sweep.startPhase': 'any',
  'sweep.stereoPhase': 'any',
  'voices.phaseSpread': 'any',
  'voices.count': 'any',
  'sweep.seed': 'any',
}

/**
 * Samples by which the closest read passes its limit. D = base + offset + depth · s is straight in all three (quasi-convex together); the ratio law's ln D is
 * concave in base and offset and straight in depth, which serves as well. With s on both sides of 0 more depth reaches further both ways; else, and standing, each
 * read goes one way with depth, and the worst of several that each go one way is at an end.
 */
export const closestRead: PanelFigure = {
  listed: [...law, 'line.interpolation', 'loop.interpolation', 'loop.delay'],
  directions: (box) => {
    const [low, high] = sweepEnds(box)
    const spans = moving(box)
    return {
      'line.baseMs': 'falls',
      [depthPath(box.set)]: spans && low <= 0 && high >= 0 ? 'rises' : 'ends',
      'voices.spreadMs': spans ? 'rises' : 'ends',
      'loop.feedback': 'ends',
      ...(spans ? { 'voices.count': 'rises', ...fromStanding(box) } : STANDING),
    }
  },
  convex: (box) => (moving(box) ? ['line.baseMs', depthPath(box.set), 'voices.spreadMs'] : []),
  worse: (set, sampleRate) => {
    const { voices, loop, voiceLimitSamples, loopLimitSamples } = delayRange(set, sampleRate)
    const own = voiceLimitSamples - voices.minSamples
    return set.loop.feedback === 0 ? own : Math.max(own, loopLimitSamples - loop.minSamples)
  },
}

/** The same against what a line may hold, at the far end: straight in the time law; in the ratio law only one way with each. */
const farDirections = (box: PanelBox): Directions => {
  const spans = moving(box)
  return {
    'line.baseMs': 'rises',
    [depthPath(box.set)]: spans && sweepEnds(box)[1] >= 0 ? 'rises' : 'ends',
    'voices.spreadMs': spans ? 'rises' : 'ends',
    ...(spans ? { 'voices.count': 'rises', ...fromStanding(box) } : STANDING),
  }
}
const farConvex = (box: PanelBox): readonly string[] =>
  box.set.sweep.law === 'time' && moving(box) ? ['line.baseMs', 'sweep.depthMs', 'voices.spreadMs'] : []

export const longestRead: PanelFigure = {
  listed: [...law, 'loop.delay'],
  directions: (box) => ({ ...farDirections(box), 'loop.feedback': 'ends' }),
  convex: farConvex,
  worse: (set, sampleRate) => {
    const { voices, loop } = delayRange(set, sampleRate)
    const longest = set.loop.feedback === 0 ? voices.maxSamples : Math.max(voices.maxSamples, loop.maxSamples)
    return longest - (MAX_DELAY_MS * sampleRate) / 1000
  },
}

/** sweep.fusion: the longest delay of the voices, ms. */
export const longestVoice: PanelFigure = {
  listed: law,
  directions: farDirections,
  convex: farConvex,
  worse: (set) => delayRange(set, 1000).voices.maxSamples,
}

/**
 * The steepest chord of the delay over one update, rising or falling. A shape that rises once and falls once a cycle has, over a longer part of the cycle, no smaller
 * largest rise until that part is as long as the rise itself: so it grows with rate while an update takes no more than that. A ramp's jump takes the edge, the rest of
 * the cycle at least half of it. A drawn sweep's steepest piece decides while it is longer than an update; under the ratio law nothing simple holds for it. Depth scales
 * the time law's chords; under the ratio law the steepest chord ends above s = 0, where 2^(depth · s) steepens with depth. A longer edge is gentler, and
 * makes the rest of a ramp steeper. Longer delays move more under the ratio law only.
 */
function chordDirections(box: PanelBox, side: 'rise' | 'fall', sampleRate: number): Directions {
  const { set } = box
  const { shape, points, law: by } = set.sweep
  const update = set.sweep.updateEvery / sampleRate
  const part = box.range('sweep.rateHz')[1] * update
  const jump = (shape === 'rampUp' && side === 'fall') || (shape === 'rampDown' && side === 'rise')
  const short = jump && box.range('sweep.edgeMs')[0] / 1000 < update
  const steepest = shape === 'drawn' ? steepestDrawn(points, side === 'rise' ? 1 : -1).length : 0.5
  const known = part <= steepest && !short && !(shape === 'drawn' && by === 'ratio')
  const edge: Directions =
    shape === 'square'
      ? { 'sweep.edgeMs': 'falls' }
      : shape === 'rampUp' || shape === 'rampDown'
        ? { 'sweep.edgeMs': jump ? (short ? 'any' : 'falls') : 'rises' }
        : {}
  return {
    'sweep.rateHz': known ? 'rises' : 'any',
    [depthPath(set)]: shape === 'drawn' && by === 'ratio' ? 'any' : 'rises',
    ...(by === 'ratio' ? { 'line.baseMs': 'rises' } : {}),
    ...edge,
  }
}

const spreadDirections = ({ set }: PanelBox): Directions =>
  set.sweep.law === 'ratio' ? { 'voices.spreadMs': 'rises', 'voices.count': 'rises' } : {}

/** sweep.detune, cents, one side; past a stall by the slope. Standing between hops is less bad than running backwards. */
export const detuneOf = (side: 'rise' | 'fall', rate?: number): PanelFigure => ({
  listed: movement,
  directions: (box) => ({ ...chordDirections(box, side, rate ?? box.set.sampleRate), ...spreadDirections(box) }),
  worse: (set, sampleRate) => {
    const detune = sweepDetune(set, sampleRate)
    if (side === 'fall') return detune.upCents
    if (detune.downCents !== null) return -detune.downCents
    return (set.sweep.between === 'hold' && set.sweep.updateEvery > 1 ? 1e6 : 1e9) * detune.maxSlope
  },
})

const speedDirections = ({ set }: PanelBox): Directions => ({
  'sweep.rateHz': 'rises',
  [depthPath(set)]: 'rises',
  ...(['square', 'rampUp', 'rampDown'].includes(set.sweep.shape) ? { 'sweep.edgeMs': 'falls' } : {}),
})

/** Bound of the same that rises with everything but the edge. s a second. */
export const slopeCover: PanelFigure = {
  listed: movement,
  directions: (box) => ({
    ...speedDirections(box),
    ...(box.set.sweep.law === 'ratio' ? { 'line.baseMs': 'rises', ...spreadDirections(box) } : {}),
  }),
  worse: (set, sampleRate) => slopeBound(set, sampleRate, true),
}

const noLoop = (box: PanelBox): boolean => box.range('loop.feedback').every((g) => g === 0)

/**
 * The gain below 1 of which the loop is proven: |g| σ times norms. Filters: |LP| falls with a and |HP| rises with b at every frequency, so max|F| rises with
 * damping and falls with the low cut, and so does ‖f‖₁ (tried, not shown). σ = ceiling · drive · sup k(t)/t, whatever the limits and the dead zone. ε is the
 * steepest chord of the loop's read, whose base has no spread. Cross-feed does not count: its matrix has norm 1.
 */
export const loopGainOf = (side: 'rise' | 'fall', rate?: number): PanelFigure => ({
  listed: [...loopKind, ...movement],
  directions: (box) =>
    noLoop(box)
      ? {}
      : {
          ...LOOP_GAIN,
          ...(box.set.loop.delay === 'moving' ? chordDirections(box, side, rate ?? box.set.sampleRate) : {}),
        },
  worse: (set, sampleRate) => loopBounds(set, sampleRate).certified,
})

/** The same with the sweep's speed by its steepest place, which grows with rate whatever the shape. */
export const loopGainCover: PanelFigure = {
  listed: [...loopKind, ...movement],
  directions: (box) =>
    noLoop(box)
      ? {}
      : {
          ...LOOP_GAIN,
          ...(box.set.loop.delay === 'moving' ? speedDirections(box) : {}),
          ...(box.set.loop.delay === 'moving' && box.set.sweep.law === 'ratio' ? { 'line.baseMs': 'rises' } : {}),
        },
  worse: (set, sampleRate) => loopBounds(set, sampleRate, true).certified,
}

const LOOP_GAIN: Directions = {
  'loop.feedback': 'ends',
  'loop.dampingHz': 'rises',
  'loop.lowCutHz': 'falls',
  'loop.shaper.drive': 'rises',
  'loop.shaper.ceiling': 'rises',
}

type ShaperPath = 'input.shaper' | 'loop.shaper' | 'mix.shaper'

/** What a curve puts out at most, P k(v/P), against its limits: curves that only flatten rise with P, a dead zone widens with it, a drawn one may do anything. */
function limitDirections({ set }: PanelBox, path: ShaperPath): Directions {
  const shaper = path === 'loop.shaper' ? set.loop.shaper : path === 'input.shaper' ? set.input.shaper : set.mix.shaper
  const limit: Direction = shaper?.curve === 'drawn' ? 'any' : shaper?.curve === 'deadZone' ? 'falls' : 'rises'
  return { [`${path}.positive`]: limit, [`${path}.negative`]: limit, [`${path}.deadZone`]: 'falls' }
}

/** 0 where a level holds the line or its gain is below 1, 1 where neither: a bound of what can diverge. The level follows all that raises what comes back. */
export const unboundedOf: PanelFigure = {
  listed: [...loopKind, 'sweep.law', 'sweep.shape'],
  directions: (box) =>
    noLoop(box)
      ? {}
      : {
          ...LOOP_GAIN,
          ...limitDirections(box, 'loop.shaper'),
        },
  worse: (set, sampleRate) => {
    const { gain, level } = loopBounds(set, sampleRate)
    return gain < 1 ? gain : level === null ? 1e9 : 1 + level
  },
}

/** ln of a radius that no pole lies outside of; −1e9 without a loop. Low damping delays most, and so rings longest; the low cut's two terms go against each other. */
export const poleCover: PanelFigure = {
  listed: [...loopKind, ...law],
  directions: (box) =>
    noLoop(box)
      ? {}
      : {
          'loop.feedback': 'ends',
          'loop.dampingHz': 'falls',
          'loop.lowCutHz': 'ends',
          'loop.shaper.drive': 'rises',
          'loop.shaper.ceiling': 'rises',
          'loop.shaper.deadZone': 'falls',
          'line.baseMs': 'rises',
          ...(box.set.loop.delay === 'moving'
            ? moving(box)
              ? { [depthPath(box.set)]: sweepEnds(box)[1] >= 0 ? 'rises' : 'ends', ...fromStanding(box) }
              : { [depthPath(box.set)]: 'ends', 'sweep.startPhase': 'any', 'sweep.stereoPhase': 'any', 'sweep.seed': 'any' }
            : {}),
        },
  convex: farConvex,
  worse: (set, sampleRate) => poleBound(set, sampleRate) ?? -1e9,
}

/**
 * Bound of the worst gain, dB: at every frequency |dry| and |wet| √V times what the filters and the loop, reads counted as 1 with any phase, let through at most; or a shaper's
 * ceiling. Each factor goes one way: gains, drive, ceilings and limits up; the lower a low cut, the higher a high cut or damping, the more passes; √V. Straight
 * in |dry| and |wet| together. Delays do not count.
 */
export const gainCover = (place: 'peak' | 'line'): PanelFigure => ({
  listed: [...loopKind, 'line.interpolation', 'input.shaper.curve', 'mix.shaper.curve', 'mix.dryTap'],
  directions: (box) => ({
    'input.gainDb': 'rises',
    'loop.feedback': 'ends',
    'loop.dampingHz': 'rises',
    'loop.lowCutHz': 'falls',
    ...shaperDirections(box, 'input.shaper'),
    ...shaperDirections(box, 'loop.shaper'),
    ...(place === 'peak' ? { ...OUTPUT, ...shaperDirections(box, 'mix.shaper') } : {}),
  }),
  convex: () => ['mix.dry', 'mix.wet'],
  near: 0.02,
  worse: (set, sampleRate) => gainBound(set, sampleRate, place),
})

const shaperDirections = (box: PanelBox, path: ShaperPath): Directions => ({
  [`${path}.drive`]: 'rises',
  [`${path}.ceiling`]: 'rises',
  ...limitDirections(box, path),
})

const OUTPUT: Directions = {
  'mix.dry': 'ends',
  'mix.wet': 'ends',
  'mix.outputGainDb': 'rises',
  'mix.wetHighCutHz': 'rises',
  'mix.wetLowCutHz': 'falls',
  'voices.count': 'rises',
}
