import { describe, expect, it } from 'vitest'
import { kWeighting } from '../../src/signal/kWeighting.ts'
import { integratedLoudness, momentaryLoudness, shortTermLoudness } from '../../src/signal/loudness.ts'
import { createRandom } from '../../src/signal/random.ts'

/** A sine of steps [peak level dBFS, seconds], phase unbroken. */
function steps(plan: readonly (readonly [number, number])[], sampleRate = 48000, hz = 1000): Float64Array {
  const parts = plan.map(([, seconds]) => Math.round(seconds * sampleRate))
  const out = new Float64Array(parts.reduce((a, b) => a + b, 0))
  let n = 0
  plan.forEach(([db], part) => {
    const amplitude = 10 ** (db / 20)
    for (let i = 0; i < (parts[part] as number); i++, n++) out[n] = amplitude * Math.sin((2 * Math.PI * hz * n) / sampleRate)
  })
  return out
}

function gainDb(sampleRate: number, hz: number): number {
  const w = (2 * Math.PI * hz) / sampleRate
  const level = (a: number, b: number, c: number) =>
    Math.hypot(a + b * Math.cos(w) + c * Math.cos(2 * w), b * Math.sin(w) + c * Math.sin(2 * w))
  return kWeighting(sampleRate).reduce((db, s) => db + 20 * Math.log10(level(s.b0, s.b1, s.b2) / level(1, s.a1, s.a2)), 0)
}

describe('K-weighting', () => {
  // Oracle: ITU-R BS.1770-5 Annex 1 Tables 1 and 2 (FACTS 9, V2), printed to 14 places.
  it('at 48 kHz is the published table', () => {
    const [shelf, highPass] = kWeighting(48000)
    const table = [
      [shelf.b0, 1.53512485958697],
      [shelf.b1, -2.69169618940638],
      [shelf.b2, 1.19839281085285],
      [shelf.a1, -1.69065929318241],
      [shelf.a2, 0.73248077421585],
      [highPass.b0, 1],
      [highPass.b1, -2],
      [highPass.b2, 1],
      [highPass.a1, -1.99004745483398],
      [highPass.a2, 0.99007225036621],
    ] as const
    // The printed values are rounded: 3e-14 is what is left.
    for (const [got, printed] of table) expect(Math.abs(got - printed)).toBeLessThan(1e-13)
  })

  // Oracle: FACTS 9, computed there from the tables, to the printed hundredth.
  it.each([
    [20, -13.28],
    [50, -3.93],
    [100, -1.13],
    [1000, 0.7],
    [2000, 3.07],
    [4000, 3.97],
    [10000, 4.04],
  ])('at %i Hz the gain is %d dB', (hz, db) => {
    expect(Math.abs(gainDb(48000, hz) - db)).toBeLessThan(0.0051)
  })

  // The prototypes are the same at every rate; bilinear warping is all that may differ, and below 5 kHz there is little of it.
  it.each([22050, 44100, 88200, 96000, 192000])('weighs the same at %i Hz as at 48 kHz', (rate) => {
    for (const hz of [20, 100, 997, 2000, 5000]) expect(Math.abs(gainDb(rate, hz) - gainDb(48000, hz))).toBeLessThan(0.06)
  })

  it('refuses rates it does not cover', () => {
    expect(() => kWeighting(3999)).toThrow(/3999/)
    expect(() => kWeighting(Number.NaN)).toThrow(RangeError)
  })
})

describe('integrated loudness', () => {
  // Oracle: BS.1770-5 Annex 1: 0 dBFS 997 Hz in one front channel reads −3.01, in both 0.0. The tolerance is the
  // quoted two places; the K gain at 997 Hz is 0.6910 dB (FACTS 9).
  it.each([44100, 48000, 96000, 192000])('calibration at %i Hz: −3.01 in one channel, 0.0 in both', (rate) => {
    const tone = steps([[0, 5]], rate, 997)
    expect(Math.abs(integratedLoudness([tone], rate) + 3.01)).toBeLessThan(0.01)
    expect(Math.abs(integratedLoudness([tone, new Float64Array(tone.length)], rate) + 3.01)).toBeLessThan(0.01)
    expect(Math.abs(integratedLoudness([tone, tone], rate))).toBeLessThan(0.01)
  })

  // Oracle: EBU Tech 3341 Table 1, cases 1 to 5, stereo 1 kHz sines, tolerance ±0.1 LU (FACTS 9, V2).
  it.each([
    ['1', [[-23, 20]], -23],
    ['2', [[-33, 20]], -33],
    [
      '3',
      [
        [-36, 10],
        [-23, 60],
        [-36, 10],
      ],
      -23,
    ],
    [
      '4',
      [
        [-72, 10],
        [-36, 10],
        [-23, 60],
        [-36, 10],
        [-72, 10],
      ],
      -23,
    ],
    [
      '5',
      [
        [-26, 20],
        [-20, 20.1],
        [-26, 20],
      ],
      -23,
    ],
  ] as const)('EBU Tech 3341 case %s', (_, plan, lufs) => {
    const x = steps(plan)
    expect(Math.abs(integratedLoudness([x, x], 48000) - lufs)).toBeLessThan(0.1)
  })

  it('EBU Tech 3341 case 6: five channels, surrounds weigh 1.41', () => {
    const [front, centre, surround] = [-28, -24, -30].map((db) => steps([[db, 20]])) as [Float64Array, Float64Array, Float64Array]
    expect(Math.abs(integratedLoudness([front, front, centre, surround, surround], 48000) + 23)).toBeLessThan(0.1)
  })

  it('leaves the low-frequency channel of six out', () => {
    const x = steps([[-20, 2]])
    const none = new Float64Array(x.length)
    expect(integratedLoudness([x, none, none, x, none, none], 48000)).toBe(integratedLoudness([x], 48000))
  })

  it('silence and what stays under −70 LUFS read −Infinity', () => {
    expect(integratedLoudness([new Float64Array(48000)], 48000)).toBe(Number.NEGATIVE_INFINITY)
    expect(integratedLoudness([steps([[-75, 2]])], 48000)).toBe(Number.NEGATIVE_INFINITY)
    expect(integratedLoudness([new Float64Array(0)], 48000)).toBe(Number.NEGATIVE_INFINITY)
  })

  it('less than one block is measured as a whole', () => {
    expect(Math.abs(integratedLoudness([steps([[-20, 0.3]])], 48000) + 23)).toBeLessThan(0.2)
  })

  it('a gain of g dB moves the loudness of noise by g', () => {
    const random = createRandom(11)
    const noise = Float64Array.from({ length: 96000 }, () => 0.2 * (random() - 0.5))
    const louder = noise.map((v) => v * 10 ** (6 / 20))
    expect(integratedLoudness([louder], 48000) - integratedLoudness([noise], 48000)).toBeCloseTo(6, 9)
  })

  it('refuses channels of unlike length, none, and weights that do not match', () => {
    expect(() => integratedLoudness([new Float64Array(4), new Float64Array(5)], 48000)).toThrow(/channel 1 has 5/)
    expect(() => integratedLoudness([], 48000)).toThrow(/got 0/)
    expect(() => integratedLoudness([new Float64Array(4)], 48000, [1, 1])).toThrow(/got 2/)
  })
})

describe('windows', () => {
  // Oracle: EBU Tech 3341, cases 9 and 12 (from memory): levels that average to −23 in every window, tolerance ±0.1 LU.
  it('case 9: short-term stays at −23 once 3 s have passed', () => {
    const x = steps(
      Array.from(
        { length: 5 },
        () =>
          [
            [-20, 1.34],
            [-30, 1.66],
          ] as const,
      ).flat(),
    )
    const s = shortTermLoudness([x, x], 48000)
    expect(s.length).toBe(121)
    for (const lufs of s) expect(Math.abs(lufs + 23)).toBeLessThan(0.1)
  })

  it('case 12: momentary stays at −23', () => {
    const x = steps(
      Array.from(
        { length: 25 },
        () =>
          [
            [-20, 0.18],
            [-30, 0.22],
          ] as const,
      ).flat(),
    )
    const m = momentaryLoudness([x, x], 48000)
    expect(m.length).toBe(97)
    for (const lufs of m) expect(Math.abs(lufs + 23)).toBeLessThan(0.1)
  })

  it('are empty when the signal is shorter', () => {
    const x = steps([[-20, 0.39]])
    expect(momentaryLoudness([x], 48000).length).toBe(0)
    expect(shortTermLoudness([x], 48000).length).toBe(0)
  })
})
