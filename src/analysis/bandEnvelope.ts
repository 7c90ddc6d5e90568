// What a frozen response does inside each of many bands: for plots whose columns are wider than the comb's teeth.

import type { ChannelEnvelope } from './envelope.ts'
import { frozenExtremes } from './extremes.ts'
import type { Frozen } from './frozen.ts'
import { decibels } from './response.ts'
import { transferAt, transferOf } from './transfer.ts'

/** Band edges in Hz, columns + 1 of them, at equal ratios from lowHz to highHz (0 < lowHz < highHz; throws RangeError). */
export function logBandEdges(lowHz: number, highHz: number, columns: number): Float64Array {
  if (!(lowHz > 0 && highHz > lowHz)) throw new RangeError(`band edges need 0 < lowHz < highHz, got ${lowHz} and ${highHz}`)
  if (!(Number.isInteger(columns) && columns > 0)) throw new RangeError(`columns must be a whole number above 0, got ${columns}`)
  return Float64Array.from({ length: columns + 1 }, (_, i) => (i === columns ? highHz : lowHz * (highHz / lowHz) ** (i / columns)))
}

/**
 * Smallest and largest level of each channel inside each band [edgesHz[i], edgesHz[i + 1]], dB: the band's ends and every notch and
 * peak in it, each turning point sought to 1 in 2000 of the narrowest tooth. edgesHz ascending in [0, sampleRate/2], two or more (throws RangeError).
 */
export function bandEnvelope(frozen: Frozen, edgesHz: ArrayLike<number>): ChannelEnvelope[] {
  const bands = edgesHz.length - 1
  checkEdges(edgesHz, frozen.sampleRate / 2)
  const highHz = edgesHz[bands] as number
  const transfer = transferOf(frozen)
  const out = new Float64Array(4 * transfer.channels)
  const channels = frozen.channels.map(() => ({
    minDb: new Float64Array(bands).fill(Number.POSITIVE_INFINITY),
    maxDb: new Float64Array(bands).fill(Number.NEGATIVE_INFINITY),
  }))
  const widen = (channel: number, band: number, db: number) => {
    const at = channels[channel]
    if (!at || band < 0 || band >= bands) return
    at.minDb[band] = Math.min(at.minDb[band] as number, db)
    at.maxDb[band] = Math.max(at.maxDb[band] as number, db)
  }
  for (let i = 0; i <= bands; i++) {
    transferAt(transfer, (2 * Math.PI * (edgesHz[i] as number)) / frozen.sampleRate, out)
    for (let c = 0; c < channels.length; c++) {
      const db = decibels((out[4 * c] as number) ** 2 + (out[4 * c + 1] as number) ** 2)
      widen(c, i - 1, db)
      widen(c, i, db)
    }
  }
  const tooth = frozen.sampleRate / transfer.longest
  let band = 0
  let channel = 0
  for (const extreme of frozenExtremes(frozen, { maxHz: highHz, withinHz: tooth / 2000 })) {
    if (extreme.channel !== channel) band = 0
    channel = extreme.channel
    while (band < bands && (edgesHz[band + 1] as number) < extreme.frequencyHz) band++
    if (extreme.frequencyHz >= (edgesHz[0] as number)) widen(channel, band, extreme.db)
  }
  return channels
}

function checkEdges(edgesHz: ArrayLike<number>, nyquist: number): void {
  if (edgesHz.length < 2) throw new RangeError(`edgesHz must have at least 2 entries, got ${edgesHz.length}`)
  for (let i = 0; i < edgesHz.length; i++) {
    const hz = edgesHz[i] as number
    if (!(hz >= 0 && hz <= nyquist) || (i > 0 && !(hz > (edgesHz[i - 1] as number))))
      throw new RangeError(`edgesHz must ascend within [0, ${nyquist}] Hz, got ${hz} at ${i}`)
  }
}
