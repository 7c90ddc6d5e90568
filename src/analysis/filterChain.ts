// First-order filters and half-sample averages of the path as functions of E = e^{−jω}, with their derivative by ω.
import { dual, multiply } from './dual.ts'
import type { Frozen, FrozenTone } from './frozen.ts'

/** gain · (1−a)/(1−aE) · (1+b)/2 (1−E)/(1−bE) · ((1+E)/2)^averages. */
export interface FilterChain {
  readonly gain: number
  readonly tone: FrozenTone
  readonly averages: number
}

/** Everything once round the loop but its read. */
export function loopChain({ loop }: Frozen): FilterChain {
  return { gain: loop.gain * loop.slope.slope, tone: loop.tone, averages: Number(loop.slope.averaged) }
}

/** The filters behind the voices. */
export function wetChain({ wetTone }: Frozen): FilterChain {
  return { gain: 1, tone: wetTone, averages: 0 }
}

/** What both dry and wet pass: gains and shapers of input and output. */
export function outerChain({ inputGain, input, outputGain, output }: Frozen): FilterChain {
  const averages = Number(input.averaged) + Number(output.averaged)
  return { gain: inputGain * input.slope * outputGain * output.slope, tone: { lowPass: null, highPass: null }, averages }
}

/** The chain and its derivative by ω at E = er + j ei into the dual `out`. */
export function chainAt(chain: FilterChain, er: number, ei: number, out: Float64Array): void {
  out[0] = chain.gain
  out[1] = 0
  out[2] = 0
  out[3] = 0
  const a = chain.tone.lowPass
  if (a !== null) section(out, er, ei, { n0: 1 - a, n1: 0, p: a })
  const b = chain.tone.highPass
  if (b !== null) section(out, er, ei, { n0: (1 + b) / 2, n1: -(1 + b) / 2, p: b })
  for (let k = 0; k < chain.averages; k++) section(out, er, ei, AVERAGE)
}

interface Section {
  readonly n0: number
  readonly n1: number
  readonly p: number
}

const AVERAGE: Section = { n0: 0.5, n1: 0.5, p: 0 }

const stage = dual()

/** out ← out · (n0 + n1 E)/(1 − p E). */
function section(out: Float64Array, er: number, ei: number, { n0, n1, p }: Section): void {
  const qr = 1 - p * er
  const qi = -p * ei
  const q2 = qr * qr + qi * qi
  const nr = n0 + n1 * er
  const ni = n1 * ei
  const hr = (nr * qr + ni * qi) / q2
  const hi = (ni * qr - nr * qi) / q2
  // d/dE = (n1 + p H)/(1 − p E), then times −jE.
  const mr = n1 + p * hr
  const mi = p * hi
  const gr = (mr * qr + mi * qi) / q2
  const gi = (mi * qr - mr * qi) / q2
  stage[0] = hr
  stage[1] = hi
  stage[2] = er * gi + ei * gr
  stage[3] = ei * gi - er * gr
  multiply(out, out, stage)
}
