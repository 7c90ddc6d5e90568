import './fields.css'
import type { BooleanParameter } from '../../src/set/parameters.ts'
import type { Binding } from './binding.ts'

interface SwitchFieldProps {
  readonly spec: Pick<BooleanParameter, 'label' | 'help'>
  readonly binding: Binding<boolean>
}

export function SwitchField({ spec, binding }: SwitchFieldProps) {
  return (
    <div className="cw-field cw-field--choice">
      <div className="cw-field-row">
        <span className="cw-field-label" title={spec.help}>
          {spec.label}
        </span>
        <button
          type="button"
          className="cw-switch"
          role="switch"
          aria-checked={binding.value}
          aria-label={spec.label}
          onClick={() => binding.apply(!binding.value)}
        >
          {binding.value ? 'on' : 'off'}
        </button>
      </div>
    </div>
  )
}
