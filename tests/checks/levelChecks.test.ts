// Oracles: the closed forms of the comb (FACTS 2c), symmetry, and the checks' own promise that a mend was tried.
import { describe, expect, it } from 'vitest'
import { levelDc } from '../../src/checks/levelDc.ts'
import { levelLine, levelLineFigure } from '../../src/checks/levelLine.ts'
import { levelLoudness } from '../../src/checks/levelLoudness.ts'
import { levelMono } from '../../src/checks/levelMono.ts'
import { levelPeak, levelPeakFigure } from '../../src/checks/levelPeak.ts'
import { checkInput } from '../../src/checks/registry.ts'
import type { Check, CheckFunction, CheckMaterial, CheckSteps, Figure } from '../../src/checks/types.ts'
import { defaultShaper } from '../../src/set/defaults.ts'
import { startingSet } from '../../src/set/intents.ts'
import { withAt } from '../../src/set/path.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { integratedLoudness } from '../../src/signal/loudness.ts'
import { combSet } from '../analysis/combs.ts'
import { changedSet, randomSet } from '../dsp/sets.ts'

const run = (check: CheckFunction, set: ParameterSet) => check(checkInput(set))

function drained(steps: CheckSteps): Check {
  let step = steps.next()
  for (; !step.done; step = steps.next()) expect(step.value).toBeGreaterThanOrEqual(0)
  return step.value
}

/** JSON-safe, a sentence, working with nothing left out. */
function isComplete({ value, text, working }: Check): void {
  expect(JSON.parse(JSON.stringify(value ?? null))).toEqual(value ?? null)
  expect(text).toMatch(/^[A-Z].*\.$/)
  expect(working.length).toBeGreaterThan(0)
  for (const step of working) {
    for (const part of [step.formula, step.numbers, step.result, step.source]) {
      expect(part).not.toBe('')
      expect(part).not.toMatch(/NaN|undefined|Infinity/)
    }
  }
}

const withHeadroom = (set: ParameterSet, headroomDb: number): ParameterSet => ({ ...set, target: { ...set.target, headroomDb } })

describe('level.peak', () => {
  // The resonant comb 1/(1 − 0.9) has +20 dB of gain.
  const comb = combSet({ samples: 100, dry: 0, wet: 1, feedback: 0.9 })
  it.each([
    [22, 'holds'],
    [20.5, 'near'],
    [19, 'fails'],
  ])('a gain of 20 dB against %f dB of headroom %s', (headroom, status) => {
    const check = run(levelPeak, withHeadroom(comb, headroom))
    expect(check.status).toBe(status)
    expect(check.value).toBeCloseTo(20, 2)
    isComplete(check)
  })

  it('a white chorus at its tap centre is near at 3 dB of headroom, all-pass though it is: its worst sample is 7.7 dB', () => {
    const set = withHeadroom(combSet({ samples: 400, tap: 'line', dry: 0.7071, wet: 1, feedback: -0.7071 }), 3)
    const check = run(levelPeak, set)
    expect(check.status).toBe('near')
    expect(Math.abs(check.value as number)).toBeLessThan(1e-3)
    expect(check.text).toMatch(/a single sample can reach 7\.6\d dB/)
  })

  it('a loop that diverges fails without a value', () => {
    const check = run(levelPeak, combSet({ samples: 100, feedback: 1.05 }))
    expect([check.status, check.value]).toEqual(['fails', null])
    expect(check.text).toBe('No finite gain at the output: the loop diverges.')
    expect(check.mend?.some(({ path }) => path === 'loop.feedback')).toBe(true)
    isComplete(check)
  })

  it('a set’s own limit replaces the headroom', () => {
    expect(run(levelPeak, { ...withHeadroom(comb, 30), limits: { 'level.peak': 10 } }).status).toBe('fails')
  })

  it('every mend, once made, holds; trims of input and output, feedback and wet are among them', () => {
    const check = run(levelPeak, withHeadroom(combSet({ samples: 100, dry: 1, wet: 1, feedback: 0.9 }), 12))
    expect(check.status).toBe('fails')
    expect(check.mend?.map(({ path }) => path)).toEqual(['input.gainDb', 'mix.outputGainDb', 'loop.feedback', 'mix.wet'])
    for (const { path, value } of check.mend ?? []) {
      const mended = withAt(withHeadroom(combSet({ samples: 100, dry: 1, wet: 1, feedback: 0.9 }), 12), path, value)
      expect(run(levelPeak, mended).status, path).toBe('holds')
    }
  })
})

describe('level.line', () => {
  it('fails where the output holds: the line overflows first, and says so', () => {
    const set = withHeadroom(combSet({ samples: 100, dry: 0, wet: 0.2, feedback: 0.9 }), 12)
    expect(run(levelPeak, set).status).toBe('holds')
    const check = run(levelLine, set)
    expect([check.status, Math.round(check.value as number)]).toEqual(['fails', 20])
    expect(check.text).toMatch(/the line overflows 13\.98 dB before the output/)
    expect(check.mend?.map(({ path }) => path)).toEqual(['input.gainDb', 'loop.feedback'])
  })

  it('without a loop it is the input gain', () => {
    const set = changedSet((s) => {
      s.input.gainDb = -3
    })
    expect(run(levelLine, set).value).toBeCloseTo(-3, 9)
  })
})

describe('both', () => {
  it('any set: complete, and the figure alone says the same', { timeout: 60000 }, () => {
    for (let seed = 1; seed <= 12; seed++) {
      const set = randomSet(seed)
      const pairs: [CheckFunction, (input: ReturnType<typeof checkInput>) => Figure][] = [
        [levelPeak, levelPeakFigure],
        [levelLine, levelLineFigure],
      ]
      for (const [check, figure] of pairs) {
        const whole = run(check, set)
        isComplete(whole)
        expect(figure(checkInput(set))).toEqual({ status: whole.status, value: whole.value })
      }
    }
  })
})

describe('starting sets', () => {
  it.each(['chorus', 'flanger', 'vibrato', 'doubler', 'comb', 'other'] as const)(
    '%s begins inside its headroom, and whole in mono',
    (intent) => {
      for (const check of [levelPeak, levelLine, levelMono]) expect(run(check, startingSet(intent)).status).toBe('holds')
    },
  )
})

describe('level.mono', () => {
  it('one output holds without a value', () => {
    const check = run(levelMono, combSet({ samples: 100 }))
    expect([check.status, check.value]).toEqual(['holds', null])
    isComplete(check)
  })

  it('wet alone, turned over on the right, is lost whole; turning it back mends it', () => {
    const set = changedSet((s) => {
      s.sweep.stereoPhase = 0
      s.mix.dry = 0
      s.mix.invertRight = true
    })
    const check = run(levelMono, set)
    expect(check.status).toBe('fails')
    expect(check.mend?.map(({ path }) => path)).toEqual(['mix.invertRight', 'mix.dry'])
    isComplete(check)
  })
})

describe('level.dc', () => {
  it('without unequal limits holds, exactly 0 by symmetry, nothing rendered', () => {
    const steps = levelDc(checkInput(changedSet((s) => void Object.assign(s.mix, { shaper: defaultShaper('tanh') }))))
    const first = steps.next()
    expect(first.done).toBe(true)
    expect((first.value as Check).status).toBe('holds')
    isComplete(first.value as Check)
  })

  it('a clipper of unequal limits fails; equal ones mend it', () => {
    const set = changedSet((s) => {
      s.mix.shaper = { ...defaultShaper('hardClip'), negative: 0.2 }
    })
    const check = drained(levelDc(checkInput(set)))
    expect(check.status).toBe('fails')
    isComplete(check)
    for (const { path, value } of check.mend ?? []) expect(drained(levelDc(checkInput(withAt(set, path, value)))).status).toBe('holds')
  })
})

describe('level.loudness', () => {
  const sine: CheckMaterial = {
    name: 'sine.wav',
    sampleRate: 48000,
    channels: [Float64Array.from({ length: 96000 }, (_, i) => 0.1 * Math.sin((2 * Math.PI * 997 * i) / 48000))],
  }
  const measured = (set: ParameterSet, material?: CheckMaterial) =>
    drained(levelLoudness(checkInput(set, { ...(material && { material }) })))

  it('a gain of 6 dB is 6 LU, past what goes unnoticed', () => {
    const set = { ...combSet({ samples: 100, wet: 0 }), mix: { ...combSet({ samples: 100, wet: 0 }).mix, outputGainDb: 6 } }
    const check = measured(set, sine)
    expect(check.value).toBeCloseTo(6, 9)
    expect(check.status).toBe('note')
    isComplete(check)
  })

  it('dry alone is as loud as its bypass, of either layout', () => {
    for (const layout of ['mono', 'stereo', 'monoToStereo'] as const) {
      const check = measured(
        changedSet((s) => Object.assign(s, { layout, mix: { ...s.mix, dry: 1, wet: 0 } })),
        sine,
      )
      expect(Math.abs(check.value as number), layout).toBeLessThan(1e-9)
      expect(check.status).toBe('holds')
    }
  })

  // FACTS 9: a 997 Hz sine of 0 dBFS in one channel reads −3.01 LKFS.
  it('the bypass reads what ITU-R BS.1770 says of a 997 Hz sine', () => {
    const [bypass] = measured(combSet({ samples: 100, wet: 0 }), sine).working
    expect(bypass?.result).toBe('−23 LUFS')
    expect(integratedLoudness(sine.channels, 48000)).toBeCloseTo(-23.01, 2)
  })

  it('material at another rate is resampled; what is too short or silent is said', () => {
    const slow = { ...sine, sampleRate: 44100 }
    expect(measured(combSet({ samples: 100, wet: 0 }), slow).working[0]?.numbers).toMatch(/resampled from 44/)
    expect(measured(combSet({ samples: 100 }), { ...sine, channels: [new Float64Array(1000)] }).text).toMatch(/shorter than the 0\.4 s/)
    expect(measured(combSet({ samples: 100 }), { ...sine, channels: [new Float64Array(48000)] }).text).toMatch(/too quiet/)
  })

  it('a loop that grows has no loudness', () => {
    expect(measured(combSet({ samples: 100, feedback: 1.5 }), sine).text).toMatch(/grows without end/)
  })
})
