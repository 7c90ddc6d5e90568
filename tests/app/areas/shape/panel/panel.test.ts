import { describe, expect, it } from 'vitest'
import { scaleArc, ticks } from '../../../../../app/areas/shape/panel/dialPath.ts'
import { endThatHolds } from '../../../../../app/areas/shape/panel/endThatHolds.ts'
import { keyedPosition } from '../../../../../app/areas/shape/panel/keyedPosition.ts'
import { movableGroups } from '../../../../../app/areas/shape/panel/movable.ts'
import { placesWords, spokenKnob, valueWords, whyNotPanel } from '../../../../../app/areas/shape/panel/panelWords.ts'
import { committedSet, restoreDocument } from '../../../../../app/state/document.ts'
import { applyMend } from '../../../../../app/state/mend.ts'
import { atPositions, panelEditProblems } from '../../../../../app/state/panel.ts'
import { defaultSet, defaultShaper } from '../../../../../src/set/defaults.ts'
import { changeMove } from '../../../../../src/set/panelEdit.ts'
import { withAt } from '../../../../../src/set/path.ts'
import type { Move, ParameterSet } from '../../../../../src/set/types.ts'
import { setProblems } from '../../../../../src/set/validity.ts'
import { dialPathPoints } from './dialPoints.ts'

const move = (parameter: string, min: Move['min'], max: Move['max'], taper: Move['taper'] = 'linear'): Move => ({
  parameter,
  min,
  max,
  taper,
  points: [],
})
const panelOf = (set: ParameterSet, ...knobs: readonly (readonly [string, ...Move[]])[]): ParameterSet => ({
  ...set,
  panel: knobs.map(([knob, ...moves]) => ({ knob, position: 0.5, steps: 0, smoothMs: 30, moves })),
})

describe('keys of a knob', () => {
  const at = (key: string, position: number, steps = 0, fine = false) => keyedPosition(key, fine, { position, steps })

  it('arrows go a hundredth, Shift a thousandth, Page a tenth, Home and End to the ends', () => {
    expect([at('ArrowUp', 0.5), at('ArrowLeft', 0.5), at('PageUp', 0.5), at('PageDown', 0.5)]).toEqual([0.51, 0.49, 0.6, 0.4])
    expect(at('ArrowRight', 0.5, 0, true)).toBe(0.501)
    expect([at('Home', 0.5), at('End', 0.5), at('ArrowUp', 1), at('PageDown', 0.04)]).toEqual([0, 1, 1, 0])
    expect(at('a', 0.5)).toBeNull()
  })

  it('go at least one of its steps', () => {
    expect([at('ArrowUp', 0, 5), at('ArrowUp', 0.25, 5, true), at('PageUp', 0.5, 5)]).toEqual([0.25, 0.5, 0.75])
    // Oracle: of 101 steps a hundredth is one, a tenth ten.
    expect([at('ArrowUp', 0.5, 101), at('PageUp', 0.5, 101)]).toEqual([0.51, 0.6])
  })
})

describe('the drawing of a knob', () => {
  it('turns three quarters of a circle, from lower left over the top to lower right', () => {
    const [[x0, y0], [x1, y1]] = dialPathPoints(scaleArc(0, 1))
    expect(x0 + x1).toBeCloseTo(48, 1)
    expect(y0).toBeCloseTo(y1, 1)
    expect(y0).toBeGreaterThan(24)
    const [, [x, y]] = dialPathPoints(scaleArc(0, 0.5))
    expect([x, y]).toEqual([24, 4])
  })

  it('marks its steps while they can be told apart, else its ends', () => {
    expect(ticks(5).split('M')).toHaveLength(6)
    expect([ticks(0), ticks(128)].map((path) => path.split('M').length)).toEqual([3, 3])
  })
})

describe('what a knob can move', () => {
  const labels = (set: ParameterSet) => movableGroups(set).flatMap(({ options }) => options.map(({ path }) => path))

  it('is everything heard, in the groups of the path, without what is on a knob or not there', () => {
    const set = panelOf(defaultSet(), ['Speed', move('sweep.rateHz', 0.1, 10)])
    expect(movableGroups(set).map(({ label }) => label)).toEqual(['Input', 'Line and sweep', 'Voices', 'Loop', 'Mix and output'])
    expect(labels(set)).toContain('line.interpolation')
    for (const path of ['sweep.rateHz', 'loop.shaper.drive', 'loop.shaper.curve', 'sampleRate', 'target.part'])
      expect(labels(set)).not.toContain(path)
    expect(labels(withAt(set, 'loop.shaper', defaultShaper('tanh')))).toContain('loop.shaper.drive')
  })
})

describe('the panel in words', () => {
  const set = panelOf(
    defaultSet(),
    ['Speed', move('sweep.rateHz', 0.1, 10)],
    ['Blend', move('mix.wet', 0, 1), move('mix.invertRight', false, true)],
  )

  it('values as fields write them, choices by their labels, switches on and off', () => {
    expect(valueWords('sweep.rateHz', 0.4)).toBe('0.40\u00a0Hz')
    expect([valueWords('sweep.shape', 'rampUp'), valueWords('mix.invertRight', true), valueWords('loop.dampingHz', null)]).toEqual([
      'ramp up',
      'on',
      'off',
    ])
  })

  it('a knob says all it moves', () => {
    expect(spokenKnob(set, set.panel[1] as ParameterSet['panel'][number])).toBe('wet 0.7071, invert right off')
  })

  it('places by the knobs’ names', () => {
    expect(placesWords(set, [0, 1], {})).toBe('Speed at its left end; Blend at its right end')
    expect(placesWords(set, [0.25, 0.5], { 'sweep.rateHz': 2, 'mix.wet': 0.5, 'mix.invertRight': true })).toBe(
      'Speed at 0.25, 2.00\u00a0Hz; Blend at 0.50, 0.50, on',
    )
  })

  it('refusals without paths', () => {
    const why = (next: ParameterSet) => {
      const [problem] = panelEditProblems(next)
      if (!problem) throw new Error('no problem')
      return whyNotPanel(problem, next)
    }
    expect(why(changeMove(set, 0, 0, { min: 0, taper: 'log' }))).toMatch(/^A logarithmic taper goes by ratios/)
    expect(why(changeMove(set, 1, 0, { max: 9 }))).toBe('Wet takes −8 to 8')
    expect(why(panelOf(set, ['A', move('mix.wet', 0, 1)], ['B', move('mix.wet', 0, 1)]))).toBe('Wet is on knob A already')
    expect(why({ ...set, panel: set.panel.map((knob) => ({ ...knob, steps: 1 })) })).toMatch(/^Steps takes a whole number/)
  })
})

describe('the end of a knob that lets a place sound', () => {
  const base = { ...defaultSet(), voices: { ...defaultSet().voices, count: 1 }, line: { ...defaultSet().line, baseMs: 3 } }

  it('is the largest that does, on a round value, and taken it does', () => {
    const set = panelOf(base, ['Depth', move('sweep.depthMs', 0, 5)])
    const offer = endThatHolds(set, [1])
    if (!offer) throw new Error('no offer')
    expect(offer.path).toBe('panel[0].moves[0].max')
    // Oracle: 3 ms less the one sample a cubic keeps.
    expect(offer.value as number).toBeLessThanOrEqual(3 - 1000 / 48000)
    expect(offer.value as number).toBeGreaterThan(2.9)
    expect(offer.label).toMatch(/^End Depth at 2\.9\d/)
    restoreDocument({ slots: { A: set }, slot: 'A' })
    expect(applyMend(offer).ok).toBe(true)
    expect(setProblems(atPositions(committedSet(), [1]))).toEqual([])
  })

  it('of a reversed knob is its left one', () => {
    const offer = endThatHolds(panelOf(base, ['Depth', move('sweep.depthMs', 5, 0)]), [0])
    expect(offer?.path).toBe('panel[0].moves[0].min')
  })

  it('of two knobs is the one that loses less of its turn', () => {
    const set = panelOf(base, ['Base', move('line.baseMs', 20, 2.9)], ['Depth', move('sweep.depthMs', 0, 30)])
    expect(setProblems(atPositions(set, [1, 1])).length).toBeGreaterThan(0)
    const offer = endThatHolds(panelOf(base, ['Base', move('line.baseMs', 20, 2.9)], ['Depth', move('sweep.depthMs', 0, 3)]), [1, 1])
    expect(offer?.label).toMatch(/^End (Base|Depth)/)
    expect(endThatHolds(set, [1, 1])?.label).toMatch(/^End Depth/)
  })

  it('is none where no single end helps', () => {
    const set = panelOf({ ...base, line: { ...base.line, baseMs: 3 } }, ['Wet', move('mix.wet', 0, 1)])
    expect(endThatHolds(withAt(set, 'sweep.depthMs', 9), [1])).toBeNull()
  })
})
