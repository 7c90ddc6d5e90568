import { describe, expect, it } from 'vitest'
import { createRandom, createRandomBits } from '../../src/signal/random.ts'

describe('random', () => {
  // Oracle: ISO/IEC 14882 (C++), [rand.predef]: the 10000th word of a default-seeded (5489) mt19937 is 4123659995.
  it('gives the 10000th word that the C++ standard prints', () => {
    const next = createRandomBits(5489)
    let word = 0
    for (let i = 0; i < 10000; i++) word = next()
    expect(word).toBe(4123659995)
  })

  // Oracle: numpy 2.4.6, RandomState(12345).random_sample(3).
  it('gives the doubles of numpy for a seed', () => {
    const next = createRandom(12345)
    expect([next(), next(), next()]).toEqual([0.9296160928171479, 0.3163755545817859, 0.18391881167709445])
  })

  it('repeats for a seed and differs between seeds', () => {
    const [a, b, c] = [createRandom(7), createRandom(7), createRandom(8)]
    const first = a()
    expect(b()).toBe(first)
    expect(c()).not.toBe(first)
  })

  it.each([-1, 2 ** 32, 0.5, Number.NaN])('refuses seed %d', (seed) => {
    expect(() => createRandom(seed)).toThrow(RangeError)
  })
})
