// How delays in samples are written.
import { quantity } from './loopText.ts'

/** "1 sample", "0.5 samples". */
export function samplesText(samples: number): string {
  const number = quantity(samples)
  return `${number} ${number === '1' || number === '−1' ? 'sample' : 'samples'}`
}
