// The five words on sets whose truth is known by other means, and what raises them.
import { describe, expect, it } from 'vitest'
import { stability } from '../../src/analysis/stability.ts'
import { raises, roundedDown } from '../../src/analysis/stabilityRaise.ts'
import { withAt } from '../../src/set/path.ts'
import { loopSet, shaper } from './loopSets.ts'

const lowCut = { 'loop.feedback': 0.99, 'loop.lowCutHz': 80, 'sweep.depthMs': 1.2 }

const TRUTH: readonly (readonly [string, Readonly<Record<string, unknown>>, string, string])[] = [
  ['no feedback', {}, 'proven', 'noLoop'],
  ['linear 0.97 in a slow sweep', { 'loop.feedback': 0.97 }, 'proven', 'peak'],
  [
    'linear −0.97 in any sweep',
    { 'loop.feedback': -0.97, 'sweep.rateHz': 100, 'sweep.shape': 'square', 'sweep.edgeMs': 0 },
    'proven',
    'peak',
  ],
  ['cubic 0.95 in a slow sweep', { 'loop.feedback': 0.95, 'loop.interpolation': 'lagrange3' }, 'proven', 'energy'],
  ['the other cubic too', { 'loop.feedback': 0.95, 'loop.interpolation': 'hermite4' }, 'proven', 'energy'],
  ['static cubic 0.99', { 'loop.feedback': 0.99, 'loop.interpolation': 'lagrange3', 'loop.delay': 'fixed' }, 'proven', 'poles'],
  ['a sweep standing still', { 'loop.feedback': 0.99, 'loop.interpolation': 'allpass1', 'sweep.rateHz': 0 }, 'proven', 'poles'],
  [
    'static with tanh',
    { 'loop.feedback': 0.99, 'loop.interpolation': 'allpass1', 'loop.delay': 'fixed', 'loop.shaper': shaper('tanh') },
    'proven',
    'still',
  ],
  [
    'static above 1, where the loop never comes back in phase',
    { 'loop.feedback': 1.02, 'loop.delay': 'fixed', 'line.baseMs': 0.0625, 'loop.lowCutHz': 8000 },
    'proven',
    'poles',
  ],
  ['all-pass 0.4', { 'loop.feedback': 0.4, 'loop.interpolation': 'allpass1' }, 'proven', 'peak'],
  ['low cut with 0.99 in a slow sweep', { ...lowCut, 'sweep.rateHz': 0.5 }, 'proven', 'energy'],
  ['low cut with 0.99 in a faster sweep', { ...lowCut, 'sweep.rateHz': 2 }, 'computed', 'sweep'],
  ['all-pass 0.7', { 'loop.feedback': 0.7, 'loop.interpolation': 'allpass1' }, 'computed', 'sweep'],
  ['all-pass 0.9', { 'loop.feedback': 0.9, 'loop.interpolation': 'allpass1' }, 'frozen', 'frozen'],
  ['low cut with 0.99 in a fast sweep', { ...lowCut, 'sweep.rateHz': 5 }, 'frozen', 'frozen'],
  [
    'hard-edged square',
    { 'loop.feedback': 0.9, 'loop.interpolation': 'lagrange3', 'sweep.shape': 'square', 'sweep.edgeMs': 0 },
    'frozen',
    'frozen',
  ],
  ['tanh in the loop at 1.2', { 'loop.feedback': 1.2, 'loop.shaper': shaper('tanh') }, 'bounded', 'level'],
  ['a driven arctangent at 0.5', { 'loop.feedback': 0.5, 'loop.shaper': shaper('arctan', { drive: 10 }) }, 'bounded', 'level'],
  ['tanh at 0.97', { 'loop.feedback': 0.97, 'loop.shaper': shaper('tanh') }, 'proven', 'peak'],
  ['feedback 1', { 'loop.feedback': 1 }, 'diverges', 'none'],
  ['feedback −1', { 'loop.feedback': -1, 'loop.lowCutHz': 30 }, 'diverges', 'none'],
  [
    'feedback 1, damped: DC still comes back whole',
    { 'loop.feedback': 1, 'loop.dampingHz': 3000, 'loop.delay': 'fixed' },
    'diverges',
    'none',
  ],
  ['a dead zone at 1.1', { 'loop.feedback': 1.1, 'loop.shaper': shaper('deadZone', { deadZone: 0.1 }) }, 'diverges', 'none'],
  [
    'crossed lines 0.95',
    { layout: 'stereo', 'loop.feedback': 0.95, 'loop.crossFeed': 0.4, 'loop.interpolation': 'lagrange3' },
    'proven',
    'energy',
  ],
  [
    'static crossed lines 0.999',
    { layout: 'stereo', 'loop.feedback': 0.999, 'loop.crossFeed': 0.4, 'sweep.rateHz': 0, 'loop.interpolation': 'allpass1' },
    'proven',
    'poles',
  ],
  [
    'static crossed lines 1.001',
    { layout: 'stereo', 'loop.feedback': 1.001, 'loop.crossFeed': 0.4, 'sweep.rateHz': 0 },
    'diverges',
    'none',
  ],
]

describe('the strongest word', () => {
  it.each(TRUTH)('%s', (_, fields, word, proof) => {
    const found = stability(loopSet(fields))
    expect([found.word, found.proof]).toEqual([word, proof])
  })

  it('never gets stronger with feedback', () => {
    const order = ['proven', 'computed', 'frozen', 'bounded', 'diverges']
    for (const fields of [
      { 'loop.interpolation': 'allpass1' },
      { 'loop.lowCutHz': 80, 'sweep.rateHz': 2, 'sweep.depthMs': 1.2 },
      { 'loop.shaper': shaper('tanh', { drive: 2 }), 'loop.interpolation': 'hermite4', 'sweep.rateHz': 3 },
    ]) {
      const ranks = [0.1, 0.45, 0.6, 0.8, 0.95, 0.99, 1, 1.3, 2].map((g) =>
        order.indexOf(stability(loopSet({ ...fields, 'loop.feedback': g })).word),
      )
      expect(ranks).toEqual([...ranks].sort((a, b) => a - b))
    }
  })

  it('is the same at every rate it is asked for, and at 96 kHz the same times are twice the samples', () => {
    const set = loopSet({ 'loop.feedback': 0.95, 'loop.interpolation': 'lagrange3' })
    const at96 = stability(set, 96000)
    expect(at96.word).toBe('proven')
    expect(at96.movement.maxSamples).toBeCloseTo(2 * stability(set).movement.maxSamples, 9)
    expect(at96.movement.epsilon).toBeCloseTo(stability(set).movement.epsilon, 6)
  })

  it('bounded states the level and the played line stays below it', () => {
    expect(stability(loopSet({ 'loop.feedback': 1.2, 'loop.shaper': shaper('tanh') })).level).toBeCloseTo(2.169, 3)
  })
})

describe('what raises the word', () => {
  const cases = TRUTH.filter(([, , word]) => word !== 'proven')
  it.each(cases)('%s: every change offered reaches what it says, and one is offered', (_, fields) => {
    const set = loopSet(fields)
    const changes = raises(set, set.sampleRate, stability(set))
    expect(changes.length).toBeGreaterThan(0)
    for (const { path, value, word } of changes) expect(stability(withAt(set, path, value)).word).toBe(word)
  })

  it('the feedback offered is the last that reaches it, to three digits', () => {
    for (const [, fields, word] of cases) {
      const set = loopSet(fields)
      const [change] = raises(set, set.sampleRate, stability(set)).filter(({ path }) => path === 'loop.feedback')
      const value = change?.value as number
      const more = value + Math.sign(value) * 10 ** (Math.floor(Math.log10(Math.abs(value))) - 2)
      const raised = stability(withAt(set, 'loop.feedback', more))
      expect(raised.word, word).not.toBe(change?.word)
    }
  })

  it('a proven set is left alone', () => {
    const set = loopSet({ 'loop.feedback': 0.5 })
    expect(raises(set, 48000, stability(set))).toEqual([])
  })

  it('rounds towards 0', () => {
    expect([roundedDown(1), roundedDown(0.98765), roundedDown(0.00123456), roundedDown(48.05), roundedDown(0)]).toEqual([
      0.999, 0.987, 0.00123, 48, 0,
    ])
  })
})
