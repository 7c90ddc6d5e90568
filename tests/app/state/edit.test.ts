import { beforeEach, describe, expect, it } from 'vitest'
import { offerLabel } from '../../../app/fields/fieldWords.ts'
import { currentSet } from '../../../app/state/current.ts'
import { committedSet, restoreDocument, undo, useDocument } from '../../../app/state/document.ts'
import { dropGesture, endGesture, useDraft } from '../../../app/state/draft.ts'
import { commitField, commitOffer, propose, stepName, tryField } from '../../../app/state/edit.ts'
import { roundNicely } from '../../../app/state/offers.ts'
import { defaultSet } from '../../../src/set/defaults.ts'
import { delayRange } from '../../../src/set/delayRange.ts'
import type { ParameterSet } from '../../../src/set/types.ts'
import { setProblems } from '../../../src/set/validity.ts'

/** 3.5 ± 2.5 ms, one voice: the case of the field notes. */
function narrow(): ParameterSet {
  const set = defaultSet()
  return { ...set, line: { ...set.line, baseMs: 3.5 }, voices: { ...set.voices, count: 1 }, loop: { ...set.loop, feedback: 0.5 } }
}

const steps = () => useDocument.temporal.getState().pastStates.length

beforeEach(() => {
  dropGesture()
  restoreDocument({ slots: { A: narrow() }, slot: 'A' })
})

describe('a typed value', () => {
  it('becomes one named step, and undo takes it back', () => {
    expect(commitField('sweep.rateHz', 1.5).ok).toBe(true)
    expect(committedSet().sweep.rateHz).toBe(1.5)
    expect(useDocument.getState().step.name).toBe('Rate')
    expect(undo()).toBe('Rate')
    expect(committedSet().sweep.rateHz).toBe(0.4)
  })

  it('that is the value already there is no step', () => {
    commitField('sweep.rateHz', 0.4)
    expect(steps()).toBe(0)
  })

  it('out of its range is refused with the range, and nothing changes', () => {
    const before = committedSet()
    const proposal = commitField('loop.feedback', 2.5)
    expect(proposal.ok).toBe(false)
    expect(proposal.ok ? '' : proposal.problems[0]?.range).toBe('-2 to 2')
    expect(committedSet()).toBe(before)
  })

  it('that needs a second change offers it: base 0.75 ms under a depth of 2.5 ms', () => {
    const before = committedSet()
    const proposal = commitField('line.baseMs', 0.75)
    expect(proposal.ok).toBe(false)
    expect(committedSet()).toBe(before)
    const offers = proposal.ok ? [] : proposal.offers
    expect(offers.map((offer) => offerLabel(offer))).toContain('Also set depth to 0.70 ms')
    for (const offer of offers) expect(setProblems(offer.set)).toEqual([])
  })

  it('and its offer, taken, is one step named for the field', () => {
    const proposal = propose('line.baseMs', 0.75)
    const offer = proposal.ok ? undefined : proposal.offers.find((one) => offerLabel(one).includes('depth'))
    if (!offer) throw new Error('no offer')
    commitOffer('line.baseMs', offer)
    expect(committedSet().line.baseMs).toBe(0.75)
    expect(committedSet().sweep.depthMs).toBe(0.7)
    expect(useDocument.getState().step.name).toBe('Base delay')
    expect(steps()).toBe(1)
  })

  it('that needs two more changes offers both together: three voices spread over 4 ms', () => {
    restoreDocument({ slots: { A: defaultSet() }, slot: 'A' })
    const proposal = propose('line.baseMs', 0.75)
    const [offer] = proposal.ok ? [] : proposal.offers
    if (!offer) throw new Error('no offer')
    expect(offerLabel(offer)).toMatch(/^Also set depth to 0\.\d+ ms and delay spread to 0\.\d+ ms$/)
    expect(setProblems(offer.set)).toEqual([])
    expect(offer.set.line.baseMs).toBe(0.75)
    // Oracle: depth and half the spread share what base leaves above one sample, in the proportion they had.
    const { sweep, voices } = offer.set
    expect(sweep.depthMs + voices.spreadMs / 2).toBeGreaterThan(0.75 - 1000 / 48000 - 0.1)
    expect(voices.spreadMs / sweep.depthMs).toBeCloseTo(4 / 2.5, 0)
  })

  it('offers another value of the same field as well', () => {
    const proposal = propose('sweep.depthMs', 9)
    const labels = proposal.ok ? [] : proposal.offers.map((offer) => offerLabel(offer))
    expect(labels.some((label) => /^Use .* ms instead$/.test(label))).toBe(true)
    expect(labels.some((label) => label.startsWith('Also set base delay to'))).toBe(true)
  })
})

describe('a gesture', () => {
  it('sounds and shows at once, and its end is one step', () => {
    tryField('sweep.rateHz', 1)
    tryField('sweep.rateHz', 2)
    expect(currentSet().sweep.rateHz).toBe(2)
    expect(committedSet().sweep.rateHz).toBe(0.4)
    endGesture()
    expect(committedSet().sweep.rateHz).toBe(2)
    expect(steps()).toBe(1)
  })

  it('that comes back to where it began is no step', () => {
    tryField('sweep.rateHz', 1)
    tryField('sweep.rateHz', 0.4)
    endGesture()
    expect(steps()).toBe(0)
  })

  it('dropped leaves everything as it was', () => {
    tryField('sweep.rateHz', 1)
    dropGesture()
    expect(currentSet()).toBe(committedSet())
    expect(steps()).toBe(0)
  })

  it('is held at the last valid value: base pulled down under the depth', () => {
    expect(tryField('line.baseMs', 0.1)).toBe(true)
    const set = currentSet()
    expect(setProblems(set)).toEqual([])
    // Oracle: base − depth ≥ one sample for the voices' cubic and for the loop's linear read; held within a hundredth of the way.
    const limit = 2.5 + 1000 / 48000
    expect(set.line.baseMs).toBeGreaterThanOrEqual(limit)
    expect(set.line.baseMs).toBeLessThan(limit + 0.05)
    expect(delayRange(set).voices.minSamples).toBeGreaterThanOrEqual(1)
  })

  it('on another field ends the one that ran', () => {
    tryField('sweep.rateHz', 1)
    tryField('mix.wet', 0.2)
    expect(useDraft.getState().gesture).toBe('Wet')
    expect(committedSet().sweep.rateHz).toBe(1)
    expect(committedSet().mix.wet).toBe(0.7071)
  })
})

describe('what has to come along', () => {
  it('a shaper chosen brings its defaults; off takes it out', () => {
    commitField('loop.shaper.curve', 'tanh')
    expect(committedSet().loop.shaper).toMatchObject({ curve: 'tanh', drive: 1, ceiling: 1 })
    commitField('loop.shaper.curve', null)
    expect(committedSet().loop.shaper).toBeNull()
  })

  it('a sweep that becomes drawn starts from the shape it had', () => {
    expect(commitField('sweep.shape', 'drawn').ok).toBe(true)
    const { points } = committedSet().sweep
    expect(points).toHaveLength(16)
    // Oracle: sin 2π/4 and sin 2π·3/4 at the quarter points.
    expect(points[4]).toEqual([0.25, 1])
    expect(points[12]).toEqual([0.75, -1])
  })

  it('a shaper that becomes drawn starts from its curve at the origin', () => {
    commitField('mix.shaper.curve', 'hardClip')
    expect(commitField('mix.shaper.curve', 'drawn').ok).toBe(true)
    const points = committedSet().mix.shaper?.points ?? []
    expect(points[0]).toEqual([0, 0])
    expect(points.at(-1)).toEqual([2, 1])
  })
})

describe('names and figures', () => {
  it('steps are named for their field, a shaper’s for the shaper too', () => {
    expect(stepName('line.baseMs')).toBe('Base delay')
    expect(stepName('loop.shaper.drive')).toBe('Loop shaper, drive')
    expect(stepName('loop.shaper.curve')).toBe('Loop shaper')
  })

  it.each([
    [0.7291, false, 0.7],
    [2.5209, true, 2.55],
    [0.0521, false, 0.05],
    [0.0213, true, 0.022],
  ] as const)('%d is offered as %d on the safe side', (value, up, nice) => {
    expect(roundNicely(value, up)).toBe(nice)
  })
})
