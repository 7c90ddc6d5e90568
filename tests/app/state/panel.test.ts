import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { putOnKnob, putOnNewKnob, takeOffKnob } from '../../../app/areas/shape/panel/knobActs.ts'
import { offerLabel } from '../../../app/fields/fieldWords.ts'
import { currentSet } from '../../../app/state/current.ts'
import { committedSet, restoreDocument, undo, useDocument } from '../../../app/state/document.ts'
import { dropGesture, endGesture, useDraft } from '../../../app/state/draft.ts'
import { commitField, commitOffer, tryField } from '../../../app/state/edit.ts'
import { heardSet, subscribeHeard } from '../../../app/state/heard.ts'
import { applyMend } from '../../../app/state/mend.ts'
import { commitPanel, commitTurn, goToPositions, knobName, tryPanel, tryTurn } from '../../../app/state/panel.ts'
import { rampedPosition } from '../../../app/state/panelRamp.ts'
import { defaultSet } from '../../../src/set/defaults.ts'
import { changeKnob, changeMove } from '../../../src/set/panelEdit.ts'
import type { Knob, Move, ParameterSet } from '../../../src/set/types.ts'
import { setProblems } from '../../../src/set/validity.ts'

const move = (parameter: string, min: Move['min'], max: Move['max'], taper: Move['taper'] = 'linear'): Move => ({
  parameter,
  min,
  max,
  taper,
  points: [],
})
const knob = (name: string, moves: Move[], more: Partial<Knob> = {}): Knob => ({
  knob: name,
  position: 0.5,
  steps: 0,
  smoothMs: 0,
  moves,
  ...more,
})

/** One voice, 3.5 ms; Speed 0.1 to 10 Hz, Depth 0 to 5 ms (past what base leaves), Regrowth 0 to 1.05. */
function withPanel(): ParameterSet {
  const set = defaultSet()
  return {
    ...set,
    line: { ...set.line, baseMs: 3.5 },
    voices: { ...set.voices, count: 1 },
    sweep: { ...set.sweep, rateHz: 1, depthMs: 2.5 },
    loop: { ...set.loop, feedback: 0.525 },
    panel: [
      knob('Speed', [move('sweep.rateHz', 0.1, 10, 'log')]),
      knob('Depth', [move('sweep.depthMs', 0, 5)]),
      knob('Regrowth', [move('loop.feedback', 0, 1.05)], { steps: 11 }),
    ],
  }
}

const steps = () => useDocument.temporal.getState().pastStates.length
const position = (index: number) => currentSet().panel[index]?.position

/** Frames that run when the test says so, by a clock of its own. */
let now = 0
let frames: FrameRequestCallback[] = []
function frame(atMs: number) {
  now = atMs
  const due = frames
  frames = []
  for (const run of due) run(now)
}

beforeEach(() => {
  now = 0
  frames = []
  vi.stubGlobal('requestAnimationFrame', (run: FrameRequestCallback) => frames.push(run))
  vi.spyOn(performance, 'now').mockImplementation(() => now)
  dropGesture()
  restoreDocument({ slots: { A: withPanel() }, slot: 'A' })
})

afterEach(() => {
  vi.unstubAllGlobals()
  vi.restoreAllMocks()
})

describe('turning a knob', () => {
  it('is heard at once and ends as one step named for the knob', () => {
    tryTurn(0, 0.75)
    // Oracle: three quarters of two decades above 0.1 Hz.
    expect(currentSet().sweep.rateHz).toBeCloseTo(10 ** 0.5, 12)
    expect([steps(), committedSet().sweep.rateHz]).toEqual([0, 1])
    tryTurn(0, 1)
    endGesture()
    expect([steps(), committedSet().sweep.rateHz, useDocument.getState().step.name]).toEqual([1, 10, 'Speed'])
    undo()
    expect([committedSet().sweep.rateHz, position(0)]).toEqual([1, 0.5])
  })

  it('goes from step to step where it has steps', () => {
    tryTurn(2, 0.63)
    expect(position(2)).toBe(0.6)
    expect(currentSet().loop.feedback).toBeCloseTo(0.63, 12)
  })

  it('is held before a place that cannot sound, and what sounds is valid', () => {
    const problems = tryTurn(1, 1)
    expect(problems.length).toBeGreaterThan(0)
    expect(setProblems(currentSet())).toEqual([])
    // Oracle: a cubic reads no closer than one sample, so that depth ends at 3.5 ms less 1000/48000.
    expect(currentSet().sweep.depthMs).toBeLessThanOrEqual(3.5 - 1000 / 48000 + 1e-9)
    expect(currentSet().sweep.depthMs).toBeGreaterThan(3.47)
    expect(tryTurn(1, 0.2)).toEqual([])
  })

  it('of another knob ends the turn before it', () => {
    tryTurn(0, 0.75)
    tryTurn(2, 0)
    expect([steps(), useDocument.getState().step.name, useDraft.getState().gesture]).toEqual([1, 'Speed', 'Regrowth'])
  })

  it('typed is one step, refused where it cannot sound', () => {
    expect(commitTurn(0, 0)).toEqual([])
    expect([steps(), committedSet().sweep.rateHz]).toEqual([1, 0.1])
    expect(commitTurn(1, 1).length).toBeGreaterThan(0)
    expect(steps()).toBe(1)
  })

  it('that is not there throws', () => {
    expect(() => tryTurn(3, 0)).toThrow(RangeError)
  })
})

describe('a turned knob’s smoothing', () => {
  it('is heard: the value arrives smoothMs after the turn, along the knob’s curve; what is shown is there at once', () => {
    restoreDocument({ slots: { A: changeKnob(withPanel(), 0, { smoothMs: 200 }) }, slot: 'A' })
    let heard = 0
    const stop = subscribeHeard(() => heard++)
    tryTurn(0, 1)
    expect(currentSet().sweep.rateHz).toBe(10)
    expect(heardSet().sweep.rateHz).toBeCloseTo(1, 12)
    frame(100)
    // Oracle: half way from position 0.5 to 1 in ratios: 10^0.5.
    expect(heardSet().sweep.rateHz).toBeCloseTo(10 ** 0.5, 12)
    frame(150)
    expect(heardSet().sweep.rateHz).toBeCloseTo(10 ** 0.75, 12)
    frame(200)
    expect(heardSet()).toBe(currentSet())
    expect(heard).toBeGreaterThanOrEqual(4)
    stop()
  })

  it('no longer than the engine’s own glide is left to the engine', () => {
    tryTurn(0, 1)
    expect(heardSet()).toBe(currentSet())
  })

  it('goes evenly and no further than its end', () => {
    expect([0, 0.25, 1, 2].map((part) => Number(rampedPosition(0.2, 0.6, part).toFixed(12)))).toEqual([0.2, 0.3, 0.6, 0.6])
  })
})

describe('editing the panel', () => {
  it('is one named step for each edit, none for none', () => {
    expect(commitPanel('Knob Rate', (set) => changeKnob(set, 0, { knob: 'Rate' }))).toEqual([])
    expect(commitPanel('Knob Rate', (set) => changeKnob(set, 0, { knob: 'Rate' }))).toEqual([])
    expect([steps(), useDocument.getState().step.name]).toEqual([1, 'Knob Rate'])
  })

  it('is refused where a knob’s own field or its moves are out of range, and nothing changes', () => {
    const before = committedSet()
    for (const edit of [
      (set: ParameterSet) => changeKnob(set, 0, { steps: 1 }),
      (set: ParameterSet) => changeKnob(set, 0, { smoothMs: 5001 }),
      (set: ParameterSet) => changeKnob(set, 0, { knob: 'x'.repeat(41) }),
      (set: ParameterSet) => changeMove(set, 0, 0, { min: 0 }),
      (set: ParameterSet) => changeMove(set, 2, 0, { max: 3 }),
    ])
      expect(commitPanel('x', edit)).toHaveLength(1)
    expect(committedSet()).toBe(before)
  })

  it('within a gesture stays at what was tried last when the next cannot stand', () => {
    tryPanel('Depth, depth', (set) => changeMove(set, 1, 0, { max: 4 }))
    expect(tryPanel('Depth, depth', (set) => changeMove(set, 1, 0, { max: 4000 })).length).toBeGreaterThan(0)
    endGesture()
    expect([steps(), committedSet().panel[1]?.moves[0]?.max]).toEqual([1, 4])
  })

  it('names a knob that has no name by its place', () => {
    expect([knobName({ knob: ' ' }, 2), knobName({ knob: 'Tone' }, 2)]).toEqual(['Knob 3', 'Tone'])
  })
})

describe('fields and their knobs', () => {
  it('a typed value turns the knob of its own, in the same step', () => {
    expect(commitField('sweep.rateHz', 0.1).ok).toBe(true)
    expect([steps(), position(0)]).toEqual([1, 0])
    undo()
    expect([committedSet().sweep.rateHz, position(0)]).toEqual([1, 0.5])
  })

  it('so does a dragged one', () => {
    tryField('sweep.rateHz', 10)
    expect([position(0), committedSet().panel[0]?.position]).toEqual([1, 0.5])
  })

  it('a value past the knob’s end leaves the knob', () => {
    commitField('sweep.rateHz', 15)
    expect([committedSet().sweep.rateHz, position(0)]).toEqual([15, 0.5])
  })

  it('is put on a knob of its own, on one that is there, and taken off: a step each, and nothing that sounds changes', () => {
    const before = committedSet()
    expect(putOnNewKnob('line.baseMs')).toEqual([])
    expect(committedSet().panel.at(-1)).toMatchObject({ knob: 'Base delay', moves: [{ parameter: 'line.baseMs' }] })
    expect(putOnKnob('mix.wet', 0)).toEqual([])
    expect(committedSet().panel[0]?.moves.map(({ parameter }) => parameter)).toEqual(['sweep.rateHz', 'mix.wet'])
    expect(takeOffKnob('line.baseMs')).toEqual([])
    expect(committedSet().panel).toHaveLength(3)
    expect(steps()).toBe(3)
    expect({ ...committedSet(), panel: null }).toEqual({ ...before, panel: null })
  })

  it('a shaper that a knob moves goes only with the offer to take it off the panel', () => {
    commitField('loop.shaper.curve', 'tanh')
    putOnNewKnob('loop.shaper.drive')
    const proposal = commitField('loop.shaper.curve', null)
    const [offer] = proposal.ok ? [] : proposal.offers
    if (!offer) throw new Error('no offer')
    expect(offerLabel(offer)).toBe('Also take it off the panel')
    commitOffer('loop.shaper.curve', offer)
    expect([committedSet().loop.shaper, committedSet().panel.length]).toEqual([null, 3])
  })

  it('a field that is off is switched on with it; one that shares a knob gets its own', () => {
    putOnNewKnob('loop.dampingHz')
    expect(committedSet().loop.dampingHz).toBeGreaterThan(0)
    putOnKnob('mix.wet', 0)
    putOnNewKnob('mix.wet')
    expect(committedSet().panel.map(({ moves }) => moves.length)).toEqual([1, 1, 1, 1, 1])
  })
})

describe('what panel.box offers', () => {
  it('going to a place turns every knob there, as one step', () => {
    expect(goToPositions('Go to loop margin', [1, 0, 1])).toEqual([])
    const set = committedSet()
    expect([set.sweep.rateHz, set.sweep.depthMs, set.loop.feedback]).toEqual([10, 0, 1.05])
    expect(set.panel.map((one) => one.position)).toEqual([1, 0, 1])
    expect([steps(), useDocument.getState().step.name]).toEqual([1, 'Go to loop margin'])
  })

  it('a place that cannot sound is refused and nothing turns', () => {
    const before = committedSet()
    expect(goToPositions('x', [1, 1, 1]).length).toBeGreaterThan(0)
    expect(committedSet()).toBe(before)
  })

  it('the end of a knob as mend is one step; the value there stays, or comes in with the end', () => {
    const proposal = applyMend({ label: 'End Regrowth at 0.94', path: 'panel[2].moves[0].max', value: 0.94 })
    expect(proposal.ok).toBe(true)
    expect([steps(), useDocument.getState().step.name, committedSet().panel[2]?.moves[0]?.max]).toEqual([1, 'End Regrowth at 0.94', 0.94])
    expect(committedSet().loop.feedback).toBe(0.525)
    expect(position(2)).toBeCloseTo(0.525 / 0.94, 12)
    applyMend({ label: 'x', path: 'panel[2].moves[0].max', value: 0.4 })
    expect([committedSet().loop.feedback, position(2)]).toEqual([0.4, 1])
  })
})
