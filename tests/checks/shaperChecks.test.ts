// shaper.harmonics and shaper.alias. Oracles: the clipped-sine series and asymmetric figures of FACTS 7, the table of DESIGN 5.
import { describe, expect, it } from 'vitest'
import { foldedEnergy } from '../../src/analysis/folded.ts'
import { limitOf } from '../../src/checks/limits.ts'
import { shaperAlias } from '../../src/checks/shaperAlias.ts'
import { shaperAliasFigure } from '../../src/checks/shaperFigures.ts'
import { shaperHarmonics } from '../../src/checks/shaperHarmonics.ts'
import type { CheckFunction } from '../../src/checks/types.ts'
import { defaultSet, defaultShaper } from '../../src/set/defaults.ts'
import { withAt } from '../../src/set/path.ts'
import type { ParameterSet, Shaper } from '../../src/set/types.ts'
import { setProblems } from '../../src/set/validity.ts'
import { run } from './sweepSets.ts'

const TONE = 10 ** (-6 / 20)
const shaper = (curve: Shaper['curve'], change: Partial<Shaper> = {}): Shaper => ({ ...defaultShaper(curve), ...change })
const set = (fields: Readonly<Record<string, unknown>>): ParameterSet =>
  Object.entries(fields).reduce((whole, [path, value]) => withAt(whole, path, value), defaultSet())

interface Figures {
  readonly harmonicsDb: (number | null)[]
  readonly thdPercent: number
  readonly dc: number
}
const harmonicsOf = (whole: ParameterSet, path: string) =>
  (run(shaperHarmonics, whole).value as unknown as Record<string, Figures>)[path] as Figures

describe('shaper.harmonics', () => {
  it('a clip at half of a −6 dBFS sine has the third and fifth of the series', () => {
    const clip = set({ 'mix.shaper': shaper('hardClip', { positive: TONE / 2, negative: TONE / 2 }) })
    const { harmonicsDb, dc } = harmonicsOf(clip, 'mix.shaper')
    // FACTS 7, c = 0.5 A: 0.608998, 0.137832, 0.027566, −0.009845.
    expect(harmonicsDb[1]).toBeCloseTo(20 * Math.log10(0.137832 / 0.608998), 4)
    expect(harmonicsDb[3]).toBeCloseTo(20 * Math.log10(0.027566 / 0.608998), 3)
    expect(harmonicsDb[5]).toBeCloseTo(20 * Math.log10(0.009845 / 0.608998), 3)
    expect([harmonicsDb[0], harmonicsDb[2], dc]).toEqual([null, null, 0])
    expect(run(shaperHarmonics, clip).text).toMatch(/^The output shaper adds a 3rd harmonic of −12.91 dB to a −6 dBFS sine/)
  })

  it('unlike limits show even harmonics, and their DC with the check that judges it', () => {
    const unlike = set({ 'mix.shaper': shaper('hardClip', { positive: 0.4 * TONE, negative: 0.8 * TONE }) })
    const { harmonicsDb, dc } = harmonicsOf(unlike, 'mix.shaper')
    expect(Math.abs(dc) / TONE).toBeCloseTo(0.117, 3)
    expect(10 ** ((harmonicsDb[0] as number) / 20)).toBeCloseTo(0.118 / 0.696, 2)
    expect(
      run(shaperHarmonics, unlike)
        .working.map((step) => step.source)
        .join(),
    ).toContain('level.dc')
  })

  it('the input shaper is asked with the input gain included, every shaper listed by its path', () => {
    const three = set({
      'input.gainDb': 6,
      'input.shaper': shaper('tanh'),
      'loop.feedback': 0.4,
      'loop.shaper': shaper('tanh'),
      'mix.shaper': shaper('tanh', { drive: 10 ** (6 / 20) }),
    })
    const value = run(shaperHarmonics, three).value as unknown as Record<string, Figures>
    expect(Object.keys(value)).toEqual(['input.shaper', 'loop.shaper', 'mix.shaper'])
    expect(value['input.shaper']?.harmonicsDb[1]).toBeCloseTo(value['mix.shaper']?.harmonicsDb[1] as number, 9)
    expect(value['loop.shaper']?.harmonicsDb[1]).toBeLessThan(value['mix.shaper']?.harmonicsDb[1] as number)
    expect(run(shaperHarmonics, three).status).toBe('note')
  })
})

describe('shaper.alias', () => {
  it('holds below −70 dB, is near up to −50, fails above, or at the set’s own limit', () => {
    const status = (drive: number, limits = {}) => run(shaperAlias, { ...set({ 'mix.shaper': shaper('tanh', { drive }) }), limits }).status
    const value = (drive: number) => run(shaperAlias, set({ 'mix.shaper': shaper('tanh', { drive }) })).value
    expect(value(0.8)).toBeLessThan(-70)
    expect(value(1.2)).toBeGreaterThan(-70)
    expect(value(2)).toBeGreaterThan(-50)
    expect([status(0.8), status(1.2), status(2)]).toEqual(['holds', 'near', 'fails'])
    expect(status(2, { 'shaper.alias': -20 })).toBe('holds')
    expect(run(shaperAlias, { ...set({ 'mix.shaper': shaper('tanh') }), limits: { 'shaper.alias': -20 } }).working.at(-1)?.source).toBe(
      'the set’s own limit',
    )
  })

  it('the worst shaper counts, whichever it is, and is named', () => {
    const two = set({ 'input.shaper': shaper('tanh', { drive: 0.5 }), 'mix.shaper': shaper('hardClip', { drive: 5 }) })
    const check = run(shaperAlias, two)
    expect(check.value).toBe(foldedEnergy(shaper('hardClip', { drive: 5 }), TONE, 48000).db)
    expect(check.text).toContain('the output shaper')
    expect(check.text).toContain('the worst of 2 shapers')
    expect(check.working).toHaveLength(3)
  })

  it('a loop’s shaper counts while there is a loop, and says that what folds goes round again', () => {
    const looped = (feedback: number) => set({ 'loop.feedback': feedback, 'loop.shaper': shaper('tanh', { drive: 4 }) })
    expect(run(shaperAlias, looped(0))).toMatchObject({ status: 'holds', value: null })
    expect(run(shaperAlias, looped(0)).text).toMatch(/not heard: there is no feedback/)
    const check = run(shaperAlias, looped(0.5))
    expect(check.text).toMatch(/the loop shaper folds back −28 dB a pass\.$/)
    expect(check.working.map((step) => step.formula)).toContain('what folds goes round again')
  })

  it('anti-aliased: less, and the working has both figures, the half sample, and in a loop where it went', () => {
    const looped = (antialias: string) =>
      set({ 'loop.feedback': 0.5, 'loop.shaper': shaper('tanh', { drive: 4 }), 'loop.shaper.antialias': antialias })
    const [bare, means] = [run(shaperAlias, looped('none')), run(shaperAlias, looped('adaa1'))]
    expect(means.value).toBeLessThan(bare.value as number)
    const words = JSON.stringify(means.working)
    expect(words).toContain('without it −28 dB')
    expect(words).toContain('half a sample later')
    expect(words).toContain('the loop’s read is half a sample shorter')
    expect(means.text).toContain('anti-aliased')
  })

  it('judges at the rate asked for: a doubled rate folds less', () => {
    const clip = set({ 'mix.shaper': shaper('hardClip', { drive: 4 }) })
    expect(run(shaperAlias, clip, 96000).value).toBeLessThan(run(shaperAlias, clip).value as number)
    expect(run(shaperAlias, clip, 8000).text).toContain('3.2 kHz tone')
  })

  it('every change it offers keeps the set valid and raises the verdict; drive stays a tone', () => {
    const offered = new Set<string>()
    const rank = { fails: 0, near: 1, note: 2, holds: 2 }
    for (const [curve, drive] of [
      ['hardClip', 2.1],
      ['tanh', 1.1],
      ['tanh', 6],
      ['arctan', 1],
      ['diode', 3],
      ['deadZone', 1],
    ] as const)
      for (const path of ['input.shaper', 'loop.shaper', 'mix.shaper']) {
        const whole = set({ 'loop.feedback': 0.3, [path]: shaper(curve, { drive, deadZone: 0.1 }) })
        const check = run(shaperAlias, whole)
        expect(check.mend?.length, `${curve} × ${drive}`).toBeGreaterThan(0)
        for (const mend of check.mend ?? []) {
          const mended = withAt(whole, mend.path, mend.value)
          expect(setProblems(mended)).toEqual([])
          const after = run(shaperAlias, mended)
          expect(rank[after.status], `${mend.path} ${mend.value}`).toBeGreaterThan(rank[check.status])
          expect(after.value).not.toBeNull()
          offered.add(mend.path.split('.').at(-1) as string)
        }
      }
    expect([...offered].sort()).toEqual(['antialias', 'curve', 'deadZone', 'drive'])
  })

  it('the figure alone is the figure of the whole check', () => {
    const whole = set({ 'input.shaper': shaper('tanh', { drive: 3 }), 'mix.shaper': shaper('arctan') })
    const { status, value } = run(shaperAlias, whole)
    expect(shaperAliasFigure({ set: whole, sampleRate: 48000 })).toEqual({ status, value })
  })
})

const SETS = [
  set({}),
  set({ 'loop.shaper': shaper('tanh') }),
  set({ 'mix.shaper': shaper('hardClip') }),
  set({ 'mix.shaper': shaper('deadZone', { deadZone: 2 }) }),
  set({ 'input.shaper': shaper('diode', { ceiling: 0 }) }),
  set({ 'loop.feedback': -0.5, 'loop.shaper': shaper('hardClip', { drive: 20, negative: 0.3, antialias: 'adaa1' }) }),
]

it.each([
  ['shaper.harmonics', shaperHarmonics],
  ['shaper.alias', shaperAlias],
] as [string, CheckFunction][])('%s: label of the table, a sentence, complete working, JSON without loss', (id, check) => {
  for (const whole of SETS) {
    const found = run(check, whole)
    expect(found.id).toBe(id)
    expect(found.label).toBe(limitOf(whole, found.id).row.label)
    expect(found.text).toMatch(/^[A-Z].*\.$/)
    expect(found.working.length).toBeGreaterThan(0)
    for (const step of found.working) for (const part of Object.values(step)) expect(part.length).toBeGreaterThan(0)
    expect(JSON.parse(JSON.stringify(found))).toEqual(found)
  }
})
