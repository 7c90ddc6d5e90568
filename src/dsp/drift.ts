// The drift sweep: one random level a cycle, joined by half cosines. The levels are hashed from seed, voice and cycle, so
// that any sample's value is known without running the ones before it, here and in the C kernel.

/** fmix32, the finaliser of the 32-bit MurmurHash3: a bijection of the 32-bit integers. `h` any number, taken mod 2³²; returns an int32. Source: DESIGN 3. */
export function fmix32(h: number): number {
  let x = h | 0
  x = Math.imul(x ^ (x >>> 16), 0x85ebca6b)
  x = Math.imul(x ^ (x >>> 13), 0xc2b2ae35)
  return x ^ (x >>> 16)
}

/** Level r_k of cycle `k` (any integer) and `voice`, in [−1, 1): int32(fmix32(seed + 0x9E3779B9 v + 0x85EBCA6B k mod 2³²))/2³¹. */
export function driftLevel(seed: number, voice: number, k: number): number {
  // Each term is reduced to 32 bits before the sum: seed goes up to 2³² − 1 and k may be negative.
  const sum = (seed | 0) + (Math.imul(0x9e3779b9, voice) | 0) + (Math.imul(0x85ebca6b, k | 0) | 0)
  return fmix32(sum) / 2147483648
}

/** Drift at unwrapped phase Φ (cycles): with k = floor Φ, r_k + (r_{k+1} − r_k)(1 − cos π(Φ − k))/2, in [−1, 1]. */
export function driftValue(seed: number, voice: number, phase: number): number {
  const k = Math.floor(phase)
  const from = driftLevel(seed, voice, k)
  const to = driftLevel(seed, voice, k + 1)
  return from + ((to - from) * (1 - Math.cos(Math.PI * (phase - k)))) / 2
}
