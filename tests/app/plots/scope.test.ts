import { describe, expect, it } from 'vitest'
import { triggerAt } from '../../../app/plots/scope/trigger.ts'

const wave = (f: (t: number) => number, length = 2048) => Float32Array.from({ length }, (_, i) => f(i))

describe('the scope’s trigger', () => {
  it('finds the rising zero crossing between samples', () => {
    // sin crosses zero upwards where 2π(i − 3.25)/64 is a multiple of 2π.
    const start = triggerAt(
      wave((i) => Math.sin((2 * Math.PI * (i - 3.25)) / 64)),
      1024,
    )
    expect((start - 3.25) / 64).toBeCloseTo(Math.round((start - 3.25) / 64), 3)
  })

  it('takes the same place of a period wherever the window begins', () => {
    // Two crossings a period: the one into the higher swing counts.
    const tone = (i: number) => Math.sin((2 * Math.PI * i) / 300) + 0.9 * Math.sin((4 * Math.PI * i) / 300 + 0.4)
    const phases = [0, 37, 111, 250].map(
      (shift) =>
        (triggerAt(
          wave((i) => tone(i + shift)),
          1024,
        ) +
          shift) %
        300,
    )
    for (const phase of phases) expect(Math.abs(phase - (phases[0] as number))).toBeLessThan(0.1)
  })

  it('does not take noise around zero for a crossing', () => {
    const quiet = wave((i) => (i < 500 ? 0.001 * Math.sin(i) : Math.sin((2 * Math.PI * (i - 500)) / 200)))
    expect(triggerAt(quiet, 1024)).toBeGreaterThan(640)
  })

  it('starts at 0 where there is no crossing: silence, or a level that stands', () => {
    expect(triggerAt(new Float32Array(2048), 1024)).toBe(0)
    expect(
      triggerAt(
        wave(() => 0.5),
        1024,
      ),
    ).toBe(0)
  })
})
