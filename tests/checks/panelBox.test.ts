// panel.box against planted corners: sets made so that one known place is bad. Oracles are closed forms, written beside each.
import { describe, expect, it } from 'vitest'
import { panelBoxSteps } from '../../src/checks/panelBox.ts'
import { runChecks } from '../../src/checks/registry.ts'
import { getAt, withAt } from '../../src/set/path.ts'
import { setProblems } from '../../src/set/validity.ts'
import { loopSet, shaper } from '../analysis/loopSets.ts'
import { knob, move, panelBox, turned, withPanel, worstOf } from './panelSets.ts'
import { swept } from './sweepSets.ts'

const slowLoop = loopSet({ 'loop.feedback': 0.3, 'sweep.rateHz': 0.2, 'line.baseMs': 5, 'sweep.depthMs': 1 })

describe('planted corners', () => {
  // |g| > 1 with a passive read: a pole outside the circle.
  it('a feedback knob that reaches −1.05 diverges there, and its end that holds is offered', () => {
    const set = withPanel(slowLoop, [knob('Feedback', [move('loop.feedback', 0.9, -1.05)], 0.3)])
    const check = panelBox(set)
    const worst = worstOf(check, 'loop.stability')
    expect(worst).toMatchObject({ status: 'fails', value: 'diverges', at: { 'loop.feedback': -1.05 }, positions: [1] })
    expect(check).toMatchObject({ id: 'panel.box', status: 'fails', value: 'loop.stability' })
    expect(check.text).toMatch(/^Feedback at 1: diverges/)
    const mend = check.mend?.find(({ path }) => path === 'panel[0].moves[0].max')
    expect(mend?.value).toBeLessThan(-0.9)
    expect(mend?.value).toBeGreaterThan(-1)
    expect(panelBox(withAt(set, 'panel[0].moves[0].max', mend?.value)).worst?.find(({ id }) => id === 'loop.stability')?.status).toBe(
      'holds',
    )
  })

  // base − depth = 2 − 2.5 ms < 0: past the write point, where the set itself would be refused.
  it('a depth knob that reads past the write point fails sweep.range at its end', () => {
    const set = withPanel(swept(2, 1, 0.5), [knob('Depth', [move('sweep.depthMs', 0, 2.5)], 0.4)])
    expect(setProblems(set)).toEqual([])
    expect(setProblems(turned(set, [1]))).not.toEqual([])
    const check = panelBox(set)
    expect(worstOf(check, 'sweep.range')).toMatchObject({ status: 'fails', at: { 'sweep.depthMs': 2.5 }, positions: [1], by: 'corners' })
    // Room of 1 sample for the cubic and its margin of another: 2 − 2/48.
    expect(check.mend).toContainEqual(expect.objectContaining({ path: 'panel[0].moves[0].max', value: 1.95 }))
  })

  it('two knobs that are harmless alone: base and depth', () => {
    const set = withPanel(swept(8, 1, 0.5), [
      knob('Base', [move('line.baseMs', 10, 4)], 1 / 3),
      knob('Depth', [move('sweep.depthMs', 0, 5)], 0.2),
    ])
    const check = panelBox(set)
    for (const k of [0, 1])
      expect(
        setProblems(
          turned(
            set,
            [1 / 3, 0.2].map((p, i) => (i === k ? 1 : p)),
          ),
        ),
      ).toEqual([])
    expect(worstOf(check, 'sweep.range')).toMatchObject({
      status: 'fails',
      positions: [1, 1],
      at: { 'line.baseMs': 4, 'sweep.depthMs': 5 },
    })
    expect(worstOf(check, 'sweep.range').text).toMatch(/^Base at 1 and Depth at 1: /)
  })

  // g · drive = 0.9 · 2 of a curve without a ceiling (a dead zone's slope is 1 for large signals): it diverges; 0.9 · 1 and 0.5 · 2 do not.
  it('two knobs that are harmless alone: feedback and the drive of a loop shaper without a ceiling', () => {
    const loop = withAt(slowLoop, 'loop.shaper', shaper('deadZone', { deadZone: 0.1 }))
    const set = withPanel(loop, [
      knob('Feedback', [move('loop.feedback', 0, 0.9)], 0.5),
      knob('Drive', [move('loop.shaper.drive', 1, 2, { taper: 'log' })], 0),
    ])
    const stability = (positions: number[]) =>
      runChecks(turned(set, positions), { kinds: ['closed'] }).find(({ id }) => id === 'loop.stability')?.value
    expect([stability([1, 0]), stability([0.5, 1])]).toEqual(['proven', 'proven'])
    expect(worstOf(panelBox(set), 'loop.stability')).toMatchObject({ status: 'fails', value: 'diverges', positions: [1, 1] })
  })

  // Detune of a sine: 2π · rate · depth s a second.
  it('two knobs that are harmless alone: rate and depth', () => {
    const set = withPanel(swept(20, 1, 1), [
      knob('Speed', [move('sweep.rateHz', 0.1, 10, { taper: 'log' })]),
      knob('Depth', [move('sweep.depthMs', 0.1, 10, { taper: 'log' })]),
    ])
    const check = panelBox(set)
    const worst = worstOf(check, 'sweep.detune')
    expect(worst).toMatchObject({ status: 'near', positions: [1, 1], by: 'corners' })
    expect(worst.value).toBeCloseTo(-1200 * Math.log2(1 - 2 * Math.PI * 0.1), 3)
    expect(check.mend?.map(({ path }) => path)).toEqual(['panel[0].moves[0].max', 'panel[1].moves[0].max'])
  })

  it('a bad place in the middle of a turn: a drawn taper that bulges', () => {
    const points = [
      [0, 0],
      [0.3, 1],
      [1, 0.1],
    ] as const
    const set = withPanel(slowLoop, [knob('Feedback', [move('loop.feedback', 0, 1.2, { taper: 'drawn', points })], 1)])
    const worst = worstOf(panelBox(set), 'loop.stability')
    expect(worst).toMatchObject({ status: 'fails', positions: [0.3], at: { 'loop.feedback': 1.2 } })
  })

  // Rate falls 8 to 0.5 Hz (ratio 16^−t) while depth grows 0 to 8 ms (8t): rate · depth is largest where d/dt ln(t 16^−t) = 0, t = 1/ln 16.
  it('a bad place in the middle of a turn: two moves of one knob against each other', () => {
    const set = withPanel(swept(20, 1, 1), [
      knob('Character', [move('sweep.rateHz', 8, 0.5, { taper: 'log' }), move('sweep.depthMs', 0, 8)], 1),
    ])
    const worst = worstOf(panelBox(set), 'sweep.detune')
    const slope = (t: number) => (2 * Math.PI * 8 * 16 ** -t * 8 * t) / 1000
    const best = -1200 * Math.log2(1 - slope(1 / Math.log(16)))
    expect(worst.positions[0]).toBeCloseTo(1 / Math.log(16), 1)
    expect(worst).toMatchObject({ status: 'near', by: 'intervals' })
    expect(worst.value).toBeGreaterThan(best * (1 - 1e-3))
    expect(worst.value).toBeLessThan(best * (1 + 1e-6))
  })

  it('a knob that takes base along with depth is judged along its turn, not at a place it never reaches', () => {
    const set = withPanel(swept(3, 2, 0.5), [knob('Depth', [move('sweep.depthMs', 0, 4), move('line.baseMs', 1, 5)])])
    // base − depth = 1 ms wherever it stands.
    expect(worstOf(panelBox(set), 'sweep.range')).toMatchObject({ status: 'holds', by: 'corners' })
  })

  it('a choice on a knob: each of its values is looked at', () => {
    const set = withPanel(withAt(slowLoop, 'loop.feedback', 0.9), [
      knob('Quality', [move('loop.interpolation', 'nearest', 'allpass1')], 0.3),
      knob('Feedback', [move('loop.feedback', 0, 0.9)], 0.5),
    ])
    // Nothing is proven of an all-pass read at 0.9 that moves: |g| ρ∞ = 1.8.
    const worst = worstOf(panelBox(set), 'loop.stability')
    expect(worst).toMatchObject({ status: 'near', at: { 'loop.interpolation': 'allpass1', 'loop.feedback': 0.9 } })
  })

  it('a choice whose bad value is one of the middle ones, with depth on the same knob', () => {
    // square without an edge: the delay hops, and the read runs backwards.
    const set = withPanel(withAt(swept(20, 1, 1), 'sweep.edgeMs', 0), [
      knob('Shape', [move('sweep.shape', 'sine', 'rampUp'), move('sweep.depthMs', 1, 2)], 0),
    ])
    const worst = worstOf(panelBox(set), 'sweep.detune')
    expect(worst).toMatchObject({ status: 'fails', value: 'reversed' })
    expect(['square', 'rampUp']).toContain(worst.at['sweep.shape'])
  })

  it('steps do not hide what lies between: a smoothed turn passes it', () => {
    const points = [
      [0, 0],
      [0.5, 1],
      [1, 0],
    ] as const
    const set = withPanel(slowLoop, [knob('Feedback', [move('loop.feedback', 0, 1.1, { taper: 'drawn', points })], 0, { steps: 2 })])
    expect(worstOf(panelBox(set), 'loop.stability')).toMatchObject({ status: 'fails', positions: [0.5] })
  })

  it('a blend of dry and wet is worst where it bends', () => {
    // Between them both at 0.9: 1.8 of one voice in phase at 0 Hz, 5.1 dB; 1 at either end.
    const dry = [
      [0, 0],
      [0.5, 0.1],
      [1, 1],
    ] as const
    const wet = [
      [0, 0],
      [0.5, 0.9],
      [1, 1],
    ] as const
    const set = withPanel({ ...swept(5, 1, 0.5), layout: 'mono' }, [
      knob('Blend', [move('mix.dry', 1, 0, { taper: 'drawn', points: dry }), move('mix.wet', 0, 1, { taper: 'drawn', points: wet })], 0),
    ])
    const worst = worstOf(panelBox(set), 'level.peak')
    expect(worst).toMatchObject({ positions: [0.5] })
    expect(worst.value).toBeCloseTo(20 * Math.log10(1.8), 6)
  })

  it('a cut at one end of a knob that makes the loop hold no more: low cut and damping follow their own ways', () => {
    // A ring grows as damping comes down; the bound says so and holds more than any place.
    const set = withPanel(
      loopSet({ 'loop.feedback': 0.9, 'loop.dampingHz': 5000, 'sweep.rateHz': 0.1, 'line.baseMs': 10, 'sweep.depthMs': 1 }),
      [knob('Tone', [move('loop.dampingHz', 500, 20000, { taper: 'log' })])],
    )
    const worst = worstOf(panelBox(set), 'loop.ring')
    expect(worst).toMatchObject({ positions: [0], by: 'intervals', status: 'holds' })
    expect(worst.bound).toBeGreaterThanOrEqual(worst.value as number)
  })

  it('a margin that runs down to 0 dB on the way to a corner nobody can prove is found there', () => {
    // An all-pass read is proven up to |g| = ½ only; at 0.9 the held gain again shows 0.9 dB.
    const set = withPanel(loopSet({ 'loop.interpolation': 'allpass1', 'loop.feedback': 0.2, 'sweep.rateHz': 3, 'sweep.depthMs': 4 }), [
      knob('Feedback', [move('loop.feedback', 0, 0.9)], 0.3),
    ])
    const worst = worstOf(panelBox(set), 'loop.margin')
    expect(worst.status).toBe('near')
    expect(worst.value).toBeLessThan(0.01)
    expect(worst.at['loop.feedback']).toBeCloseTo(0.5, 3)
  })
})

describe('the check', () => {
  const set = withPanel(slowLoop, [
    knob('Speed', [move('sweep.rateHz', 0.05, 2, { taper: 'log' })]),
    knob('Feedback', [move('loop.feedback', -0.5, 0.5)], 0.8),
    knob('Level', [move('mix.outputGainDb', -6, 0)], 1),
  ])

  it('holds with the shape others script against', () => {
    const check = panelBox(set)
    expect(check).toMatchObject({ id: 'panel.box', status: 'holds', value: null, limit: null, label: 'Worst knob position' })
    expect(JSON.parse(JSON.stringify(check))).toEqual(check)
    expect(check.text).toMatch(/^[A-Z].*\.$/)
    for (const worst of check.worst ?? []) {
      expect(Object.keys(worst.at).sort()).toEqual(['loop.feedback', 'mix.outputGainDb', 'sweep.rateHz'])
      expect(worst.positions).toHaveLength(3)
      const there = turned(set, worst.positions)
      for (const [path, value] of Object.entries(worst.at)) expect(getAt(there, path)).toBe(value)
    }
    for (const step of check.working) for (const part of Object.values(step)) expect(part.length).toBeGreaterThan(0)
  })

  it('is the same every time, whatever was judged before', () => {
    const first = panelBox(set)
    panelBox(withAt(set, 'loop.feedback', 0.1))
    expect(panelBox(set)).toEqual(first)
  })

  it('judges what no knob moves where it is', () => {
    const loud = withAt(withAt(set, 'mix.dry', 8), 'loop.feedback', 0.4)
    expect(worstOf(panelBox({ ...loud, panel: set.panel.slice(0, 1) }), 'level.peak').status).toBe('fails')
  })

  it('a set without a panel holds and says so', () => {
    for (const panel of [[], [knob('Nothing', [])]]) {
      const check = panelBox({ ...set, panel })
      expect(check).toMatchObject({ status: 'holds', value: null, worst: [] })
      expect(check.text).toMatch(/no other positions/)
    }
  })

  it('the set’s own limit decides', () => {
    const own = { ...set, limits: { 'sweep.detune': 1 } }
    expect(worstOf(panelBox(set), 'sweep.detune').status).toBe('holds')
    expect(worstOf(panelBox(own), 'sweep.detune').status).toBe('near')
  })

  it('a note weighs nothing', () => {
    const late = withPanel(withAt(set, 'line.baseMs', 20), [knob('Lag', [move('line.baseMs', 20, 80)], 0)])
    const check = panelBox(late)
    expect(worstOf(check, 'sweep.fusion')).toMatchObject({ status: 'note', positions: [1] })
    expect(check.status).toBe('holds')
  })

  it('judges at another rate when asked', () => {
    // Base 5 ms, less 1 of depth and 2 of spread, less the cubic's sample: twice the samples at twice the rate.
    const room = (sampleRate: number) => worstOf(panelBox(set, { kinds: ['closed'], sampleRate }), 'sweep.range').value
    expect(room(96000)).toMatchObject({ roomSamples: 2 * 96 - 1 })
    expect(room(48000)).toMatchObject({ roomSamples: 2 * 48 - 1 })
    expect(() => panelBox(set, { sampleRate: 1 })).toThrow(RangeError)
  })

  // As fast as it gets, and as much of it round again: |−0.5| is more than the 0.3 of where the knob stands.
  it('renders what must be rendered where its causes are worst', () => {
    expect(worstOf(panelBox(set, {}), 'sweep.steps')).toMatchObject({ by: 'rendered corners', positions: [1, 0, 1] })
  })

  it('tells how far it is, between small steps', () => {
    const steps = panelBoxSteps(set, { kinds: ['closed'] })
    let last = -1
    for (let step = steps.next(); !step.done; step = steps.next()) {
      const { done, part, total } = step.value
      expect((done + part) / total).toBeLessThanOrEqual(1)
      expect(done).toBeGreaterThanOrEqual(last)
      last = done
    }
    expect(last).toBeGreaterThan(5)
  })
})
