import { describe, expect, it } from 'vitest'
import { checksJob } from '../../../app/workers/analysisJobs/checks.ts'
import { longChecksJob } from '../../../app/workers/analysisJobs/panelChecks.ts'
import { ratesJob } from '../../../app/workers/analysisJobs/rates.ts'
import { ANALYSIS_JOBS } from '../../../app/workers/analysisJobs.ts'
import { LANE } from '../../../app/workers/analysisProtocol.ts'
import { panelBoxSteps } from '../../../src/checks/panelBox.ts'
import { CHECKS, runChecks } from '../../../src/checks/registry.ts'
import { defaultSet } from '../../../src/set/defaults.ts'
import { withAt } from '../../../src/set/path.ts'

const short = withAt(withAt(defaultSet(), 'sweep.rateHz', 2), 'voices.count', 1)

function finish<P, R>(steps: Generator<P, R>): { readonly told: P[]; readonly reply: R } {
  const told: P[] = []
  for (;;) {
    const step = steps.next()
    if (step.done) return { told, reply: step.value }
    told.push(step.value)
  }
}

describe('the checks in two halves', () => {
  it('give every check there is, each once: those from formulas at once, the ids of the others beside, the others with progress', () => {
    const closed = checksJob({ set: short })
    const { told, reply } = finish(longChecksJob({ set: short }))
    expect(reply.checks.map(({ id }) => id)).toEqual(closed.slow)
    const all = [...closed.checks.map(({ id }) => id), ...closed.slow]
    expect([...all].sort()).toEqual([...CHECKS.map(({ id }) => id), 'panel.box'].sort())
    const parts = told.map(({ checks, total, part }) => (checks.length + part) / total)
    expect(parts.every((part, i) => part >= 0 && part <= 1 && part >= (parts[i - 1] ?? 0) - 1e-9)).toBe(true)
  })

  it('say what `check --panel` says', () => {
    const apart = [...checksJob({ set: short }).checks, ...finish(longChecksJob({ set: short })).reply.checks]
    const box = finish(panelBoxSteps(short)).reply
    for (const check of [...runChecks(short), box]) expect(apart.find(({ id }) => id === check.id)).toEqual(check)
  })

  it('fetch what takes long when it is first asked for, in a lane of its own', () => {
    for (const kind of ['longChecks', 'rates'] as const) {
      expect(LANE[kind]).toBe('long')
      expect(typeof ANALYSIS_JOBS[kind]).toBe('object')
    }
  })
})

describe('the checks at other rates', () => {
  it('are those of `check --rate`, every rate for itself, formulas first', () => {
    const rates = [32000, 48000]
    const { told, reply } = finish(ratesJob({ set: short, rates }))
    for (const [i, rate] of rates.entries()) {
      const { checks } = reply.rated[i] ?? { checks: [] }
      const expected = runChecks(short, { sampleRate: rate })
      expect(checks.map(({ id, status, value }) => [id, status, value])).toEqual(
        expected.map(({ id, status, value }) => [id, status, value]),
      )
    }
    const parts = told.map(({ part }) => part)
    expect(parts.every((part, i) => part >= (parts[i - 1] ?? 0) - 1e-9 && part <= 1)).toBe(true)
  })
})
