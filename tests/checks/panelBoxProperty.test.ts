// What panel.box says of all positions, against positions drawn at random: never is a figure there worse than what was stated.
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { sweepDetune } from '../../src/analysis/detune.ts'
import { panelSpace } from '../../src/analysis/panelSpace.ts'
import { closedFigure } from '../../src/checks/closedFigures.ts'
import type { CheckId } from '../../src/checks/limits.ts'
import { panelLine, panelPeak } from '../../src/checks/panelBoxLevels.ts'
import { type PanelFinding, type PanelJudge, panelLook, rankOf } from '../../src/checks/panelBoxLook.ts'
import { panelMargin, panelPoles, panelRing, panelStability } from '../../src/checks/panelBoxLoop.ts'
import { panelDetune, panelFusion, panelRange } from '../../src/checks/panelBoxSweep.ts'
import { CHECKS } from '../../src/checks/registry.ts'
import type { CheckEntry, CheckValue, Figure } from '../../src/checks/types.ts'
import { delayRange, MAX_DELAY_MS } from '../../src/set/delayRange.ts'
import type { Knob, ParameterSet } from '../../src/set/types.ts'
import { createRandom } from '../../src/signal/random.ts'
import { loopSet, shaper } from '../analysis/loopSets.ts'
import { anyPanelSet, drain, knob, move, turned, withPanel } from './panelSets.ts'

const entryOf = (id: CheckId): CheckEntry => CHECKS.find((entry) => entry.id === id) as CheckEntry

interface Stated {
  readonly finding: PanelFinding
  readonly figure: Figure
  /** What no position may pass. */
  readonly limit: CheckValue
  readonly status: Figure['status']
}

function stated(set: ParameterSet, judge: PanelJudge, id: CheckId): Stated {
  const look = panelLook(panelSpace(set))
  const finding = drain(judge(look, entryOf(id)))
  const figure = look.figureAt(entryOf(id), finding.positions)
  const status = finding.bound && rankOf(finding.bound.status) > rankOf(figure.status) ? finding.bound.status : figure.status
  return { finding, figure, limit: finding.bound ? finding.bound.value : figure.value, status }
}

/** Positions: the corners now and then, anything else mostly. */
const positionsOf = (panel: readonly Knob[], next: () => number): number[] =>
  panel.map(() => {
    const dice = next()
    return dice < 0.15 ? 0 : dice < 0.3 ? 1 : next()
  })

const figureAt = (set: ParameterSet, id: CheckId): Figure => closedFigure(entryOf(id), { set, sampleRate: set.sampleRate })
const slack = (value: number) => 1e-6 * Math.max(1, Math.abs(value)) + 1e-4 * Math.abs(value)

describe('no position is worse than what is stated', () => {
  it('sweep.range, sweep.fusion: any set, any panel', () => {
    let known = 0
    fc.assert(
      fc.property(anyPanelSet, fc.nat(), (set, seed) => {
        const next = createRandom(seed)
        const range = stated(set, panelRange, 'sweep.range')
        const fusion = stated(set, panelFusion, 'sweep.fusion')
        if (range.finding.by === 'samples' || fusion.finding.by === 'samples') return
        known++
        // Too long is judged with too close: the lesser room of both.
        const roomOf = ({ value }: Figure): number => {
          const { roomSamples, largestMs } = value as { roomSamples: number; largestMs: number }
          return Math.min(roomSamples, ((MAX_DELAY_MS - largestMs) * set.sampleRate) / 1000)
        }
        const room = range.finding.bound ? (range.limit as { roomSamples: number }).roomSamples : roomOf(range.figure)
        for (let i = 0; i < 40; i++) {
          const there = turned(set, positionsOf(set.panel, next))
          const figure = figureAt(there, 'sweep.range')
          expect(roomOf(figure)).toBeGreaterThanOrEqual(room - slack(room))
          expect(rankOf(figure.status)).toBeLessThanOrEqual(rankOf(range.status))
          expect(delayRange(there, 1000).voices.maxSamples).toBeLessThanOrEqual((fusion.limit as number) + slack(fusion.limit as number))
        }
      }),
      { numRuns: 150 },
    )
    expect(known).toBeGreaterThan(100)
  })

  it('sweep.detune: any set, any panel', () => {
    let known = 0
    fc.assert(
      fc.property(anyPanelSet, fc.nat(), (set, seed) => {
        const next = createRandom(seed)
        const detune = stated(set, panelDetune, 'sweep.detune')
        if (detune.finding.by === 'samples') return
        known++
        for (let i = 0; i < 25; i++) {
          const there = turned(set, positionsOf(set.panel, next))
          const { maxCents } = sweepDetune(there)
          if (typeof detune.limit === 'number')
            expect(maxCents ?? Number.POSITIVE_INFINITY).toBeLessThanOrEqual(detune.limit + slack(detune.limit))
        }
      }),
      { numRuns: 80 },
    )
    expect(known).toBeGreaterThan(50)
  })

  const gain = fc.double({ min: -1.1, max: 1.1, noNaN: true })
  const hz = fc.double({ min: 20, max: 20000, noNaN: true })
  /** A loop as effects have one, with knobs on most of what its figures depend on, some of them two on one. */
  const anyLoopPanel: fc.Arbitrary<ParameterSet> = fc
    .record({
      kind: fc.constantFrom('nearest', 'linear', 'lagrange3', 'hermite4', 'allpass1'),
      shape: fc.constantFrom('sine', 'triangle', 'square', 'rampUp', 'drift'),
      delay: fc.constantFrom('moving', 'moving', 'fixed'),
      curve: fc.constantFrom(null, null, 'tanh', 'deadZone'),
      ends: fc.tuple(gain, gain),
      damping: fc.tuple(hz, hz),
      lowCut: fc.option(fc.tuple(hz, hz)),
      rate: fc.tuple(fc.double({ min: 0.05, max: 5, noNaN: true }), fc.double({ min: 0.05, max: 5, noNaN: true })),
      depth: fc.double({ min: 0, max: 4, noNaN: true }),
      joined: fc.boolean(),
      between: fc.constantFrom('ramp', 'hold'),
    })
    .map(({ kind, shape, delay, curve, ends, damping, lowCut, rate, depth, joined, between }) => {
      const set = loopSet({
        'loop.interpolation': kind,
        'loop.delay': delay,
        'loop.shaper': curve && shaper(curve, { drive: 1.3, deadZone: curve === 'deadZone' ? 0.2 : 0 }),
        'sweep.shape': shape,
        'sweep.between': between,
        'line.baseMs': 6,
        'voices.spreadMs': 1,
      })
      const moves = [
        move('loop.feedback', ends[0], ends[1]),
        move('loop.dampingHz', damping[0], damping[1], { taper: 'log' }),
        move('sweep.rateHz', rate[0], rate[1], { taper: 'log' }),
        move('sweep.depthMs', 0, depth),
        ...(lowCut ? [move('loop.lowCutHz', lowCut[0], lowCut[1], { taper: 'log' })] : []),
      ]
      const knobs = joined
        ? [knob('Both', moves.slice(0, 2)), ...moves.slice(2).map((own, i) => knob(`K${i}`, [own]))]
        : moves.map((own, i) => knob(`K${i}`, [own]))
      return withPanel(set, knobs)
    })

  const WORDS = ['proven', 'computed', 'frozen', 'bounded', 'diverges']

  it('loop.stability, loop.margin: loops under any of their knobs', () => {
    let sure = 0
    fc.assert(
      fc.property(anyLoopPanel, fc.nat(), (set, seed) => {
        const next = createRandom(seed)
        const word = stated(set, panelStability, 'loop.stability')
        const margin = stated(set, panelMargin, 'loop.margin')
        const worst = WORDS.indexOf(String(word.limit))
        if (worst < 4) sure++
        for (let i = 0; i < 6; i++) {
          const there = turned(set, positionsOf(set.panel, next))
          const { value } = figureAt(there, 'loop.stability')
          expect(WORDS.indexOf(String(value)), `${value} where ${word.limit} is stated`).toBeLessThanOrEqual(worst)
          const db = figureAt(there, 'loop.margin').value
          if (typeof margin.limit === 'number' && typeof db === 'number') expect(db).toBeGreaterThanOrEqual(margin.limit - 1e-3)
        }
      }),
      { numRuns: 40 },
    )
    expect(sure).toBeGreaterThan(5)
  })

  it('loop.ring, loop.poles: loops under any of their knobs', () => {
    fc.assert(
      fc.property(anyLoopPanel, fc.nat(), (set, seed) => {
        const next = createRandom(seed)
        const ring = stated(set, panelRing, 'loop.ring')
        const poles = stated(set, panelPoles, 'loop.poles')
        for (let i = 0; i < 6; i++) {
          const there = turned(set, positionsOf(set.panel, next))
          const seconds = figureAt(there, 'loop.ring')
          expect(rankOf(seconds.status)).toBeLessThanOrEqual(rankOf(ring.status))
          if (typeof ring.limit === 'number' && typeof seconds.value === 'number')
            expect(seconds.value).toBeLessThanOrEqual(ring.limit * (1 + 1e-9))
          const radius = figureAt(there, 'loop.poles').value
          if (poles.finding.by !== 'samples' && typeof radius === 'number')
            expect(radius).toBeLessThanOrEqual((poles.limit as number) + 1e-12)
        }
      }),
      { numRuns: 40 },
    )
  })

  it('level.peak, level.line: loops and mixes under any of their knobs', () => {
    fc.assert(
      fc.property(anyLoopPanel, gain, gain, fc.nat(), (loop, dry, wet, seed) => {
        const next = createRandom(seed)
        const blend = knob('Blend', [move('mix.dry', dry, 0), move('mix.wet', 0, wet)])
        const set = withPanel(loop, [...loop.panel, blend])
        for (const [id, judge] of [
          ['level.peak', panelPeak],
          ['level.line', panelLine],
        ] as const) {
          const level = stated(set, judge, id)
          for (let i = 0; i < 3; i++) {
            const { value } = figureAt(turned(set, positionsOf(set.panel, next)), id)
            if (typeof level.limit === 'number') expect(value ?? Number.POSITIVE_INFINITY).toBeLessThanOrEqual(level.limit + 0.03)
          }
        }
      }),
      { numRuns: 20 },
    )
  })
})
