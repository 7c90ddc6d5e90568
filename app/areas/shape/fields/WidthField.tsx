import { useMemo } from 'react'
import type { ParameterSet } from '../../../../src/set/types.ts'
import { type Binding, type Refusal, refusal } from '../../../fields/binding.ts'
import { NumberField } from '../../../fields/NumberField.tsx'
import type { NumberSpec } from '../../../fields/quantity.ts'
import { useCurrent } from '../../../state/current.ts'
import { committedSet } from '../../../state/document.ts'
import { dropGesture, endGesture } from '../../../state/draft.ts'
import { commitField, tryField } from '../../../state/edit.ts'
import { detuneOf } from './detuneOf.ts'
import { widthText } from './notes.ts'
import { depthPath, solveWidth } from './solveWidth.ts'

const WIDTH: NumberSpec = {
  kind: 'number',
  label: 'Width',
  help: 'Largest change of pitch either way; setting it sets the depth.',
  unit: 'cents',
  min: 0,
  max: 4800,
  taper: 'log',
  trackMin: 0.5,
  trackMax: 300,
}

/** Width in cents, the other face of depth at this rate and shape. */
export function WidthField() {
  const set = useCurrent((s) => s.set)
  const value = detuneOf(set).maxCents
  const binding = useMemo((): Binding<number | null> => ({ value: value ?? WIDTH.max, ...ACTS }), [value])
  return <NumberField spec={WIDTH} binding={binding} notes={[widthText(set)]} />
}

const ACTS: Omit<Binding<number | null>, 'value'> = {
  attempt: (cents) => {
    const set = committedSet()
    const depth = solveWidth(set, cents ?? 0)
    if (depth === null) return unreachable(set).why
    return tryField(depthPath(set), depth) ? 'Held: the delay would come too close to the write point' : null
  },
  settle: endGesture,
  drop: dropGesture,
  apply: (cents): Refusal => {
    endGesture()
    const set = committedSet()
    const depth = solveWidth(set, cents ?? 0)
    if (depth === null) return unreachable(set)
    const path = depthPath(set)
    return refusal(path, commitField(path, depth), null)
  },
}

function unreachable(set: ParameterSet) {
  const why =
    set.sweep.rateHz === 0 ? 'A sweep that stands still bends no pitch: set a rate first' : 'No depth reaches this width at this rate'
  return { why, ways: [] }
}
