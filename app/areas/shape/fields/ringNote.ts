import { createShaper } from '../../../../src/dsp/shaper.ts'
import { delayRange } from '../../../../src/set/delayRange.ts'
import type { ParameterSet } from '../../../../src/set/types.ts'
import { showIn } from '../../../fields/quantity.ts'

/**
 * "one pass −4.2 dB · rings 0.09 s at most": gain of one pass through the loop for small signals, and the 60 dB decay it allows at the
 * longest delay, τ · 60 / −20 log10|g|, with filters and interpolation taken as the unity they never exceed. The exact time is the check loop.ring's.
 */
export function ringNote(set: ParameterSet): string {
  const { feedback, shaper } = set.loop
  const pass = Math.abs(feedback) * (shaper ? Math.abs(createShaper(shaper).slopeAtZero) : 1)
  if (pass === 0) return 'no loop'
  const passDb = 20 * Math.log10(pass)
  const level = `one pass ${passDb.toFixed(1).replace('-', '−')} dB`
  if (pass >= 1) return `${level}: grows until something holds it`
  const seconds = (delayRange(set).loop.maxSamples / set.sampleRate) * (60 / -passDb)
  return `${level} · rings ${showIn(Number(seconds.toPrecision(2)), 's')} at most`
}
