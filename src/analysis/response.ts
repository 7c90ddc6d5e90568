// The exact response of a frozen set at chosen frequencies: magnitude, phase and group delay of every output channel.
import type { Frozen } from './frozen.ts'
import { transferAt, transferOf } from './transfer.ts'

export interface ChannelResponse {
  readonly frequenciesHz: Float64Array
  readonly re: Float64Array
  readonly im: Float64Array
  /** 20 log10 |H|, held within ±DB_LIMIT. */
  readonly db: Float64Array
  /** arg H in (−π, π]; 0 where H is 0. */
  readonly phaseRad: Float64Array
  /** −d arg H/dω, in samples; at a null, where it jumps, the mean of both sides. */
  readonly groupDelaySamples: Float64Array
}

/** dB floor (|H| < 1e-20), and ceiling at a pole on the unit circle. */
export const DB_LIMIT = 400

/** A zero nearer than this, in rad/sample, is taken as a null at the frequency asked for: rounding alone decides its phase. */
const NULL_DISTANCE = 1e-9

/**
 * H_c(f) of every output channel, the same signal at every input. frequenciesHz: each in [0, sampleRate/2]; throws RangeError
 * outside. Formula: DESIGN 3 "Frozen"; group delay from the derivative of H, −Im(H'/H).
 */
export function frozenResponse(frozen: Frozen, frequenciesHz: ArrayLike<number>): ChannelResponse[] {
  const count = frequenciesHz.length
  const channels = frozen.channels.map(() => ({
    frequenciesHz: Float64Array.from(frequenciesHz),
    re: new Float64Array(count),
    im: new Float64Array(count),
    db: new Float64Array(count),
    phaseRad: new Float64Array(count),
    groupDelaySamples: new Float64Array(count),
  }))
  const transfer = transferOf(frozen)
  const out = new Float64Array(4 * channels.length)
  const side = new Float64Array(4 * channels.length)
  for (let i = 0; i < count; i++) {
    const hz = frequenciesHz[i] as number
    if (!(hz >= 0 && hz <= frozen.sampleRate / 2))
      throw new RangeError(`frequenciesHz[${i}] must be in [0, ${frozen.sampleRate / 2}] Hz, got ${hz}`)
    const omega = (2 * Math.PI * hz) / frozen.sampleRate
    transferAt(transfer, omega, out)
    channels.forEach((channel, c) => {
      const [re, im] = finiteValue(out[4 * c] as number, out[4 * c + 1] as number)
      channel.re[i] = re
      channel.im[i] = im
      channel.db[i] = decibels(re * re + im * im)
      channel.phaseRad[i] = Math.atan2(im, re)
      let delay = groupDelay(out, c)
      if (delay === null) {
        // The step keeps both sides clear of the null and, at 0 and fs/2, uses that H is the same mirrored.
        const step = 1e-6
        transferAt(transfer, omega - step, side)
        const below = groupDelay(side, c)
        transferAt(transfer, omega + step, side)
        delay = ((below ?? 0) + (groupDelay(side, c) ?? 0)) / 2
      }
      channel.groupDelaySamples[i] = delay
    })
  }
  return channels
}

/** 10 log10 of a power, held within ±DB_LIMIT. */
export function decibels(power: number): number {
  return Math.max(-DB_LIMIT, Math.min(DB_LIMIT, 10 * Math.log10(power)))
}

/** A pole on the unit circle gives no number: its size is DB_LIMIT, its phase 0. */
function finiteValue(re: number, im: number): readonly [number, number] {
  return Number.isFinite(re) && Number.isFinite(im) ? [re, im] : [10 ** (DB_LIMIT / 20), 0]
}

/** −Im(H'/H), or null where H is as good as 0 or has no value. */
function groupDelay(dual: Float64Array, channel: number): number | null {
  const re = dual[4 * channel] as number
  const im = dual[4 * channel + 1] as number
  const dr = dual[4 * channel + 2] as number
  const di = dual[4 * channel + 3] as number
  const power = re * re + im * im
  const slope = Math.hypot(dr, di)
  if (!(power > 0) || Math.sqrt(power) < NULL_DISTANCE * slope) return null
  const delay = (im * dr - re * di) / power
  return Number.isFinite(delay) ? delay : null
}
