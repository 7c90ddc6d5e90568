// Seeded uniform numbers: the same seed gives the same sequence everywhere.
//
// Mersenne Twister MT19937. Source: M. Matsumoto, T. Nishimura, "Mersenne Twister: A 623-dimensionally equidistributed uniform
// pseudorandom number generator", ACM TOMACS 8(1), 1998; seeding and 53-bit form of the authors' 2002 reference code (from memory, proved by
// the value that the C++ standard prints and by numpy.random.RandomState in the test).

const N = 624
const M = 397

/** A generator of 53-bit uniform numbers in [0, 1). seed: whole number in [0, 2^32); RangeError otherwise. */
export function createRandom(seed: number): () => number {
  const next = createRandomBits(seed)
  return () => {
    const high = next() >>> 5
    const low = next() >>> 6
    return (high * 67108864 + low) / 9007199254740992
  }
}

/** The same generator's raw 32-bit words, in [0, 2^32). */
export function createRandomBits(seed: number): () => number {
  if (!Number.isInteger(seed) || seed < 0 || seed >= 2 ** 32) throw new RangeError(`seed must be a whole number in [0, 2^32), got ${seed}`)
  const state = new Int32Array(N)
  state[0] = seed
  for (let i = 1; i < N; i++) {
    const previous = state[i - 1] as number
    state[i] = Math.imul(previous ^ (previous >>> 30), 1812433253) + i
  }
  let at = N
  return () => {
    if (at === N) {
      twist(state)
      at = 0
    }
    let y = state[at++] as number
    y ^= y >>> 11
    y ^= (y << 7) & 0x9d2c5680
    y ^= (y << 15) & 0xefc60000
    y ^= y >>> 18
    return y >>> 0
  }
}

function twist(state: Int32Array): void {
  for (let i = 0; i < N; i++) {
    const y = ((state[i] as number) & 0x80000000) | ((state[(i + 1) % N] as number) & 0x7fffffff)
    state[i] = (state[(i + M) % N] as number) ^ (y >>> 1) ^ (y & 1 ? 0x9908b0df : 0)
  }
}
