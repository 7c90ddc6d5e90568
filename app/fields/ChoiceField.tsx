import './fields.css'
import { type ReactNode, useId, useState } from 'react'
import type { ChoiceParameter } from '../../src/set/parameters.ts'
import type { Binding, Refusal } from './binding.ts'
import { FieldNotes } from './FieldNotes.tsx'

interface ChoiceFieldProps {
  readonly spec: Pick<ChoiceParameter, 'label' | 'help' | 'options' | 'nullable'>
  readonly binding: Binding<string | null>
  readonly notes?: readonly string[]
  /** Stands beside the label: the field's knob. */
  readonly aside?: ReactNode
}

const OFF = ''

/** One of a few. A choice that would need a second change is refused with the ways to have it, like a number. */
export function ChoiceField({ spec, binding, notes = [], aside }: ChoiceFieldProps) {
  const id = useId()
  const [refusal, setRefusal] = useState<Refusal>(null)
  const { value } = binding
  const [lastValue, setLastValue] = useState(value)
  if (value !== lastValue) {
    setLastValue(value)
    setRefusal(null)
  }
  const chosen = spec.options.find((option) => option.value === value)
  return (
    <div className="cw-field cw-field--choice" data-off={value === null || undefined}>
      <div className="cw-field-row">
        <label className="cw-field-label" htmlFor={id} title={spec.help}>
          {spec.label}
        </label>
        {aside}
        <span className="cw-field-value cw-choice">
          <span className="cw-choice-shown" aria-hidden="true">
            {chosen?.label ?? 'off'} <span className="cw-choice-arrow">▾</span>
          </span>
          <span id={`${id}-help`} hidden>
            {spec.help}
          </span>
          <select
            id={id}
            className="cw-choice-select"
            aria-describedby={`${id}-help ${id}-notes`}
            value={value ?? OFF}
            onChange={(event) => setRefusal(binding.apply(event.target.value === OFF ? null : event.target.value))}
          >
            {spec.nullable && <option value={OFF}>off</option>}
            {spec.options.map((option) => (
              <option key={option.value} value={option.value}>
                {option.label}
              </option>
            ))}
          </select>
        </span>
      </div>
      <FieldNotes id={`${id}-notes`} notes={notes} lines={notes.length > 0 ? 1 : 0} refusal={refusal} />
    </div>
  )
}
