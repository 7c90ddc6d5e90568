// K-weighting of ITU-R BS.1770: a high shelf for the head, then a high-pass, as two second-order sections.
//
// BS.1770-5 Annex 1 Tables 1 and 2 print coefficients for 48 kHz only. Other rates use the analogue prototypes behind the tables, mapped by the
// bilinear transform with tan(π f0/fs): shelf f0 = 1681.97 Hz, G = 3.99984 dB, Q = 0.70718, inner gain exponent 0.49967; high-pass f0 = 38.1355 Hz, Q = 0.50033.
// Source of the prototypes: B. De Man, "Evaluation of Implementations of the EBU R128 Loudness Measurement", AES 145th Convention, 2018 (from memory); the
// test derives the printed 48 kHz tables from them.

/** One second-order section, a0 = 1: y[n] = b0 x[n] + b1 x[n−1] + b2 x[n−2] − a1 y[n−1] − a2 y[n−2]. */
export interface Section {
  readonly b0: number
  readonly b1: number
  readonly b2: number
  readonly a1: number
  readonly a2: number
}

const SHELF = { hz: 1681.974450955533, gainDb: 3.999843853973347, q: 0.7071752369554196, bandExponent: 0.4996667741545416 }
const HIGH_PASS = { hz: 38.13547087602444, q: 0.5003270373238773 }
const TABLE_RATE = 48000

/** Lowest rate in Hz at which the shelf still lies well below half of it. */
export const MIN_LOUDNESS_RATE = 4000
export const MAX_LOUDNESS_RATE = 768_000

/**
 * Shelf and high-pass at `sampleRate` Hz, in [{@link MIN_LOUDNESS_RATE}, {@link MAX_LOUDNESS_RATE}], RangeError otherwise. The tables leave the high-pass numerator at 1, −2, 1, so
 * that its gain is 1.0050 at 48 kHz by accident of the rate; other rates keep that gain, so that a level does not depend on the rate.
 */
export function kWeighting(sampleRate: number): readonly [shelf: Section, highPass: Section] {
  if (!(sampleRate >= MIN_LOUDNESS_RATE && sampleRate <= MAX_LOUDNESS_RATE)) {
    throw new RangeError(`sampleRate must be ${MIN_LOUDNESS_RATE} to ${MAX_LOUDNESS_RATE} Hz, got ${sampleRate}`)
  }
  return [shelf(sampleRate), highPass(sampleRate)]
}

function shelf(sampleRate: number): Section {
  const k = Math.tan((Math.PI * SHELF.hz) / sampleRate)
  const high = 10 ** (SHELF.gainDb / 20)
  const band = high ** SHELF.bandExponent
  const a0 = 1 + k / SHELF.q + k * k
  return {
    b0: (high + (band * k) / SHELF.q + k * k) / a0,
    b1: (2 * (k * k - high)) / a0,
    b2: (high - (band * k) / SHELF.q + k * k) / a0,
    a1: (2 * (k * k - 1)) / a0,
    a2: (1 - k / SHELF.q + k * k) / a0,
  }
}

function highPass(sampleRate: number): Section {
  const k = Math.tan((Math.PI * HIGH_PASS.hz) / sampleRate)
  const a0 = highPassA0(sampleRate)
  const gain = highPassA0(TABLE_RATE) / a0
  return { b0: gain, b1: -2 * gain, b2: gain, a1: (2 * (k * k - 1)) / a0, a2: (1 - k / HIGH_PASS.q + k * k) / a0 }
}

function highPassA0(sampleRate: number): number {
  const k = Math.tan((Math.PI * HIGH_PASS.hz) / sampleRate)
  return 1 + k / HIGH_PASS.q + k * k
}

/** Both sections of one channel with their memory: [s1, s2 of the shelf, s1, s2 of the high-pass], transposed direct form II. */
export interface KFilter {
  readonly sections: readonly [Section, Section]
  readonly state: Float64Array
  /** Σ y² of the last stretch heard. A slot, not a return value: a number returned from a call may be boxed, which the audio thread must not. */
  readonly energy: Float64Array
}

export function createKFilter(sampleRate: number): KFilter {
  return { sections: kWeighting(sampleRate), state: new Float64Array(4), energy: new Float64Array(1) }
}

/** Σ y² of x[from … to) after weighting; keeps the filter's memory. */
export function weightedEnergy(filter: KFilter, x: Float64Array | Float32Array, from: number, to: number): number {
  weighEnergy(filter, x, from, to)
  return filter.energy[0] as number
}

/** The same into `filter.energy`, for the audio thread: allocates nothing. */
export function weighEnergy(filter: KFilter, x: Float64Array | Float32Array, from: number, to: number): void {
  const { state, sections } = filter
  // By index: taking the pair apart would make an iterator each call.
  const p = sections[0]
  const q = sections[1]
  let s1 = state[0] as number
  let s2 = state[1] as number
  let t1 = state[2] as number
  let t2 = state[3] as number
  let energy = 0
  for (let i = from; i < to; i++) {
    const input = x[i] as number
    const u = p.b0 * input + s1
    s1 = p.b1 * input - p.a1 * u + s2
    s2 = p.b2 * input - p.a2 * u
    const y = q.b0 * u + t1
    t1 = q.b1 * u - q.a1 * y + t2
    t2 = q.b2 * u - q.a2 * y
    energy += y * y
  }
  state[0] = s1
  state[1] = s2
  state[2] = t1
  state[3] = t2
  filter.energy[0] = energy
}
