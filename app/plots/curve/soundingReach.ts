// How far the sound reaches up the curve now, where that is known: at the input from the input's meter, at the output from the output's. What
// stands before the loop's shaper is not metered.
import { currentSet } from '../../state/current.ts'
import { live } from '../../state/live.ts'
import type { Shown } from './curveWords.ts'

export interface Reach {
  /** Whether the peak is of what goes in, or of what comes out. */
  readonly of: 'in' | 'out'
  readonly peak: number
}

const gain = (db: number) => 10 ** (db / 20)

export function soundingReach(shown: Shown | null): Reach | null {
  if (!shown || !live.running) return null
  const { input, mix } = currentSet()
  const peak =
    shown.name === 'input shaper' ? gain(Math.max(...live.inPeakDb) + input.gainDb) : gain(Math.max(...live.outPeakDb) - mix.outputGainDb)
  if (shown.name === 'loop shaper' || !(peak > 1e-4)) return null
  return { of: shown.name === 'input shaper' ? 'in' : 'out', peak }
}
