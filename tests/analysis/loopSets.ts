// Sets for tests of the loop, and a loop of our own to play: the definition, sample by sample, without engine, blocks or filters' shortcuts.
import { allpassCoefficient, firstTap, splitDelay, tapsOf } from '../../src/dsp/interpolators.ts'
import { defaultSet, defaultShaper } from '../../src/set/defaults.ts'
import { withAt } from '../../src/set/path.ts'
import type { Interpolation, ParameterSet, Shaper } from '../../src/set/types.ts'

/** The default set in mono with some fields changed, by path. */
export function loopSet(fields: Readonly<Record<string, unknown>>): ParameterSet {
  return Object.entries({ layout: 'mono', ...fields }).reduce((set, [path, value]) => withAt(set, path, value), defaultSet())
}

export const shaper = (curve: Shaper['curve'], fields: Partial<Shaper> = {}): Shaper => ({ ...defaultShaper(curve), ...fields })

/** w[n] = u[n] + g · read(w, D[n]), w read before it is written. */
export function playLoop(kind: Interpolation, delays: ArrayLike<number>, g: number, input: ArrayLike<number>): Float64Array {
  const w = new Float64Array(delays.length)
  let y = 0
  for (let n = 0; n < delays.length; n++) {
    const at = (k: number) => (n - k >= 0 ? (w[n - k] as number) : 0)
    const { whole, fraction } = splitDelay(kind, delays[n] as number)
    if (kind === 'allpass1') {
      const eta = allpassCoefficient(fraction)
      y = eta * at(whole) + at(whole + 1) - eta * y
    } else y = tapsOf(kind, fraction).reduce((sum, h, k) => sum + h * at(whole + firstTap(kind) + k), 0)
    w[n] = (input[n] ?? 0) + g * y
  }
  return w
}

export const energy = (x: Float64Array, from = 0, to = x.length): number => {
  let sum = 0
  for (let i = from; i < to; i++) sum += (x[i] as number) ** 2
  return sum
}
