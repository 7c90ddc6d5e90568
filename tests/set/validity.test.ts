import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { defaultSet, defaultShaper } from '../../src/set/defaults.ts'
import { withAt } from '../../src/set/path.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { setProblems } from '../../src/set/validity.ts'

const at = (values: Record<string, unknown>): ParameterSet =>
  Object.entries(values).reduce((set, [path, value]) => withAt(set, path, value), defaultSet())
const one = { 'voices.count': 1, 'sweep.stereoPhase': 0 }
const paths = (set: ParameterSet, rate?: number) => setProblems(set, rate).map((p) => p.path)

describe('reads before the write point', () => {
  it('names path, value, what is reached, what is needed and what would do', () => {
    const [problem] = setProblems(at({ 'line.baseMs': 3 }))
    expect(problem).toMatchObject({ path: 'line.baseMs', value: 3, range: 'at least 4.521 ms here' })
    expect(problem?.message).toBe(
      "line.baseMs 3 ms lets a voice's lagrange3 read come to -72 samples (-1.5 ms), where it needs at least 1 sample (0.02083 ms at 48000 Hz): line.baseMs must be at least 4.521 ms here",
    )
    expect(problem?.hint).toBe('set line.baseMs to 4.521, or set sweep.depthMs to 0.979, or set voices.spreadMs to 0.958')
  })

  it.each<[string, Record<string, unknown>, number]>([
    ['a voice exactly at its limit is valid', { ...one, 'line.baseMs': 1, 'sweep.depthMs': 1 - 1 / 48 }, 0],
    ['a voice a millionth of a sample closer is not', { ...one, 'line.baseMs': 1, 'sweep.depthMs': 1 - 0.999999 / 48 }, 1],
    ['linear voices reach the newest sample', { ...one, 'line.baseMs': 1, 'sweep.depthMs': 1, 'line.interpolation': 'linear' }, 0],
    [
      'a loop without feedback is not judged',
      { ...one, 'line.baseMs': 1, 'sweep.depthMs': 1, 'line.interpolation': 'linear', 'loop.feedback': 0 },
      0,
    ],
    [
      'with feedback it is: it reads before the write',
      { ...one, 'line.baseMs': 1, 'sweep.depthMs': 1, 'line.interpolation': 'linear', 'loop.feedback': 0.1 },
      1,
    ],
    [
      'a fixed loop only needs base',
      { ...one, 'line.baseMs': 1, 'sweep.depthMs': 1, 'line.interpolation': 'linear', 'loop.feedback': 0.1, 'loop.delay': 'fixed' },
      0,
    ],
    ['law ratio never reaches zero from one voice', { ...one, 'sweep.law': 'ratio', 'line.baseMs': 1, 'sweep.depthOctaves': 3 }, 0],
    ['law ratio gets too close with more octaves', { ...one, 'sweep.law': 'ratio', 'line.baseMs': 1, 'sweep.depthOctaves': 6 }, 1],
    ['a spread wider than base leaves nothing to read', { 'sweep.law': 'ratio', 'line.baseMs': 1, 'voices.spreadMs': 3 }, 1],
    ['a static comb may keep a depth it does not use', { ...one, 'sweep.rateHz': 0, 'line.baseMs': 1, 'sweep.depthMs': 5 }, 0],
    ['but not where it stands too close', { ...one, 'sweep.rateHz': 0, 'line.baseMs': 1, 'sweep.depthMs': 5, 'sweep.startPhase': 0.75 }, 1],
    [
      'a drawn sweep counts its points',
      {
        ...one,
        'sweep.shape': 'drawn',
        'sweep.points': [
          [0, 0],
          [0.5, 1],
        ],
        'line.baseMs': 1,
        'sweep.depthMs': 5,
      },
      0,
    ],
    ['and both reads may be too close at once', { ...one, 'line.baseMs': 0.01, 'sweep.depthMs': 0, 'loop.feedback': 0.5 }, 2],
  ])('%s', (_, values, count) => {
    expect(setProblems(at(values))).toHaveLength(count)
  })

  it('anti-aliasing in the loop needs half a sample more', () => {
    const close = { ...one, 'line.baseMs': 1, 'sweep.depthMs': 1 - 1.2 / 48, 'loop.feedback': 0.5 }
    const shaper = (antialias: string) => ({ ...close, 'loop.shaper': { ...defaultShaper('tanh'), antialias } })
    expect(setProblems(at(shaper('none')))).toHaveLength(0)
    expect(setProblems(at(shaper('adaa1')))[0]?.message).toContain('needs at least 1.5 samples')
  })

  it('judges at the rate it is asked about: fewer samples fit into the same time', () => {
    const set = at({ ...one, 'line.baseMs': 1, 'sweep.depthMs': 0.95 })
    expect(paths(set)).toEqual([])
    expect(paths(set, 8000)).toEqual(['line.baseMs'])
  })

  it('a delay past the longest line is refused', () => {
    const problem = setProblems(at({ ...one, 'sweep.law': 'ratio', 'line.baseMs': 500, 'sweep.depthOctaves': 5 }))[0]
    expect(problem).toMatchObject({ path: 'sweep.depthOctaves', value: 5, range: 'a largest delay of at most 4000 ms' })
  })

  it('offers no base so long that the line could not hold the far end', () => {
    // Clearing the write point needs base 125 ms + 64 · 1 sample, and six octaves up from there is more than 8 s.
    const wide = at({ 'sweep.law': 'ratio', 'sweep.depthOctaves': 6, 'voices.spreadMs': 250, 'line.baseMs': 20 })
    const mends = setProblems(wide).flatMap((problem) => problem.mends ?? [])
    expect(mends.map((mend) => mend.path)).toEqual(['voices.spreadMs'])
    expect(setProblems(withAt(wide, 'voices.spreadMs', mends[0]?.value))).toEqual([])
  })

  it('every change it offers mends what it says, whatever the set', () => {
    const ms = (max: number) => fc.double({ min: 0, max, noNaN: true })
    const values = fc.record({
      'line.baseMs': ms(5),
      'line.interpolation': fc.constantFrom('nearest', 'linear', 'lagrange3', 'hermite4', 'allpass1'),
      'loop.interpolation': fc.constantFrom('nearest', 'linear', 'lagrange3', 'hermite4', 'allpass1'),
      'sweep.depthMs': ms(8),
      'sweep.depthOctaves': ms(6),
      'sweep.law': fc.constantFrom('time', 'ratio'),
      'sweep.rateHz': fc.constantFrom(0, 1),
      'sweep.startPhase': ms(1),
      'voices.count': fc.integer({ min: 1, max: 4 }),
      'voices.spreadMs': ms(8),
      'loop.feedback': fc.constantFrom(0, 0.5),
      'loop.delay': fc.constantFrom('moving', 'fixed'),
    })
    let offered = 0
    fc.assert(
      fc.property(values, (some) => {
        const set = at(some)
        for (const problem of setProblems(set)) {
          const loop = problem.message.includes("loop's")
          for (const mend of problem.mends ?? []) {
            offered++
            const left = setProblems(withAt(set, mend.path, mend.value)).filter((p) => p.message.includes("loop's") === loop)
            expect(left).toEqual([])
          }
          if (problem.path === 'line.baseMs') expect(problem.mends?.some((mend) => mend.path === 'line.baseMs')).toBe(true)
        }
      }),
      { numRuns: 1000 },
    )
    expect(offered).toBeGreaterThan(500)
  })
})

describe('other problems between fields', () => {
  it('are found in a set that was edited, not read', () => {
    const move = { parameter: 'loop.shaper.drive', min: 1, max: 2, taper: 'linear', points: [] }
    const set: ParameterSet = {
      ...at({ 'sweep.shape': 'drawn' }),
      panel: [{ knob: 'A', position: 0, steps: 0, smoothMs: 0, moves: [move as never] }],
      limits: { 'loop.rang': 1 },
    }
    expect(paths(set)).toEqual(['sweep.points', 'panel[0].moves[0].parameter', 'limits.loop.rang'])
  })

  it('a valid set has none', () => {
    expect(setProblems(defaultSet())).toEqual([])
  })
})
