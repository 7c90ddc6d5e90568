import { describe, expect, it } from 'vitest'
import { axisColumns, frequencyAt } from '../../../app/plots/columns.ts'
import { type MapRequest, mapJob, type SweepMap } from '../../../app/workers/analysisJobs/map.ts'
import { frozenExtremes } from '../../../src/analysis/extremes.ts'
import { freeze } from '../../../src/analysis/frozen.ts'
import { frozenResponse } from '../../../src/analysis/response.ts'
import { defaultSet } from '../../../src/set/defaults.ts'
import type { ParameterSet } from '../../../src/set/types.ts'
import { comb, combDb } from './combs.ts'

const rows = axisColumns(48000, 160)
function ask(set: ParameterSet, more: Partial<MapRequest> = {}): SweepMap {
  const steps = mapJob({ set, rows, positions: 40, ...more })
  for (;;) {
    const step = steps.next()
    if (step.done) return step.value
  }
}
const cell = (map: SweepMap, i: number, r: number, channel = 0) => map.channels[channel]?.[i * rows.count + r] ?? Number.NaN
const middle = (r: number) => frequencyAt(rows, (r + 0.5) / rows.count)
/** Level of the mean power of an even, dense grid over a row. */
function meanDb(set: ParameterSet, position: number, r: number): number {
  const low = frequencyAt(rows, r / rows.count)
  const high = frequencyAt(rows, (r + 1) / rows.count)
  const hz = Float64Array.from({ length: 4000 }, (_, k) => low + ((k + 0.5) / 4000) * (high - low))
  const [channel] = frozenResponse(freeze(set, position), hz)
  return 10 * Math.log10([...(channel?.db ?? [])].reduce((sum, db) => sum + 10 ** (db / 10), 0) / 4000)
}

const FLANGER = comb({ baseMs: 1, depthMs: 0.5, dry: 0.5, wet: 0.4 })

describe('a cell of the map', () => {
  // Oracle: src/analysis/response.ts, itself held to closed forms and scipy; single precision keeps 1e-5 dB.
  it('is the exact response at its middle where a tooth is wide', () => {
    const map = ask(FLANGER)
    const end = Math.floor(rows.count * 0.5)
    expect(map.meanFromHz).toBeGreaterThan(middle(end))
    for (const i of [0, 7, 20, 39]) {
      const [channel] = frozenResponse(
        freeze(FLANGER, (i + 0.5) / 40),
        Array.from({ length: end }, (_, r) => middle(r)),
      )
      for (let r = 0; r < end; r++) expect(cell(map, i, r)).toBeCloseTo(channel?.db[r] ?? Number.NaN, 4)
    }
  })

  // Oracle: the closed form of the feed-forward comb.
  it('stands at (i + ½)/positions: delay 1 + ½ sin 2πP ms', () => {
    const set = { ...FLANGER, line: { ...FLANGER.line, interpolation: 'lagrange3' as const } }
    const map = ask(set)
    for (const i of [3, 15, 31]) {
      const baseMs = 1 + 0.5 * Math.sin((2 * Math.PI * (i + 0.5)) / 40)
      for (let r = 0; r < 40; r++) expect(cell(map, i, r)).toBeCloseTo(combDb(middle(r), { baseMs, dry: 0.5, wet: 0.4 }), 3)
    }
  })

  it('is the mean power of its row where teeth are narrow: of a comb with a loop, too', () => {
    const plain = comb({ baseMs: 20, depthMs: 3, dry: 0.5, wet: 0.4 })
    const resonant = { ...plain, loop: { ...plain.loop, feedback: 0.7 } }
    for (const [set, within] of [
      [plain, 0.25],
      [resonant, 0.5],
    ] as const) {
      const map = ask(set)
      for (const i of [2, 19])
        for (const r of [90, 110, 130, 159]) expect(Math.abs(cell(map, i, r) - meanDb(set, (i + 0.5) / 40, r))).toBeLessThan(within)
    }
  })

  // 10 lg(½² + 0.4²): the mean of dry² + wet² + 2 dry wet cos over whole teeth.
  it('has the sum of powers high up, without patterns that are not there', () => {
    const map = ask(comb({ baseMs: 100, depthMs: 10, dry: 0.5, wet: 0.4 }))
    for (let i = 0; i < 40; i++) for (let r = 140; r < rows.count; r++) expect(cell(map, i, r)).toBeCloseTo(10 * Math.log10(0.41), 1)
  })
})

describe('the map of a set', () => {
  it('that stands still is one column', () => {
    for (const set of [comb({ depthMs: 0 }), { ...FLANGER, sweep: { ...FLANGER.sweep, rateHz: 0, startPhase: 0.25 } }]) {
      const map = ask(set)
      expect([map.positions, map.stands, map.channels[0]?.length]).toEqual([1, true, rows.count])
      const [channel] = frozenResponse(freeze(set, set.sweep.startPhase), [middle(20)])
      expect(cell(map, 0, 20)).toBeCloseTo(channel?.db[0] ?? Number.NaN, 4)
    }
  })

  it('says whether the channels differ, and has both', () => {
    const stereo = { ...FLANGER, layout: 'stereo' as const }
    expect(ask({ ...stereo, sweep: { ...stereo.sweep, stereoPhase: 0 } }).differs).toBe(false)
    const apart = { ...stereo, sweep: { ...stereo.sweep, stereoPhase: 90 } }
    const map = ask(apart)
    expect(map.differs).toBe(true)
    const [, right] = frozenResponse(freeze(apart, 10.5 / 40), [middle(50)])
    expect(cell(map, 10, 50, 1)).toBeCloseTo(right?.db[0] ?? Number.NaN, 4)
  })

  it('is computed in slices that let other jobs in', () => {
    const job = mapJob({ set: FLANGER, rows, positions: 40 })
    let slices = 0
    while (!job.next().done) slices += 1
    expect(slices).toBeGreaterThanOrEqual(40)
  })

  it('holds finite levels only, even of a loop at its limit and of a null', () => {
    const wild = comb({ dry: 0.5, wet: 0.5, baseMs: 2, depthMs: 1 })
    for (const set of [{ ...wild, loop: { ...wild.loop, feedback: 0.999 } }, wild])
      for (const cells of ask(set).channels) expect(cells.every((db) => Number.isFinite(db))).toBe(true)
  })
})

describe('tracks', () => {
  // Oracle: notches of 1 + ½ sin 2πP ms at (k + ½)/τ: the first from 333 to 1000 Hz.
  it('follow the notches of a comb over the whole cycle', () => {
    const set = { ...FLANGER, line: { ...FLANGER.line, interpolation: 'lagrange3' as const } }
    const notches = ask(set, { positions: 100 }).tracks.filter(({ kind }) => kind === 'notch')
    expect(notches.length).toBeGreaterThanOrEqual(4)
    notches.slice(0, 4).forEach(({ frequencyHz }, k) => {
      expect(frequencyHz).toHaveLength(101)
      frequencyHz.forEach((hz, j) => {
        const ms = 1 + 0.5 * Math.sin((2 * Math.PI * j) / 100)
        expect(hz / ((1000 * (k + 0.5)) / ms)).toBeCloseTo(1, 2)
      })
    })
    expect(Math.min(...(notches[0]?.frequencyHz ?? []))).toBeCloseTo(333.3, 0)
    expect(Math.max(...(notches[0]?.frequencyHz ?? []))).toBeCloseTo(1000, 0)
  })

  it('pass through the exact extremes of each position, with their levels', () => {
    const set = { ...defaultSet(), voices: { count: 3, phaseSpread: 360, spreadMs: 4 } }
    const { tracks } = ask(set)
    expect(tracks.length).toBeGreaterThan(3)
    for (const j of [0, 13, 29]) {
      const exact = frozenExtremes(freeze(set, j / 40), { maxHz: 2000 }).filter(({ channel }) => channel === 0)
      for (const { kind, frequencyHz, db } of tracks) {
        const hz = frequencyHz[j] as number
        if (Number.isNaN(hz) || hz > 1900) continue
        const found = exact.find((extreme) => extreme.kind === kind && Math.abs(extreme.frequencyHz - hz) < 0.05)
        expect(found).toBeDefined()
        expect(db[j]).toBeCloseTo(found?.db ?? Number.NaN, 2)
      }
    }
  })

  it('of notches that come and go between others never jump', () => {
    const set = { ...defaultSet(), voices: { count: 3, phaseSpread: 360, spreadMs: 4 } }
    for (const { frequencyHz } of ask(set, { positions: 100 }).tracks)
      for (let j = 1; j < frequencyHz.length; j++) {
        const ratio = (frequencyHz[j] as number) / (frequencyHz[j - 1] as number)
        if (!Number.isNaN(ratio)) expect(Math.abs(Math.log(ratio))).toBeLessThan(Math.log(1.5))
      }
  })

  it('find the wide teeth that a delayed dry path leaves', () => {
    // dry 3 ms late against a voice at 3 ± 0.4 ms: first notch at ½/0.4 ms = 1250 Hz and above.
    const base = comb({ baseMs: 3, depthMs: 0.4, wet: 0.4 })
    const set = { ...base, mix: { ...base.mix, dryDelayMs: 3 }, line: { ...base.line, interpolation: 'lagrange3' as const } }
    const [first] = ask(set, { positions: 100 }).tracks
    expect(first?.kind).toBe('notch')
    expect(Math.min(...(first?.frequencyHz.filter((hz) => !Number.isNaN(hz)) ?? []))).toBeCloseTo(1250, -1)
  })

  it('of a voice alone do not exist', () => {
    expect(ask(comb({ baseMs: 3, depthMs: 1, dry: 0, wet: 1 })).tracks).toEqual([])
  })
})
