// sweep.steps. Oracle: DESIGN 5 (near above −60 dB, fails above −40 dB) and the measurement, which tests/outside/artefacts.test.ts holds to numpy.
import { describe, expect, it } from 'vitest'
import { limitOf } from '../../src/checks/limits.ts'
import { CHECKS } from '../../src/checks/registry.ts'
import { sweepSteps, sweepStepsFigure } from '../../src/checks/sweepSteps.ts'
import type { Check } from '../../src/checks/types.ts'
import { defaultSet } from '../../src/set/defaults.ts'
import { withAt } from '../../src/set/path.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { drain } from '../analysis/artefactTools.ts'
import { swept } from './sweepSets.ts'

const run = (set: ParameterSet): Check => drain(sweepSteps({ set, sampleRate: set.sampleRate }))

const with_ = (set: ParameterSet, changes: Readonly<Record<string, unknown>>): ParameterSet =>
  Object.entries(changes).reduce((changed, [path, value]) => withAt(changed, path, value as number), set)

describe('sweep.steps', () => {
  const smooth = swept(5, 1, 1)

  it('is rendered, and judged as the table says', () => {
    expect(CHECKS.find(({ id }) => id === 'sweep.steps')?.kind).toBe('rendered')
    const found = run(smooth)
    expect(found).toMatchObject({ status: 'holds', limit: -40, unit: 'dB', label: limitOf(smooth, 'sweep.steps').row.label })
    expect(found.value).toBeLessThan(-60)
    expect(found.mend).toBeUndefined()
    expect(found.text).toMatch(/dB below the wet signal; the voices’ lagrange3 read leaves most/)
  })

  it('a whole-sample read fails, a linear one is near, and the change that helps is offered and helps', () => {
    const nearest = run(with_(smooth, { 'line.interpolation': 'nearest' }))
    expect(nearest.status).toBe('fails')
    const linear = run(with_(smooth, { 'line.interpolation': 'linear' }))
    expect(linear.status).toBe('near')
    for (const { mend } of [nearest, linear]) {
      expect(mend?.map(({ path }) => path)).toEqual(['line.interpolation'])
      for (const { path, value } of mend ?? []) expect(run(with_(smooth, { [path]: value })).status).toBe('holds')
    }
  })

  it('a delay held too long fails, updates are to blame, and each single change offered raises the status', () => {
    const held = with_(smooth, { 'sweep.updateEvery': 64, 'sweep.between': 'hold', 'sweep.rateHz': 3 })
    const found = run(held)
    expect(found.status).toBe('fails')
    expect(found.text).toMatch(/holding the delay for 64 samples leaves most/)
    expect(found.mend?.map(({ path }) => path)).toEqual(['sweep.updateEvery', 'sweep.between'])
    for (const { path, value } of found.mend ?? []) expect(['holds', 'near']).toContain(run(with_(held, { [path]: value })).status)
  })

  it('where two fields are needed none is offered alone, and the working says so', () => {
    const found = run(
      with_(smooth, { 'line.interpolation': 'nearest', 'sweep.updateEvery': 64, 'sweep.between': 'hold', 'sweep.rateHz': 8 }),
    )
    expect(found.status).toBe('fails')
    expect(found.mend).toBeUndefined()
    expect(found.working.find(({ formula }) => formula.startsWith('cheapest'))?.result).toMatch(/fields together/)
  })

  it('stands, jumps or is silent: nothing to measure, and it holds', () => {
    for (const changes of [
      { 'sweep.rateHz': 0 },
      { 'sweep.depthMs': 0 },
      { 'sweep.shape': 'square', 'sweep.edgeMs': 0 },
      { 'mix.wet': 0 },
    ]) {
      const found = run(with_(smooth, changes))
      expect(found).toMatchObject({ status: 'holds', value: null })
      expect(found.working).toHaveLength(1)
    }
  })

  it('a set’s own limit counts', () => {
    const found = run({ ...smooth, limits: { 'sweep.steps': -70 } })
    expect(found).toMatchObject({ status: 'fails', limit: -70 })
  })

  it('the figure alone is the check’s', () => {
    const set = defaultSet()
    const { status, value } = run(set)
    expect(drain(sweepStepsFigure({ set, sampleRate: set.sampleRate }))).toEqual({ status, value })
  })

  it('progress never goes back, working is complete, JSON without loss', () => {
    const steps = sweepSteps({ set: with_(smooth, { 'loop.feedback': 0.5 }), sampleRate: 48000 })
    let last = 0
    let step = steps.next()
    for (; !step.done; step = steps.next()) {
      expect(step.value).toBeGreaterThanOrEqual(last)
      expect(step.value).toBeLessThanOrEqual(1)
      last = step.value
    }
    const found = step.value
    for (const line of found.working) for (const part of Object.values(line)) expect(part.length).toBeGreaterThan(0)
    expect(found.text).toMatch(/^[A-Z].*\.$/)
    expect(JSON.parse(JSON.stringify(found))).toEqual(found)
  })
})
