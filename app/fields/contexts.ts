// What a typed text may lean on: the tempo for parts of a whole note, the rate for times in samples.
import type { QuantityContext } from '../../src/set/units.ts'
import { currentSet } from '../state/current.ts'
import { useView } from '../state/view.ts'

export const quantityContext = (): QuantityContext => ({ tempoBpm: useView.getState().tempoBpm, sampleRate: currentSet().sampleRate })

/** Keeps the tempo that stood in a typed text ("1/4 @ 96"), so that beats are counted at it from then on. */
export function keepTypedTempo(text: string): void {
  const typed = /@\s*(\d+(?:[.,]\d+)?)/.exec(text)?.[1]
  const tempoBpm = typed === undefined ? Number.NaN : Number(typed.replace(',', '.'))
  if (tempoBpm >= 20 && tempoBpm <= 400) useView.setState({ tempoBpm })
}
