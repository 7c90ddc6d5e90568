// A check's mend as one step of history: a field, a whole shaper, or the end of a knob's move ("panel[0].moves[1].max").
import type { Mend } from '../../src/checks/types.ts'
import { changeMove } from '../../src/set/panelEdit.ts'
import { isParameterPath } from '../../src/set/parameters.ts'
import { withAt } from '../../src/set/path.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { commit, committedSet } from './document.ts'
import { endGesture } from './draft.ts'
import { commitField, judge, type Proposal } from './edit.ts'

export function applyMend({ label, path, value }: Mend): Proposal {
  if (isParameterPath(path)) return commitField(path, value)
  endGesture()
  const proposal = judge(mended(committedSet(), path, value), path)
  if (proposal.ok) commit(label, proposal.set)
  return proposal
}

/** A knob whose end comes closer turns with it, so that what it gives and what the set has stay one. */
function mended(set: ParameterSet, path: string, value: Mend['value']): ParameterSet {
  const [, index, at, end] = /^panel\[(\d+)\]\.moves\[(\d+)\]\.(min|max)$/.exec(path) ?? []
  if (end === undefined || value === null) return withAt(set, path, value)
  return changeMove(set, Number(index), Number(at), { [end]: value })
}
