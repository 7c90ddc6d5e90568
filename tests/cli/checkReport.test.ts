import { describe, expect, it } from 'vitest'
import { runChecks } from '../../src/checks/registry.ts'
import type { Check } from '../../src/checks/types.ts'
import { checkReport } from '../../src/cli/checkReport.ts'
import { defaultSet } from '../../src/set/defaults.ts'

const set = defaultSet()
const near: Check = {
  id: 'loop.margin',
  status: 'near',
  value: 0.35,
  limit: 0,
  unit: 'dB',
  label: 'Loop gain margin',
  text: 'The loop gain stays 0.35 dB under 1.',
  working: [{ formula: '−20 log10 γ', numbers: 'γ = 0.96', result: '0.35 dB', source: 'small-gain theorem' }],
  mend: [{ label: 'Feedback 0.94', path: 'loop.feedback', value: 0.94 }],
}
const holds: Check = { ...near, id: 'loop.ring', status: 'holds', limit: 3, unit: 's', text: 'It rings 0.1 s.', mend: [] }

describe('the report of `check`', () => {
  it('opens what is near or fails to formula, numbers, result, source, limit and what would help, and keeps the others to a line', () => {
    expect(checkReport(set, [near, holds])).toBe(
      [
        `${set.name}: near`,
        'near   loop.margin  The loop gain stays 0.35 dB under 1.',
        '       −20 log10 γ',
        '         γ = 0.96',
        '         = 0.35 dB',
        '         source: small-gain theorem',
        '       limit 0 dB',
        '       would help: Feedback 0.94 (loop.feedback 0.94)',
        'holds  loop.ring    It rings 0.1 s.',
        '',
        '1 near, 1 holds',
        '',
      ].join('\n'),
    )
  })

  it('opens every check when asked to, every step of its working in it', () => {
    const checks = runChecks(set, { kinds: ['closed'] })
    const report = checkReport(set, checks, { working: true }).replaceAll(/\s+/g, ' ')
    for (const { working } of checks)
      for (const step of working)
        for (const part of [step.formula, step.numbers, step.result, step.source]) expect(report).toContain(part.replaceAll(/\s+/g, ' '))
  })

  it('says which limit is the set’s own', () => {
    const own = { ...set, limits: { 'loop.ring': 4 } }
    expect(checkReport(own, [{ ...holds, limit: 4 }], { working: true })).toContain('\n       limit 4 s, the set’s own\n')
  })

  it('names the panel’s worst places', () => {
    const worst = [
      { id: 'level.peak', status: 'fails', value: 15, at: {}, positions: [1], by: 'corners', text: '15 dB with Tone at 1.00' } as const,
      { id: 'loop.ring', status: 'holds', value: 1, at: {}, positions: [1], by: 'corners', text: '1 s with Tone at 1.00' } as const,
    ]
    const report = checkReport(set, [{ ...near, id: 'panel.box', status: 'fails', limit: null, worst }])
    expect(report).toContain('\n       fails level.peak: 15 dB with Tone at 1.00\n')
    expect(report).not.toContain('1 s with Tone')
  })

  it('keeps to 100 columns and lets no text of a file start a line of its own', () => {
    const text = 'one\nfails  forged '.repeat(30)
    const report = checkReport({ ...set, name: text }, [{ ...near, text: 'short', working: [{ ...near.working[0]!, numbers: text }] }])
    const [, ...lines] = report.split('\n')
    expect(Math.max(...lines.map((line) => line.length))).toBeLessThanOrEqual(100)
    expect(lines.filter((line) => line.startsWith('fails'))).toEqual([])
  })
})
