import './fields.css'
import { type KeyboardEvent, useId, useState } from 'react'
import type { TextParameter } from '../../src/set/parameters.ts'
import type { Binding } from './binding.ts'

interface TextFieldProps {
  readonly spec: Pick<TextParameter, 'label' | 'help' | 'maxLength'>
  readonly binding: Binding<string>
  readonly rows?: number
}

/** Text applied on leaving (a single line also on Enter) as one step; Escape restores. */
export function TextField({ spec, binding, rows }: TextFieldProps) {
  const id = useId()
  const [draft, setDraft] = useState<string | null>(null)
  const apply = () => {
    if (draft !== null) binding.apply(draft)
    setDraft(null)
  }
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.key === 'Enter' && rows === undefined) apply()
    if (event.key === 'Escape' && draft !== null) {
      event.preventDefault()
      setDraft(null)
    }
  }
  const common = {
    id,
    className: 'cw-text-input',
    maxLength: spec.maxLength,
    value: draft ?? binding.value,
    'data-edited': draft !== null,
    onChange: (event: { readonly target: { readonly value: string } }) => setDraft(event.target.value),
    onBlur: apply,
    onKeyDown,
  }
  return (
    <div className="cw-field cw-field--text">
      <label className="cw-field-label" htmlFor={id} title={spec.help}>
        {spec.label}
      </label>
      {rows === undefined ? <input type="text" {...common} /> : <textarea rows={rows} {...common} />}
    </div>
  )
}
