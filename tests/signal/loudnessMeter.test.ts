import { describe, expect, it } from 'vitest'
import { shortTermLoudness } from '../../src/signal/loudness.ts'
import { createLoudnessMeter, feedLoudnessMeter, meteredLoudness, resetLoudnessMeter } from '../../src/signal/loudnessMeter.ts'
import { createRandom } from '../../src/signal/random.ts'

const RATE = 48000
const random = createRandom(5)
const noise = Array.from({ length: 2 }, () =>
  Float64Array.from({ length: 4 * RATE }, (_, n) => 0.3 * Math.sin(n / 3000) * (random() - 0.5)),
)

function fed(cut: number, frames = 4 * RATE) {
  const meter = createLoudnessMeter({ sampleRate: RATE, channels: 2 })
  for (let n = 0; n < frames; n += cut) feedLoudnessMeter(meter, noise, Math.min(cut, frames - n), n)
  return meter
}

describe('running loudness', () => {
  // Oracle: the short-term window of the offline measure, ungated, at the same instant.
  it('equals the short-term loudness of the last 3 s', () => {
    const offline = shortTermLoudness(noise, RATE)
    expect(meteredLoudness(fed(128))).toBeCloseTo(offline.at(-1) as number, 9)
    expect(meteredLoudness(fed(128, 3 * RATE))).toBeCloseTo(offline[0] as number, 9)
  })

  it.each([1, 128, 441, 100_000])('does not depend on blocks of %i frames', (cut) => {
    expect(meteredLoudness(fed(cut))).toBeCloseTo(meteredLoudness(fed(4 * RATE)), 12)
  })

  it('reads a steady tone of −23 dBFS in both channels as −23 LUFS, already before the window is full', () => {
    const tone = Float32Array.from({ length: RATE }, (_, n) => 10 ** (-23 / 20) * Math.sin((2 * Math.PI * 1000 * n) / RATE))
    const meter = createLoudnessMeter({ sampleRate: RATE, channels: 2 })
    feedLoudnessMeter(meter, [tone, tone], RATE)
    expect(Math.abs(meteredLoudness(meter) + 23)).toBeLessThan(0.1)
  })

  it('knows nothing before 50 ms and after a reset', () => {
    const meter = fed(128, 2399)
    expect(meteredLoudness(meter)).toBe(Number.NEGATIVE_INFINITY)
    feedLoudnessMeter(meter, noise, 1, 2399)
    expect(meteredLoudness(meter)).toBeGreaterThan(-200)
    resetLoudnessMeter(meter)
    expect(meter).toEqual(createLoudnessMeter({ sampleRate: RATE, channels: 2 }))
  })

  it('recovers when the input was not finite', () => {
    const meter = fed(128)
    feedLoudnessMeter(meter, [Float64Array.of(1, Number.NaN, Number.POSITIVE_INFINITY), Float64Array.of(0, 0, 0)], 3)
    for (let n = 0; n < 4 * RATE; n += 128) feedLoudnessMeter(meter, noise, 128, n)
    expect(Math.abs(meteredLoudness(meter) - meteredLoudness(fed(128)))).toBeLessThan(0.01)
  })

  it('takes a missing channel as silent', () => {
    const both = createLoudnessMeter({ sampleRate: RATE, channels: 2 })
    feedLoudnessMeter(both, noise.slice(0, 1), RATE)
    const one = createLoudnessMeter({ sampleRate: RATE, channels: 1 })
    feedLoudnessMeter(one, noise, RATE)
    expect(meteredLoudness(both)).toBe(meteredLoudness(one))
  })

  it('refuses what it cannot measure', () => {
    expect(() => createLoudnessMeter({ sampleRate: RATE, channels: 0 })).toThrow(/got 0/)
    expect(() => createLoudnessMeter({ sampleRate: RATE, channels: 1, windowSeconds: 0 })).toThrow(/got 0/)
    expect(() => createLoudnessMeter({ sampleRate: 100, channels: 1 })).toThrow(/got 100/)
  })
})
