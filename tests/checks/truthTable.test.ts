// The verdicts of the loop on sets whose truth is known, each also at other rates, bases, layouts, signs and positions of the cycle: a word must not hang on the set it was
// first tried on. Why each word is right stands beside its row; the rows are those by which the tool is judged from outside.
import { describe, expect, it } from 'vitest'
import { closedFigure } from '../../src/checks/closedFigures.ts'
import { CHECKS, checkInput } from '../../src/checks/registry.ts'
import type { CheckEntry, Status } from '../../src/checks/types.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { setProblems } from '../../src/set/validity.ts'
import { loopSet, shaper } from '../analysis/loopSets.ts'

type Fields = Readonly<Record<string, unknown>>

interface Row {
  readonly name: string
  readonly fields: Fields
  readonly word: string
  readonly status: Status
  /** Changes under which the word must stand. */
  readonly variations: readonly Fields[]
}

const RATES: readonly Fields[] = [{ sampleRate: 44100 }, { sampleRate: 48000 }, { sampleRate: 96000 }, { sampleRate: 192000 }]
const LAYOUTS: readonly Fields[] = [
  { layout: 'stereo' },
  { layout: 'monoToStereo' },
  { layout: 'stereo', 'loop.crossFeed': 0.3, 'sweep.stereoPhase': 90 },
  { layout: 'stereo', 'loop.crossFeed': 1, 'sweep.stereoPhase': 180 },
]
/** Slow on its way round: ε = 2π · rate · depth below 0.01 in all of them. */
const SLOW: readonly Fields[] = [
  { 'line.baseMs': 3, 'sweep.depthMs': 2, 'sweep.rateHz': 0.2 },
  { 'line.baseMs': 60, 'sweep.depthMs': 5, 'sweep.rateHz': 0.1 },
  { 'sweep.shape': 'triangle', 'sweep.rateHz': 0.5, 'sweep.depthMs': 1 },
  { 'sweep.shape': 'drift', 'sweep.rateHz': 0.5, 'sweep.depthMs': 2 },
  { 'sweep.law': 'ratio', 'sweep.depthOctaves': 0.2, 'sweep.rateHz': 0.3, 'line.baseMs': 5 },
  { 'sweep.updateEvery': 1 },
  { 'sweep.updateEvery': 64, 'sweep.startPhase': 0.4 },
  { 'voices.count': 4, 'voices.spreadMs': 2 },
  { 'loop.dampingHz': 5000 },
]
const ANY_MOVEMENT: readonly Fields[] = [
  { 'sweep.rateHz': 100, 'sweep.depthMs': 11 },
  { 'sweep.shape': 'square', 'sweep.edgeMs': 0, 'sweep.rateHz': 20 },
  { 'sweep.updateEvery': 64, 'sweep.between': 'hold', 'sweep.rateHz': 9 },
]
/** The same with the feedback turned over. */
const inverted = (feedback: number): Fields => ({ 'loop.feedback': -feedback })
/** One voice, so that only the loop reads close. */
const base: Fields = { 'voices.count': 1 }
const all = (feedback: number, ...more: readonly (readonly Fields[])[]): Fields[] => [
  ...RATES,
  ...LAYOUTS,
  inverted(feedback),
  ...more.flat(),
]

const lowCut = { 'loop.feedback': 0.99, 'loop.lowCutHz': 80, 'sweep.depthMs': 1.2, 'sweep.rateHz': 2 }
const square = { 'loop.feedback': 0.95, 'loop.interpolation': 'lagrange3', 'sweep.shape': 'square', 'sweep.edgeMs': 0 }

const TABLE: readonly Row[] = [
  {
    // A linear read never raises a peak: |g| < 1 suffices, slow sweep or not.
    name: 'linear 0.97 in a slow sweep',
    fields: { 'loop.feedback': 0.97 },
    word: 'proven',
    status: 'holds',
    variations: all(0.97, SLOW, ANY_MOVEMENT, [{ 'loop.interpolation': 'nearest' }]),
  },
  {
    // 1.25 · 0.95 > 1, but 0.95 √(1 + 2.25 ε) < 1 up to ε = 0.048.
    name: 'cubic 0.95 in a slow sweep',
    fields: { 'loop.feedback': 0.95, 'loop.interpolation': 'lagrange3' },
    word: 'proven',
    status: 'holds',
    variations: all(0.95, SLOW, [{ 'loop.interpolation': 'hermite4' }, { 'loop.shaper': shaper('tanh') }, { 'loop.lowCutHz': 60 }]),
  },
  {
    // Nothing moves: the poles decide, and the reads are passive.
    name: 'static cubic 0.99',
    fields: { 'loop.feedback': 0.99, 'loop.interpolation': 'lagrange3', 'loop.delay': 'fixed' },
    word: 'proven',
    status: 'holds',
    variations: all(0.99, ANY_MOVEMENT, [
      { 'loop.delay': 'moving', 'sweep.rateHz': 0 },
      { 'loop.delay': 'moving', 'sweep.depthMs': 0 },
      { 'loop.interpolation': 'hermite4', 'line.baseMs': 200, 'sweep.depthMs': 0 },
      { 'line.baseMs': 0.5, 'sweep.depthMs': 0.1 },
      { 'loop.lowCutHz': 200, 'loop.dampingHz': 4000 },
      { 'loop.interpolation': 'allpass1' },
    ]),
  },
  {
    // ρ∞ = 2: 0.8 < 1.
    name: 'all-pass 0.4',
    fields: { 'loop.feedback': 0.4, 'loop.interpolation': 'allpass1' },
    word: 'proven',
    status: 'holds',
    variations: all(0.4, SLOW, [{ 'sweep.rateHz': 100, 'sweep.depthMs': 11 }]),
  },
  {
    // 2 · 0.9 > 1 and no slower sweep helps: a moving all-pass read raises energy by more than 1/0.9 however slowly its fraction jumps from one end of [0.5, 1.5) to the other.
    name: 'all-pass 0.9',
    fields: { 'loop.feedback': 0.9, 'loop.interpolation': 'allpass1' },
    word: 'frozen',
    status: 'near',
    variations: all(0.9, [
      { 'line.baseMs': 3, 'sweep.depthMs': 2, 'sweep.rateHz': 0.2 },
      { 'sweep.shape': 'triangle', 'sweep.rateHz': 0.5, 'sweep.depthMs': 1 },
      { 'sweep.law': 'ratio', 'sweep.depthOctaves': 0.2 },
      { 'loop.dampingHz': 5000 },
      { 'sweep.rateHz': 5 },
    ]),
  },
  {
    // ‖f‖₁ nearly 2 and ε = 0.015: γ2 passes 1, N = 1 + 0.57 ε does not.
    name: 'low cut with 0.99 in a faster sweep',
    fields: lowCut,
    word: 'computed',
    status: 'holds',
    variations: [
      ...RATES,
      { layout: 'stereo' },
      { layout: 'monoToStereo' },
      { layout: 'stereo', 'loop.crossFeed': 0.3, 'sweep.stereoPhase': 90 },
      inverted(0.99),
      { 'loop.lowCutHz': 30 },
      { 'loop.lowCutHz': 300 },
      { 'sweep.updateEvery': 1 },
      { 'sweep.rateHz': 1.9 },
      { 'sweep.rateHz': 2.2 },
      { 'line.baseMs': 40 },
      { 'sweep.shape': 'triangle', 'sweep.rateHz': 3 },
      { 'sweep.depthMs': 0.3, 'sweep.rateHz': 8 },
      { 'loop.interpolation': 'lagrange3' },
      { 'loop.interpolation': 'hermite4' },
    ],
  },
  {
    // A hop of a hundred samples at once: no energy bound, and 1.25 · 0.95 > 1.
    name: 'hard-edged square',
    fields: square,
    word: 'frozen',
    status: 'near',
    variations: all(0.95, [
      { 'loop.interpolation': 'hermite4' },
      { 'sweep.rateHz': 5, 'sweep.depthMs': 1 },
      { 'sweep.updateEvery': 1 },
      { 'sweep.between': 'hold' },
      { 'loop.interpolation': 'linear', 'loop.lowCutHz': 60 },
      { 'loop.interpolation': 'allpass1' },
      { 'line.baseMs': 100, 'sweep.depthMs': 20 },
    ]),
  },
  {
    // DC of a loop of gain 1 stands for ever, at every position.
    name: 'feedback 1.0',
    fields: { 'loop.feedback': 1 },
    word: 'diverges',
    status: 'fails',
    variations: all(1, SLOW, ANY_MOVEMENT, [
      { 'loop.interpolation': 'lagrange3' },
      { 'loop.interpolation': 'allpass1' },
      { 'loop.delay': 'fixed' },
      { 'loop.delay': 'fixed', 'loop.interpolation': 'hermite4', 'line.baseMs': 200, 'sweep.depthMs': 1 },
      { 'sweep.rateHz': 0 },
      { 'loop.dampingHz': 2000, 'loop.delay': 'fixed' },
    ]),
  },
  {
    // 1 + 1.2 tanh A ≤ A from A = 2.169 on.
    name: 'tanh in the loop at 1.2',
    fields: { 'loop.feedback': 1.2, 'loop.shaper': shaper('tanh') },
    word: 'bounded',
    status: 'near',
    variations: all(1.2, SLOW, ANY_MOVEMENT, [
      { 'loop.interpolation': 'lagrange3' },
      { 'loop.delay': 'fixed' },
      { 'loop.lowCutHz': 60 },
      { 'loop.shaper': shaper('hardClip') },
      { 'loop.shaper': shaper('arctan', { positive: 0.5 }) },
      { 'loop.shaper': shaper('tanh', { antialias: 'adaa1' }) },
      { 'loop.feedback': 2 },
    ]),
  },
  {
    // Past the dead zone it passes 1.1 − small: a large signal grows without end.
    name: 'dead zone at 1.1',
    fields: { 'loop.feedback': 1.1, 'loop.shaper': shaper('deadZone', { deadZone: 0.1 }) },
    word: 'diverges',
    status: 'fails',
    variations: all(1.1, SLOW, [
      { 'loop.delay': 'fixed' },
      { 'loop.interpolation': 'lagrange3' },
      { 'loop.shaper': shaper('deadZone', { deadZone: 0.001 }) },
      { 'loop.shaper': shaper('deadZone', { deadZone: 0.5, antialias: 'adaa1' }) },
    ]),
  },
]

const stabilityEntry = CHECKS.find(({ id }) => id === 'loop.stability') as CheckEntry

function judged(set: ParameterSet): { value: unknown; status: Status } {
  const input = checkInput(set)
  const { value, status } = stabilityEntry.run(input) as { value: unknown; status: Status }
  // Judged alone, without words, it must be the same.
  expect(closedFigure(stabilityEntry, checkInput(set))).toEqual({ value, status })
  return { value, status }
}

describe.each(TABLE)('$name: $word', ({ fields, word, status, variations }) => {
  it('as it stands', () => {
    expect(judged(loopSet({ ...base, ...fields }))).toEqual({ value: word, status })
  })

  it.each(variations.map((variation) => [JSON.stringify(variation), variation] as const))('and with %s', (_, variation) => {
    const set = loopSet({ ...base, ...fields, ...variation })
    expect(setProblems(set)).toEqual([])
    expect(judged(set)).toEqual({ value: word, status })
  })
})
