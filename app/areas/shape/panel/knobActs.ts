// Putting fields on knobs and taking them off: what the page offers at a field and in the panel, each one named step.
import { knobForField } from '../../../../src/set/panel.ts'
import { addKnob, addMove, moveForField, moveOf, removeMove } from '../../../../src/set/panelEdit.ts'
import { parameter } from '../../../../src/set/parameters.ts'
import { getAt, withAt } from '../../../../src/set/path.ts'
import type { Problem } from '../../../../src/set/result.ts'
import type { ParameterSet } from '../../../../src/set/types.ts'
import { firstValue } from '../../../fields/firstValues.ts'
import { committedSet } from '../../../state/document.ts'
import { stepName } from '../../../state/edit.ts'
import { commitPanel } from '../../../state/panel.ts'

/** The set with a field that is off switched on, so that a knob has somewhere to stand. */
function switchedOn(set: ParameterSet, path: string): ParameterSet {
  const row = parameter(path)
  return getAt(set, path) === null && row.kind === 'number' ? withAt(set, path, firstValue(path)) : set
}

/** A field put on a knob of its own, last in the row: one step. Returns the problems; empty when it was put there. */
export function putOnNewKnob(path: string): readonly Problem[] {
  return commitPanel(`${stepName(path)} on a knob`, (before) => {
    const set = switchedOn(takenOff(before, path), path)
    const knob = knobForField(set, path)
    if (!knob) throw new RangeError(`${path} cannot be put on a knob`)
    return addKnob(set, { ...knob, knob: stepName(path) })
  })
}

/** A field put on a knob that is there, scaled so that the knob gives, where it stands, the value the field has. */
export function putOnKnob(path: string, index: number): readonly Problem[] {
  return commitPanel(`${stepName(path)} on knob ${committedSet().panel[index]?.knob ?? ''}`, (before) => {
    const set = switchedOn(before, path)
    const move = moveForField(set, path, set.panel[index]?.position ?? 0)
    if (!move) throw new RangeError(`${path} cannot be put on a knob`)
    return addMove(set, index, move)
  })
}

export function takeOffKnob(path: string): readonly Problem[] {
  return commitPanel(`${stepName(path)} off its knob`, (set) => takenOff(set, path))
}

function takenOff(set: ParameterSet, path: string): ParameterSet {
  const found = moveOf(set, path)
  return found ? removeMove(set, found.index, found.at) : set
}
