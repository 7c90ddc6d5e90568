// What a knob can move, in the groups of the signal path.
import { moveOf } from '../../../../src/set/panelEdit.ts'
import { isMovable } from '../../../../src/set/panelProblems.ts'
import { PARAMETERS } from '../../../../src/set/parameters.ts'
import { getAt } from '../../../../src/set/path.ts'
import type { ParameterSet } from '../../../../src/set/types.ts'
import { parameterLabel } from './panelWords.ts'

export interface MovableGroup {
  readonly label: string
  readonly options: readonly { readonly path: string; readonly label: string }[]
}

const GROUPS: readonly (readonly [string, RegExp])[] = [
  ['Input', /^input\./],
  ['Line and sweep', /^(line|sweep)\./],
  ['Voices', /^voices\./],
  ['Loop', /^loop\./],
  ['Mix and output', /^mix\./],
]

/** Fields that a knob could move as the set stands: shapers that are there, filters that are on or off, nothing that is on a knob already. */
export function movableGroups(set: ParameterSet): readonly MovableGroup[] {
  const free = PARAMETERS.filter((row) => isMovable(row) && getAt(set, row.path) !== undefined && moveOf(set, row.path) === null)
    // A shaper that is not there has no curve to move.
    .filter((row) => !(row.path.endsWith('.shaper.curve') && getAt(set, row.path) === null))
  return GROUPS.map(([label, own]) => ({
    label,
    options: free.filter(({ path }) => own.test(path)).map(({ path }) => ({ path, label: parameterLabel(path) })),
  })).filter(({ options }) => options.length > 0)
}
