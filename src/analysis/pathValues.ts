// H at one frequency and many positions of a sweep path: the delays' phasors e^{−jωn} stand in one table for every n.
import { dual } from './dual.ts'
import { chainAt, loopChain, outerChain, wetChain } from './filterChain.ts'
import type { Frozen } from './frozen.ts'
import { type PathTable, TABLE_TAPS } from './pathTable.ts'

export interface Tuning {
  /** Gains and filters of the set; its reads are not used. */
  readonly frozen: Frozen
  /** Phasors of the delays lowest … lowest + re.length − 1. */
  readonly lowest: number
  readonly re: Float64Array
  readonly im: Float64Array
  readonly loop: Float64Array
  readonly wet: Float64Array
  readonly outer: Float64Array
  /** Σ of reads: scratch. */
  readonly sum: Float64Array
  readonly loops: Float64Array
  readonly lines: Float64Array
  dryRe: number
  dryIm: number
}

/** Memory for every delay between the path's smallest and largest, and the points read around them. */
export function createTuning(frozen: Frozen, reach: { readonly lowest: number; readonly highest: number }): Tuning {
  const lowest = Math.max(0, Math.floor(reach.lowest) - 3)
  const highest = Math.ceil(reach.highest) + 5
  const phasors = () => new Float64Array(highest - lowest + 1)
  const shared = { loop: dual(), wet: dual(), outer: dual(), sum: dual(), loops: dual(), lines: dual() }
  return { frozen, lowest, re: phasors(), im: phasors(), ...shared, dryRe: 1, dryIm: 0 }
}

/** Sets everything that depends on ω (rad/sample) only. */
export function tune(tuning: Tuning, omega: number): void {
  const { frozen, re, im, lowest } = tuning
  const er = Math.cos(omega)
  const ei = -Math.sin(omega)
  let zr = Math.cos(omega * lowest)
  let zi = -Math.sin(omega * lowest)
  for (let n = 0; n < re.length; n++) {
    re[n] = zr
    im[n] = zi
    const next = zr * er - zi * ei
    zi = zr * ei + zi * er
    zr = next
  }
  chainAt(loopChain(frozen), er, ei, tuning.loop)
  chainAt(wetChain(frozen), er, ei, tuning.wet)
  chainAt(outerChain(frozen), er, ei, tuning.outer)
  tuning.dryRe = Math.cos(omega * frozen.dryDelay)
  tuning.dryIm = -Math.sin(omega * frozen.dryDelay)
}

/** H of `channel`, but for the phase of what all paths share, at every position of the table into `out`: re, im, re, im, … */
export function pathValues(tuning: Tuning, table: PathTable, channel: number, out: Float64Array): void {
  const { frozen, sum, lines, wet, outer, dryRe, dryIm } = tuning
  const { set, lines: lineCount } = table.path
  const voices = set.voices.count
  const line = lineCount === 2 ? channel : 0
  const from = lineCount + channel * voices
  const wetGain = frozen.channels[channel]?.wet ?? 0
  const gain = Math.hypot(outer[0] as number, outer[1] as number)
  const looped = frozen.loop.gain !== 0
  lines[0] = 1
  lines[1] = 0
  lines[2] = 1
  lines[3] = 0
  const wr = wetGain * (wet[0] as number)
  const wi = wetGain * (wet[1] as number)
  for (let i = 0; i < table.ts.length; i++) {
    const at = i * table.reads
    if (looped) solveLines(tuning, table, at, line)
    const lr = lines[2 * line] as number
    const li = lines[2 * line + 1] as number
    sumReads(tuning, table, at + from, at + from + voices, sum)
    const sr = sum[0] as number
    const si = sum[1] as number
    const mr = wr * sr - wi * si
    const mi = wr * si + wi * sr
    let re: number
    let im: number
    if (frozen.dryTap === 'line') {
      const tr = frozen.dry * dryRe + mr
      const ti = frozen.dry * dryIm + mi
      re = tr * lr - ti * li
      im = tr * li + ti * lr
    } else {
      re = frozen.dry * dryRe + mr * lr - mi * li
      im = frozen.dry * dryIm + mr * li + mi * lr
    }
    out[2 * i] = gain * re
    out[2 * i + 1] = gain * im
  }
}

/** w of the lines for u = 1; of `line` alone where lines do not feed each other. */
function solveLines(tuning: Tuning, table: PathTable, at: number, line: number): void {
  const { loops, lines, loop, sum, frozen } = tuning
  const k = frozen.loop.crossFeed
  const both = k !== 0 && frozen.lines === 2
  const cr = loop[0] as number
  const ci = loop[1] as number
  for (let l = both ? 0 : line; l <= (both ? 1 : line); l++) {
    sumReads(tuning, table, at + l, at + l + 1, sum)
    loops[2 * l] = (sum[0] as number) * cr - (sum[1] as number) * ci
    loops[2 * l + 1] = (sum[0] as number) * ci + (sum[1] as number) * cr
  }
  if (!both) {
    const gr = 1 - (loops[2 * line] as number)
    const gi = -(loops[2 * line + 1] as number)
    const size = gr * gr + gi * gi
    lines[2 * line] = gr / size
    lines[2 * line + 1] = -gi / size
    return
  }
  // Cramer as in transfer.ts.
  const ar = loops[0] as number
  const ai = loops[1] as number
  const br = loops[2] as number
  const bi = loops[3] as number
  const c = 1 - 2 * k
  const dr = 1 - (1 - k) * (ar + br) + c * (ar * br - ai * bi)
  const di = -(1 - k) * (ai + bi) + c * (ar * bi + ai * br)
  const size = dr * dr + di * di
  for (let l = 0; l < 2; l++) {
    const nr = 1 - c * (l === 0 ? br : ar)
    const ni = -c * (l === 0 ? bi : ai)
    lines[2 * l] = (nr * dr + ni * di) / size
    lines[2 * l + 1] = (ni * dr - nr * di) / size
  }
}

function sumReads({ re, im, lowest }: Tuning, table: PathTable, from: number, to: number, out: Float64Array): void {
  const { first, taps, pole } = table
  let sr = 0
  let si = 0
  for (let r = from; r < to; r++) {
    const n = (first[r] as number) - lowest
    const t = TABLE_TAPS * r
    const t0 = taps[t] as number
    const t1 = taps[t + 1] as number
    const t2 = taps[t + 2] as number
    const t3 = taps[t + 3] as number
    const vr = t0 * (re[n] as number) + t1 * (re[n + 1] as number) + t2 * (re[n + 2] as number) + t3 * (re[n + 3] as number)
    const vi = t0 * (im[n] as number) + t1 * (im[n + 1] as number) + t2 * (im[n + 2] as number) + t3 * (im[n + 3] as number)
    const eta = pole[r] as number
    if (eta === 0) {
      sr += vr
      si += vi
    } else {
      // 1 + η E, with E the ratio of two neighbouring phasors.
      const a = re[n] as number
      const b = im[n] as number
      const er = a * (re[n + 1] as number) + b * (im[n + 1] as number)
      const ei = a * (im[n + 1] as number) - b * (re[n + 1] as number)
      const qr = 1 + eta * er
      const qi = eta * ei
      const size = qr * qr + qi * qi
      sr += (vr * qr + vi * qi) / size
      si += (vi * qr - vr * qi) / size
    }
  }
  out[0] = sr
  out[1] = si
}
