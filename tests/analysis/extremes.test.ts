// Oracles: FACTS 1 closed forms (notches (2k+1) fs/(2M) or k fs/M, feedback peaks, their levels) and a dense search that knows nothing of
// grids, cubics or parabolas: the sign of d|H|²/dω at 400 points a tooth, bisected.
import { describe, expect, it } from 'vitest'
import { type Extreme, frozenExtremes } from '../../src/analysis/extremes.ts'
import { type Frozen, freeze } from '../../src/analysis/frozen.ts'
import { transferAt, transferOf } from '../../src/analysis/transfer.ts'
import { changedSet, randomSet } from '../dsp/sets.ts'
import { combSet } from './combs.ts'

const FS = 48000
const extremesOf = (set: Parameters<typeof freeze>[0], kind: Extreme['kind'], maxHz?: number) =>
  frozenExtremes(freeze(set, 0), { maxHz }).filter((extreme) => extreme.kind === kind)
const hertz = (extremes: readonly Extreme[]) => extremes.map((extreme) => extreme.frequencyHz)

/** All multiples of `spacing` from `first` up to and including `last`. */
const ladder = (first: number, spacing: number, last: number) =>
  Array.from({ length: Math.floor((last - first) / spacing + 1e-9) + 1 }, (_, k) => first + k * spacing)

function expectAt(found: readonly number[], wanted: readonly number[], within = 0.01): void {
  expect(found.length).toBe(wanted.length)
  wanted.forEach((hz, i) => {
    expect(Math.abs(found[i]! - hz)).toBeLessThan(within)
  })
}

describe('closed forms', () => {
  it.each([5, 48, 97, 1000])('y = x + x[n−%i]: notches at (2k+1) fs/(2M), peaks at k fs/M', (samples) => {
    const set = combSet({ samples })
    expectAt(hertz(extremesOf(set, 'notch')), ladder(FS / 2 / samples, FS / samples, FS / 2))
    expectAt(hertz(extremesOf(set, 'peak')), ladder(FS / samples, FS / samples, FS / 2))
  })

  it.each([6, 48, 97])('y = x − x[n−%i]: notches at k fs/M, peaks half way', (samples) => {
    const set = combSet({ samples, wet: -1 })
    expectAt(hertz(extremesOf(set, 'notch')), ladder(FS / samples, FS / samples, FS / 2))
    expectAt(hertz(extremesOf(set, 'peak')), ladder(FS / 2 / samples, FS / samples, FS / 2))
  })

  it('y = x − x[n−48]: the null at 0 Hz, k = 0 of k fs/M, is listed where it is asked for; a mere dip there is not', () => {
    const fromDc = (wet: number) =>
      frozenExtremes(freeze(combSet({ samples: 48, wet }), 0), { fromDc: true }).filter(({ frequencyHz }) => frequencyHz === 0)
    expect(fromDc(-1).map(({ channel, kind }) => [channel, kind])).toEqual([[0, 'notch']])
    expect(fromDc(-1)[0]?.db).toBeLessThan(-250)
    expect(fromDc(-0.9)).toEqual([])
    expect(fromDc(1)).toEqual([])
    expect(hertz(extremesOf(combSet({ samples: 48, wet: -1 }), 'notch'))).not.toContain(0)
  })

  it('levels are |b0| + |bM| and ||b0| − |bM||, full nulls only where they are equal', () => {
    const uneven = frozenExtremes(freeze(combSet({ samples: 48, dry: 0.8, wet: 0.5 }), 0))
    for (const { kind, db } of uneven) expect(db).toBeCloseTo(20 * Math.log10(kind === 'peak' ? 1.3 : 0.3), 9)
    for (const { db } of extremesOf(combSet({ samples: 48 }), 'notch')) expect(db).toBeLessThan(-250)
  })

  it.each([
    [0.7, 1000],
    [0.97, 1000],
    [-0.97, 500],
  ])('feedback comb of %f: peaks from %i Hz on, 1000 Hz apart, of 1/(1 − |g|)', (feedback, first) => {
    const peaks = extremesOf(combSet({ samples: 48, dry: 1, wet: 0, tap: 'line', feedback }), 'peak', 20000)
    expectAt(hertz(peaks), ladder(first, 1000, 20000))
    for (const { db } of peaks) expect(db).toBeCloseTo(-20 * Math.log10(1 - Math.abs(feedback)), 6)
  })

  it('maxHz is included and what lies above is left out', () => {
    const set = combSet({ samples: 48 })
    expectAt(hertz(extremesOf(set, 'notch', 2600)), [500, 1500, 2500])
    expect(hertz(extremesOf(set, 'peak', 900))).toEqual([])
  })
})

describe('what is not an extreme', () => {
  it('an all-pass, a delay alone and silence have none', () => {
    const white = combSet({ samples: 400, dry: Math.SQRT1_2, wet: 1, tap: 'line', feedback: -Math.SQRT1_2 })
    for (const set of [white, combSet({ samples: 400, dry: 0 }), combSet({ samples: 48, dry: 0, wet: 0 })])
      expect(frozenExtremes(freeze(set, 0))).toEqual([])
  })

  it('a level that merely falls towards fs/2 is none, a null there is', () => {
    expect(frozenExtremes(freeze(combSet({ samples: 20.3, dry: 0 }), 0))).toEqual([])
    const [only, ...rest] = frozenExtremes(freeze(combSet({ samples: 20.5, dry: 0 }), 0))
    expect(rest).toEqual([])
    expect(only).toMatchObject({ kind: 'notch', frequencyHz: FS / 2 })
  })

  it('a maxHz that is none throws', () => {
    const frozen = freeze(combSet({ samples: 48 }), 0)
    for (const maxHz of [0, -1, FS / 2 + 1, Number.NaN]) expect(() => frozenExtremes(frozen, { maxHz })).toThrow(RangeError)
  })
})

interface Turn {
  readonly kind: Extreme['kind']
  readonly hz: number
  readonly power: number
}

/** Every sign change of d|H|²/dω on a grid of `perTooth` points a tooth, bisected to rounding. */
function denseTurns(frozen: Frozen, channel: number, maxHz: number, perTooth = 400): Turn[] {
  const transfer = transferOf(frozen)
  const out = new Float64Array(4 * frozen.channels.length)
  const sample = (omega: number) => {
    transferAt(transfer, omega, out, channel)
    const [re, im, dr, di] = out.subarray(4 * channel, 4 * channel + 4) as unknown as [number, number, number, number]
    return { power: re * re + im * im, slope: re * dr + im * di }
  }
  const toOmega = (2 * Math.PI) / frozen.sampleRate
  const count = Math.ceil((maxHz / frozen.sampleRate) * perTooth * transfer.longest)
  const step = (maxHz * toOmega) / count
  const turns: Turn[] = []
  let before = sample(step)
  for (let i = 2; i <= count; i++) {
    const here = sample(i * step)
    if (before.slope * here.slope < 0) {
      let [low, high] = [(i - 1) * step, i * step]
      for (let k = 0; k < 40; k++) {
        const middle = (low + high) / 2
        if (sample(middle).slope > 0 === before.slope > 0) low = middle
        else high = middle
      }
      turns.push({ kind: before.slope > 0 ? 'peak' : 'notch', hz: low / toOmega, power: sample(low).power })
    }
    before = here
  }
  return turns
}

/** Without neighbours of one level, which rounding makes. */
function withoutRipples(turns: readonly Turn[]): Turn[] {
  const kept: Turn[] = []
  for (const turn of turns) {
    const before = kept.at(-1)
    if (before && Math.abs(before.power - turn.power) <= 1e-5 * Math.max(before.power, turn.power)) kept.pop()
    else kept.push(turn)
  }
  return kept
}

describe('the dense search finds the same, within 0.001 Hz', () => {
  const MAX = 3500
  it.each(Array.from({ length: 40 }, (_, i) => 900 + i))('random set, seed %i', (seed) => {
    const frozen = freeze(randomSet(seed), 0.31)
    const found = frozenExtremes(frozen, { maxHz: MAX })
    frozen.channels.forEach((_, c) => {
      const own = found.filter((extreme) => extreme.channel === c)
      const turns = denseTurns(frozen, c, MAX)
      for (const { kind, hz } of withoutRipples(turns)) {
        if (hz > MAX - 0.01) continue
        expect(own.some((e) => e.kind === kind && Math.abs(e.frequencyHz - hz) < 0.001)).toBe(true)
      }
      for (const e of own) {
        const near = turns.some(({ kind, hz }) => kind === e.kind && Math.abs(e.frequencyHz - hz) < 0.001)
        // The dense grid is blind below its first point.
        expect(near || e.frequencyHz < (2 * frozen.sampleRate) / (400 * transferOf(frozen).longest)).toBe(true)
      }
    })
  })

  it('a dense comb of eight voices in a loop of 0.97, both channels', () => {
    const set = changedSet((s) => {
      s.line.baseMs = 45
      s.voices.count = 8
      s.voices.spreadMs = 10
      s.loop.feedback = 0.97
      s.loop.interpolation = 'lagrange3'
    })
    const frozen = freeze(set, 0.3)
    const found = frozenExtremes(frozen, { maxHz: MAX })
    frozen.channels.forEach((_, c) => {
      const turns = withoutRipples(denseTurns(frozen, c, MAX, 800))
      const own = found.filter((extreme) => extreme.channel === c)
      expect(turns.length).toBeGreaterThan(300)
      expect(own.length).toBe(turns.length)
      own.forEach((e, i) => {
        expect(e.kind).toBe(turns[i]!.kind)
        expect(Math.abs(e.frequencyHz - turns[i]!.hz)).toBeLessThan(0.001)
      })
    })
  })

  it('a low cut of 1 Hz behind teeth of 1 kHz is seen', () => {
    const set = { ...combSet({ samples: 48, dry: 1, wet: 0.5, feedback: 0.8 }) }
    const cut = { ...set, loop: { ...set.loop, lowCutHz: 1 } }
    const peaks = extremesOf(cut, 'peak', 2500)
    expect(peaks.length).toBe(3)
    expect(peaks[0]!.frequencyHz).toBeGreaterThan(1)
    expect(peaks[0]!.frequencyHz).toBeLessThan(100)
  })
})
