import { describe, expect, it } from 'vitest'
import { checkFigure, checkLimit, panelWords } from '../../../../../app/areas/shape/checks/checkWords.ts'
import { verdictWords } from '../../../../../app/areas/shape/checks/verdictWords.ts'
import type { CheckId } from '../../../../../src/checks/limits.ts'
import type { Check, CheckValue, Status } from '../../../../../src/checks/types.ts'

const figure = (id: CheckId, value: CheckValue, unit = '', status: Status = 'holds') => checkFigure({ id, status, value, unit })

describe('the figure of a check', () => {
  it.each([
    [figure('loop.stability', 'proven'), 'proven'],
    [figure('loop.margin', 1.3606777, 'dB'), '1.36 dB'],
    [figure('loop.margin', null, 'dB'), 'none'],
    [figure('loop.poles', 0.99772307), '0.9977'],
    [figure('loop.ring', 0.0631, 's'), '63 ms'],
    [figure('loop.ring', null, 's'), 'none'],
    [figure('loop.ring', null, 's', 'near'), 'endless'],
    [figure('sweep.detune', 171.4, 'cents'), '171.4 cents'],
    [figure('sweep.detune', 0.9974, 'cents'), '1.0 cents'],
    [figure('sweep.range', { smallestMs: 1, largestMs: 6, roomSamples: 47 }, 'ms'), '1.00 – 6.00 ms'],
    [figure('sweep.range', { smallestMs: 5, largestMs: 5, roomSamples: 47 }, 'ms'), '5.00 ms'],
    [figure('response.extremes', { firstNotchHz: [96.8, 558.6] }, 'Hz'), '96.8 – 559 Hz'],
    [figure('response.extremes', { firstNotchHz: [null, null] }, 'Hz'), 'none'],
  ])('reads %s', (text, wanted) => {
    expect(text).toBe(wanted)
  })
})

describe('the limit of a check', () => {
  it('is a figure, the weakest word that holds, or nothing', () => {
    expect(checkLimit({ id: 'loop.ring', limit: 3, unit: 's' })).toBe('limit 3 s')
    expect(checkLimit({ id: 'loop.ring', limit: 4, unit: 's' }, 4)).toBe('own limit 4 s')
    expect(checkLimit({ id: 'sweep.fusion', limit: 50, unit: 'ms' })).toBe('limit 50 ms')
    expect(checkLimit({ id: 'sweep.range', limit: 0.0208333, unit: 'ms' })).toBe('limit 0.021 ms')
    expect(checkLimit({ id: 'loop.stability', limit: 'computed', unit: '' })).toBe('at least computed')
    expect(checkLimit({ id: 'loop.poles', limit: null, unit: '' })).toBe('')
    expect(checkLimit({ id: 'response.extremes', limit: null, unit: 'Hz' })).toBe('first notch over the sweep')
  })
})

describe('the panel’s row', () => {
  const box = (worst: Check['worst']): Check => ({ ...line, id: 'panel.box', value: 'level.line', worst })
  const line: Check = {
    id: 'level.line',
    status: 'holds',
    value: 3,
    limit: 12,
    unit: 'dB',
    label: 'Worst gain in the line',
    text: '',
    working: [],
  }
  const place = { at: {}, positions: [1], by: 'corners', text: '' } as const

  it('has the figure of the worst check it found, and its name', () => {
    const worst = [
      { ...place, id: 'level.line', status: 'near', value: 11.5 },
      { ...place, id: 'loop.ring', status: 'holds', value: 1 },
    ] as const
    expect(panelWords(box(worst), [line])).toEqual({ figure: '11.5 dB', what: 'worst gain in the line' })
  })

  it('says so when all hold everywhere, and when there is no panel', () => {
    expect(panelWords(box([{ ...place, id: 'loop.ring', status: 'holds', value: 1 }]), [line]).figure).toBe('all hold')
    expect(panelWords(box([]), [line])).toEqual({ figure: 'none', what: 'no knobs' })
  })
})

describe('the heading of the checks', () => {
  it('counts what fails, is near, is noted and holds, and what is still to come', () => {
    const done = { pending: 0, settled: true }
    expect(verdictWords({ verdict: 'fails', fails: 1, near: 1, notes: 0, holds: 6, ...done })).toBe('Checks · 1 fails, 1 near, 6 hold')
    expect(verdictWords({ verdict: 'fails', fails: 2, near: 0, notes: 1, holds: 1, ...done })).toBe('Checks · 2 fail, 1 note, 1 holds')
    expect(verdictWords({ verdict: 'holds', fails: 0, near: 0, notes: 0, holds: 8, pending: 9, settled: false })).toBe(
      'Checks · 8 hold · 9 to come',
    )
    expect(verdictWords({ verdict: null, fails: 0, near: 0, notes: 0, holds: 0, pending: 0, settled: false })).toBe(
      'Checks · being computed',
    )
  })
})
