// The frozen transfer function H_c(ω) and its derivative by ω, exactly and fast: what response, group delay and
// extremes are computed from. Values are kept with their derivatives (dual.ts).
//
// Every delay is a phasor e^{−jω·whole} times a short polynomial in E = e^{−jω}. On a uniform grid the phasors are
// stepped by one rotation each, elsewhere they come from sine and cosine.
// Slots: [ E | dry delay | loop reads, one a line | voices of channel 0 | voices of channel 1 ]
import { dual, invert, multiply, setOne } from './dual.ts'
import { chainAt, type FilterChain, loopChain, outerChain, wetChain } from './filterChain.ts'
import type { Frozen } from './frozen.ts'
import type { FrozenRead } from './frozenRead.ts'

const DRY = 1
const LOOPS = 2
const TAPS = 4

export interface Transfer {
  readonly sampleRate: number
  readonly channels: number
  /** Longest delay in play, in samples, at least 1: how fast H can turn. */
  readonly longest: number
  readonly whole: Float64Array
  readonly taps: Float64Array
  readonly pole: Float64Array
  readonly voiceFrom: readonly number[]
  readonly frozen: Frozen
  readonly chains: { readonly loop: FilterChain; readonly wet: FilterChain; readonly outer: FilterChain }
  readonly phasors: Float64Array
  readonly rotations: Float64Array
  readonly scratch: {
    readonly loopChain: Float64Array
    readonly wetChain: Float64Array
    readonly outer: Float64Array
    readonly lines: readonly [Float64Array, Float64Array]
    readonly loops: readonly [Float64Array, Float64Array]
    readonly wet: Float64Array
    readonly dry: Float64Array
  }
}

/** Prepares the transfer function of a frozen set. It owns scratch memory: not to be shared between callers that interleave. */
export function transferOf(frozen: Frozen): Transfer {
  const reads: FrozenRead[] = [...frozen.loop.reads]
  const voiceFrom = [LOOPS + reads.length]
  for (const channel of frozen.channels) {
    reads.push(...channel.voices)
    voiceFrom.push(LOOPS + reads.length)
  }
  const slots = LOOPS + reads.length
  const whole = new Float64Array(slots)
  const taps = new Float64Array(TAPS * slots)
  const pole = new Float64Array(slots)
  whole[0] = 1
  whole[DRY] = frozen.dryDelay
  reads.forEach((read, i) => {
    whole[LOOPS + i] = read.first
    pole[LOOPS + i] = read.pole
    taps.set(read.taps, TAPS * (LOOPS + i))
  })
  const inPlay = reads.filter((_, i) => i >= frozen.lines || frozen.loop.gain !== 0)
  return {
    sampleRate: frozen.sampleRate,
    channels: frozen.channels.length,
    longest: Math.max(1, frozen.dryDelay, ...inPlay.map((read) => read.first + read.taps.length - 1)),
    whole,
    taps,
    pole,
    voiceFrom,
    frozen,
    chains: { loop: loopChain(frozen), wet: wetChain(frozen), outer: outerChain(frozen) },
    phasors: new Float64Array(2 * slots),
    rotations: new Float64Array(2 * slots),
    scratch: {
      loopChain: dual(),
      wetChain: dual(),
      outer: dual(),
      lines: [dual(), dual()],
      loops: [dual(), dual()],
      wet: dual(),
      dry: dual(),
    },
  }
}

/** H and dH/dω of every channel at ω rad/sample into `out`, four numbers a channel; of one channel only if given. */
export function transferAt(t: Transfer, omega: number, out: Float64Array, channel = -1): void {
  fillPhasors(t, t.phasors, omega, channel)
  evaluate(t, out, channel)
}

/** Starts a uniform grid at ω0 with the given step: evaluates there; `transferStep` then moves on by one step. */
export function transferGrid(t: Transfer, omega: number, step: number, out: Float64Array): void {
  fillPhasors(t, t.rotations, step, -1)
  fillPhasors(t, t.phasors, omega, -1)
  evaluate(t, out, -1)
}

/** The next grid point. Rounding grows by one part in 1e16 a step: start anew every few hundred steps. */
export function transferStep(t: Transfer, out: Float64Array): void {
  const { phasors, rotations } = t
  for (let i = 0; i < phasors.length; i += 2) {
    const re = phasors[i] as number
    const im = phasors[i + 1] as number
    const c = rotations[i] as number
    const s = rotations[i + 1] as number
    phasors[i] = re * c - im * s
    phasors[i + 1] = re * s + im * c
  }
  evaluate(t, out, -1)
}

function fillPhasors(t: Transfer, into: Float64Array, omega: number, channel: number): void {
  const from = channel < 0 ? LOOPS : (t.voiceFrom[channel] as number)
  const to = channel < 0 ? t.whole.length : (t.voiceFrom[channel + 1] as number)
  fillRange(t, into, omega, 0, channel < 0 ? LOOPS : (t.voiceFrom[0] as number))
  fillRange(t, into, omega, from, to)
}

function fillRange(t: Transfer, into: Float64Array, omega: number, from: number, to: number): void {
  for (let i = from; i < to; i++) {
    const angle = omega * (t.whole[i] as number)
    into[2 * i] = Math.cos(angle)
    into[2 * i + 1] = -Math.sin(angle)
  }
}

function evaluate(t: Transfer, out: Float64Array, only: number): void {
  const { frozen, phasors, scratch } = t
  const er = phasors[0] as number
  const ei = phasors[1] as number
  const { lines, wet, dry } = scratch
  solveLines(t, er, ei)
  chainAt(t.chains.wet, er, ei, scratch.wetChain)
  chainAt(t.chains.outer, er, ei, scratch.outer)
  for (let c = 0; c < t.channels; c++) {
    if (only >= 0 && c !== only) continue
    const channel = frozen.channels[c]
    if (!channel) continue
    const line = lines[channel.line] as Float64Array
    sumReads(t, t.voiceFrom[c] as number, t.voiceFrom[c + 1] as number, er, ei, wet)
    multiply(wet, wet, scratch.wetChain)
    multiply(wet, wet, line)
    const dr = phasors[2 * DRY] as number
    const di = phasors[2 * DRY + 1] as number
    dry[0] = dr
    dry[1] = di
    dry[2] = frozen.dryDelay * di
    dry[3] = -frozen.dryDelay * dr
    if (frozen.dryTap === 'line') multiply(dry, dry, line)
    for (let i = 0; i < 4; i++) wet[i] = frozen.dry * (dry[i] as number) + channel.wet * (wet[i] as number)
    multiply(wet, wet, scratch.outer)
    out.set(wet, 4 * c)
  }
}

/** w of each line for u = 1: (I − g F X diag(A))⁻¹ (1, 1). */
function solveLines(t: Transfer, er: number, ei: number): void {
  const { loop, lines: count } = t.frozen
  const { loops, lines, loopChain: around } = t.scratch
  if (loop.gain === 0) {
    for (const w of lines) setOne(w)
    return
  }
  chainAt(t.chains.loop, er, ei, around)
  for (let l = 0; l < count; l++) {
    const own = loops[l] as Float64Array
    sumReads(t, LOOPS + l, LOOPS + l + 1, er, ei, own)
    multiply(own, own, around)
  }
  const k = loop.crossFeed
  if (count === 1 || k === 0) {
    for (let l = 0; l < count; l++) {
      const w = lines[l] as Float64Array
      const own = loops[l] as Float64Array
      setOne(w)
      for (let i = 0; i < 4; i++) w[i] = (w[i] as number) - (own[i] as number)
      invert(w)
    }
    return
  }
  // Cramer on two lines: det = 1 − (1−k)(G0 + G1) + (1 − 2k) G0 G1, w0 = (1 − (1−2k) G1)/det, w1 likewise.
  const [g0, g1] = loops
  const [w0, w1] = lines
  const det = around
  multiply(det, g0, g1)
  for (let i = 0; i < 4; i++) {
    const one = i === 0 ? 1 : 0
    const a = g0[i] as number
    const b = g1[i] as number
    det[i] = one - (1 - k) * (a + b) + (1 - 2 * k) * (det[i] as number)
    w0[i] = one - (1 - 2 * k) * b
    w1[i] = one - (1 - 2 * k) * a
  }
  invert(det)
  multiply(w0, w0, det)
  multiply(w1, w1, det)
}

/** Σ of the reads in slots [from, to): phasor · (t0 + t1 E + t2 E² + t3 E³) / (1 + pole E), with d/dω = −j (E d/dE + whole). */
function sumReads(t: Transfer, from: number, to: number, er: number, ei: number, out: Float64Array): void {
  const { taps, pole, phasors, whole } = t
  let sr = 0
  let si = 0
  let dr = 0
  let di = 0
  for (let i = from; i < to; i++) {
    const at = TAPS * i
    const t1 = taps[at + 1] as number
    const t2 = taps[at + 2] as number
    const t3 = taps[at + 3] as number
    // Horner: value T and slope g = dT/dE.
    const ar = t3 * er + t2
    const ai = t3 * ei
    const br = ar * er - ai * ei + t1
    const bi = ar * ei + ai * er
    let tr = br * er - bi * ei + (taps[at] as number)
    let ti = br * ei + bi * er
    const cr = ar + t3 * er
    const ci = ai + t3 * ei
    let gr = cr * er - ci * ei + br
    let gi = cr * ei + ci * er + bi
    const eta = pole[i] as number
    if (eta !== 0) {
      const qr = 1 + eta * er
      const qi = eta * ei
      const q2 = qr * qr + qi * qi
      const nr = (tr * qr + ti * qi) / q2
      const ni = (ti * qr - tr * qi) / q2
      const hr = gr - eta * nr
      const hi = gi - eta * ni
      tr = nr
      ti = ni
      gr = (hr * qr + hi * qi) / q2
      gi = (hi * qr - hr * qi) / q2
    }
    const delay = whole[i] as number
    const hr = er * gr - ei * gi + delay * tr
    const hi = er * gi + ei * gr + delay * ti
    const pr = phasors[2 * i] as number
    const pi = phasors[2 * i + 1] as number
    sr += pr * tr - pi * ti
    si += pr * ti + pi * tr
    dr += pr * hi + pi * hr
    di += pi * hi - pr * hr
  }
  out[0] = sr
  out[1] = si
  out[2] = dr
  out[3] = di
}
