// Built-in phrases at the context's rate.
import { PHRASES } from '../../../src/material/phraseList.ts'
import { phrase } from '../../../src/material/phrases.ts'
import type { Made } from './memory.ts'

/** Throws RangeError for an id that is no phrase (a mistake of ours, or a kept state of another version). */
export function renderPhrase(id: string, rate: number): Made {
  const known = PHRASES.find((info) => info.id === id)
  if (!known) throw new RangeError(`no phrase has the id ${id}`)
  const samples = Float32Array.from(phrase(known.id, rate))
  return { channels: [samples], rate, sourceChannels: 1, sourceRate: rate, remarks: [] }
}
