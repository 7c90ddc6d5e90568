// Where a new set of each intent starts.
import { defaultSet } from './defaults.ts'
import type { Intent, ParameterSet } from './types.ts'

export function startingSet(intent: Intent): ParameterSet {
  return { ...defaultSet(), intent }
}
