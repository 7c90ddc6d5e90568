// A field of the set by its path: which kind, from the table; what is usual and what follows, from the set's other values.
import { Suspense } from 'react'
import { isMovable } from '../../../../src/set/panelProblems.ts'
import { parted } from '../../../../src/set/panelSettle.ts'
import { parameter } from '../../../../src/set/parameters.ts'
import { usualRange } from '../../../../src/set/usualRanges.ts'
import { type Binding, useField } from '../../../fields/binding.ts'
import { ChoiceField } from '../../../fields/ChoiceField.tsx'
import { keepTypedTempo, quantityContext } from '../../../fields/contexts.ts'
import { firstValue } from '../../../fields/firstValues.ts'
import { NumberField } from '../../../fields/NumberField.tsx'
import { SwitchField } from '../../../fields/SwitchField.tsx'
import { TextField } from '../../../fields/TextField.tsx'
import { fetched } from '../../../shell/fetched.tsx'
import { useCurrent } from '../../../state/current.ts'
import { useView } from '../../../state/view.ts'
import { FieldKnob } from '../panel/FieldKnob.tsx'
import { fieldNotes } from './notes.ts'

interface SetFieldProps {
  readonly path: string
  /** Lines kept for what follows from the value. */
  readonly lines?: number
  readonly label?: string
  /** What follows from the value, where it is not {@link fieldNotes} that knows it. */
  readonly notes?: readonly string[]
}

const KnobNote = fetched(() => import('../panel/KnobNote.tsx').then((part) => part.KnobNote))

/** The field, its knob at the label, and what is to be settled where the two have parted. */
export function SetField(props: SetFieldProps) {
  const isParted = useCurrent((s) => parted(s.set, props.path) !== null)
  return (
    <>
      <OwnField {...props} />
      {isParted && (
        <Suspense fallback={null}>
          <KnobNote path={props.path} />
        </Suspense>
      )}
    </>
  )
}

function OwnField({ path, lines, label, notes: given }: SetFieldProps) {
  const row = parameter(path)
  const named = label === undefined ? row : { ...row, label }
  const binding = useField<unknown>(path)
  const set = useCurrent((s) => s.set)
  const tempoBpm = useView((s) => s.tempoBpm)
  const notes = given ?? fieldNotes(path, set, { tempoBpm })
  const aside = isMovable(row) ? <FieldKnob path={path} /> : undefined
  switch (named.kind) {
    case 'choice':
      return <ChoiceField spec={named} binding={binding as Binding<string | null>} notes={notes} aside={aside} />
    case 'boolean':
      return <SwitchField spec={named} binding={binding as Binding<boolean>} aside={aside} />
    case 'text':
      return <TextField spec={named} binding={binding as Binding<string>} {...(path === 'notes' ? { rows: 6 } : {})} />
    default:
      return (
        <NumberField
          spec={named}
          binding={binding as Binding<number | null>}
          context={quantityContext}
          usual={usualRange(set.intent, path)}
          notes={notes}
          whenOff={firstValue(path)}
          onApplied={keepTypedTempo}
          aside={aside}
          {...(lines === undefined ? {} : { lines })}
        />
      )
  }
}
