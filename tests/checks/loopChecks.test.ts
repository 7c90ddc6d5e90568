import { describe, expect, it } from 'vitest'
import { CHECKS, checkInput, runChecks } from '../../src/checks/registry.ts'
import type { Check, CheckFunction } from '../../src/checks/types.ts'
import { withAt } from '../../src/set/path.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { loopSet, shaper } from '../analysis/loopSets.ts'

function checkOf(set: ParameterSet, id: Check['id']): Check {
  const entry = CHECKS.find((check) => check.id === id)
  if (!entry) throw new Error(`there is no ${id}`)
  return (entry.run as CheckFunction)(checkInput(set))
}

describe('loop.stability', () => {
  it.each([
    [{ 'loop.feedback': 0.97 }, 'proven', 'holds'],
    [{ 'loop.feedback': 0.99, 'loop.lowCutHz': 80, 'sweep.rateHz': 2, 'sweep.depthMs': 1.2 }, 'computed', 'holds'],
    [{ 'loop.feedback': 0.9, 'loop.interpolation': 'allpass1' }, 'frozen', 'near'],
    [{ 'loop.feedback': 1.2, 'loop.shaper': shaper('tanh') }, 'bounded', 'near'],
    [{ 'loop.feedback': 1 }, 'diverges', 'fails'],
  ])('%j is %s and %s', (fields, word, status) => {
    expect(checkOf(loopSet(fields), 'loop.stability')).toMatchObject({ value: word, status })
  })

  it('says what reaches proven, in the text and as buttons whose change does reach it', () => {
    const set = loopSet({ 'loop.feedback': 0.9, 'loop.interpolation': 'allpass1' })
    const check = checkOf(set, 'loop.stability')
    expect(check.text).toMatch(/Proven with feedback 0\.499, the loop read linearly or the loop delay fixed\.$/)
    const words = check.mend?.map(({ path, value }) => checkOf(withAt(set, path, value), 'loop.stability').value)
    expect(words).toEqual(['proven', 'proven', 'proven', 'computed'])
    expect(check.mend?.map(({ label }) => label)).toEqual([
      'Feedback 0.499',
      'Read the loop linearly',
      'Fix the loop delay',
      'Feedback 0.807 (for this sweep)',
    ])
  })

  it('states the level of a bounded loop in text and working', () => {
    const check = checkOf(loopSet({ 'loop.feedback': 1.2, 'loop.shaper': shaper('tanh') }), 'loop.stability')
    expect(check.text).toContain('within 2.169 times full scale')
    expect(check.working.at(-2)?.result).toBe('A = 2.169')
  })

  it('shows every gain it tried, with formula, numbers, result and source', () => {
    const { working } = checkOf(
      loopSet({ 'loop.feedback': 0.99, 'loop.lowCutHz': 80, 'sweep.rateHz': 2, 'sweep.depthMs': 1.2 }),
      'loop.stability',
    )
    expect(working.map(({ formula }) => formula.split(' ')[0])).toEqual(
      expect.arrayContaining(['γ∞', 'ε', 'γ2', 'N', 'γN', '|g|', 'largest']),
    )
    for (const step of working) for (const part of Object.values(step)) expect(part).not.toBe('')
  })
})

describe('loop.margin', () => {
  // The gains are closed forms: |g| σ ρ∞ ‖f‖₁, |g| √(1 + C ε), |g|.
  it.each([
    [{ 'loop.feedback': 0.5 }, -20 * Math.log10(0.5), 'holds'],
    [{ 'loop.feedback': -0.97 }, -20 * Math.log10(0.97), 'near'],
    [
      { 'loop.feedback': 0.95, 'loop.interpolation': 'lagrange3' },
      -20 * Math.log10(0.95 * Math.sqrt(1 + 2.25 * (2 * Math.PI * 0.4 * 0.0025))),
      'near',
    ],
    [{ 'loop.feedback': 0.99, 'loop.interpolation': 'lagrange3', 'loop.delay': 'fixed' }, -20 * Math.log10(0.99), 'near'],
    [{ 'loop.feedback': 1 }, 0, 'fails'],
    [{ 'loop.feedback': 1.2 }, -20 * Math.log10(1.2), 'fails'],
    [{ 'loop.feedback': 1.2, 'loop.shaper': shaper('tanh') }, -20 * Math.log10(1.2), 'near'],
    [{ 'loop.feedback': 0.4, 'loop.interpolation': 'allpass1' }, -20 * Math.log10(0.8), 'holds'],
  ])('%j: %d dB, %s', (fields, db, status) => {
    const check = checkOf(loopSet(fields), 'loop.margin')
    expect(check.status).toBe(status)
    // ε of a sweep evaluated every 16 samples is a chord, not the slope itself: a part in 10⁶.
    expect(Math.abs((check.value as number) - db)).toBeLessThan(1e-6)
  })

  it('a still loop that its poles prove does not fail though its gain passes 1: what counts is where it comes back in phase', () => {
    const still = { 'voices.count': 1, 'sweep.depthMs': 0, 'loop.delay': 'fixed', 'line.baseMs': 0.0625, 'loop.lowCutHz': 8000 }
    const set = loopSet({ ...still, 'loop.feedback': 1.02 })
    const check = checkOf(set, 'loop.margin')
    expect(checkOf(set, 'loop.stability').value).toBe('proven')
    expect(['holds', 'near']).toContain(check.status)
    expect(check.text).toContain('in phase')
    // The margin is how much more feedback it takes: a thousandth less is proven, a thousandth more diverges.
    const limit = 1.02 * 10 ** ((check.value as number) / 20)
    const word = (g: number) => checkOf(loopSet({ ...still, 'loop.feedback': g }), 'loop.stability').value
    expect([word(limit * 0.999), word(limit * 1.001)]).toEqual(['proven', 'diverges'])
  })

  it('says of a still loop that it stands still, and of a moving one what movement the margin is certified for', () => {
    const text = (fields: Record<string, unknown>) => checkOf(loopSet(fields), 'loop.margin').text
    expect(text({ 'loop.feedback': 0.9, 'loop.delay': 'fixed' })).toBe('The loop gain stays 0.92 dB below 1; the loop stands still.')
    expect(text({ 'loop.feedback': 0.9 })).toBe('The loop gain stays 0.92 dB below 1, certified for any movement.')
    expect(text({ 'loop.feedback': 0.95, 'loop.interpolation': 'lagrange3' })).toContain('certified while it moves')
  })

  it('its button leads inside the margin', () => {
    for (const fields of [
      { 'loop.feedback': -0.97 },
      { 'loop.feedback': 0.99, 'loop.lowCutHz': 80, 'sweep.rateHz': 2 },
      { 'loop.feedback': 1.3, 'loop.interpolation': 'nearest', 'loop.lowCutHz': 40 },
    ]) {
      const set = loopSet(fields)
      const [mend] = checkOf(set, 'loop.margin').mend ?? []
      expect(checkOf(withAt(set, mend?.path as string, mend?.value), 'loop.margin').status).toBe('holds')
    }
  })

  it('a set’s own limit moves limit and margin', () => {
    const set = loopSet({ 'loop.feedback': 0.9, limits: { 'loop.margin': 0.5 } })
    expect(checkOf(set, 'loop.margin')).toMatchObject({ limit: 0.5, status: 'near' })
    expect(checkOf(loopSet({ 'loop.feedback': 0.9, limits: { 'loop.margin': 3 } }), 'loop.margin').status).toBe('fails')
  })
})

describe('loop.poles and loop.ring', () => {
  it('are those of the longest whole delay: |g|^(1/D) and −3 D/(fs log10|g|)', () => {
    const set = loopSet({ 'loop.feedback': 0.97 })
    expect(checkOf(set, 'loop.poles').value).toBeCloseTo(0.97 ** (1 / 696), 14)
    const ring = checkOf(set, 'loop.ring')
    expect(ring.value).toBeCloseTo((-3 * 696) / 48000 / Math.log10(0.97), 9)
    expect(ring.status).toBe('near')
  })

  it('the ring’s button leads to 3 s', () => {
    const set = loopSet({ 'loop.feedback': -0.97, 'loop.dampingHz': 9000 })
    const [mend] = checkOf(set, 'loop.ring').mend ?? []
    const ring = checkOf(withAt(set, 'loop.feedback', mend?.value), 'loop.ring')
    expect(ring.status).toBe('holds')
    expect(ring.value).toBeGreaterThan(2.7)
  })

  it('the ring’s working lists the slowest resonances, each with its own decay', () => {
    // A damped comb: the higher the resonance the faster it dies, so the slowest are the lowest, 1/τ apart (FACTS 1: teeth at k/τ; filters move them a little).
    const fields = { 'loop.feedback': 0.9, 'loop.dampingHz': 2000, 'loop.delay': 'fixed', 'line.baseMs': 5 }
    const { working } = checkOf(loopSet(fields), 'loop.ring')
    expect(working[1]?.result).toMatch(/^0 Hz: 0\.3\d+ s; 19\d(\.\d)? Hz: 0\.\d+ s; 39\d(\.\d)? Hz: 0\.\d+ s; /)
    const seconds = [...(working[1]?.result.matchAll(/: ([\d.]+) s/g) ?? [])].map(([, s]) => Number(s))
    expect(seconds).toEqual([...seconds].sort((a, b) => b - a))
    expect(seconds).toHaveLength(5)
  })

  it('a loop that does not die away has no ring time and is near', () => {
    expect(checkOf(loopSet({ 'loop.feedback': 1.1 }), 'loop.ring')).toMatchObject({ value: null, status: 'near' })
  })

  it('crossed lines too long to search through give what was found and a bound', () => {
    const fields = { layout: 'stereo', 'line.baseMs': 180, 'sweep.depthMs': 9, 'loop.feedback': -0.9, 'loop.crossFeed': 0.3 }
    const { value, text } = checkOf(loopSet({ ...fields, 'sweep.stereoPhase': 50, 'sweep.rateHz': 0 }), 'loop.poles')
    expect(Array.isArray(value) || typeof value === 'number').toBe(true)
    if (Array.isArray(value)) {
      expect(value[0]).toBeLessThan(value[1] as number)
      expect(text).toContain('between')
    }
  })
})

it('without feedback all four hold and say so', () => {
  for (const check of runChecks(loopSet({}), { kinds: ['closed'] }).filter(({ id }) => id.startsWith('loop.'))) {
    expect(check.status).toBe('holds')
    expect(check.text).toContain('No loop')
    if (check.id !== 'loop.stability') expect(check.value).toBeNull()
    expect(check.working.map(({ result }) => result)).toEqual(['w = u: nothing comes back'])
  }
})
