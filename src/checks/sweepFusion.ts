// sweep.fusion: the largest delay, past which dry and wet are heard apart.
import { delayRange } from '../set/delayRange.ts'
import { judge, labelOf, limitOf } from './limits.ts'
import { quantity } from './loopText.ts'
import type { Check, CheckFunction } from './types.ts'

export const sweepFusion: CheckFunction = ({ set, sampleRate }): Check => {
  const limit = limitOf(set, 'sweep.fusion')
  const { maxSamples } = delayRange(set, sampleRate).voices
  const value = (maxSamples * 1000) / sampleRate
  const status = judge(limit, value)
  const figure = quantity(value, 'ms')
  const bound = quantity(limit.limit ?? 0, 'ms')
  return {
    id: 'sweep.fusion',
    status,
    value,
    limit: limit.limit,
    unit: 'ms',
    label: labelOf('sweep.fusion'),
    text:
      status === 'holds'
        ? `The longest delay is ${figure}${set.mix.dry === 0 ? '' : ': the ear takes it with the dry sound'}.`
        : `The longest delay is ${figure}: past about ${bound} it is heard as a sound of its own.`,
    working: [
      {
        formula: 'largest delay of the voices over the sweep',
        numbers: `${set.voices.count === 1 ? '1 voice' : `${set.voices.count} voices`}, base ${quantity(set.line.baseMs, 'ms')}`,
        result: figure,
        source: 'closed form over s',
      },
      {
        formula: 'delay ≤ limit',
        numbers: `limit ${bound}`,
        result: status === 'holds' ? 'fused' : 'heard apart',
        source: limit.own
          ? 'the set’s own limit'
          : 'common practice; echo thresholds of 30 to 50 ms for speech: Litovsky et al. 1999, Blauert 1983 (from memory)',
      },
    ],
  }
}
