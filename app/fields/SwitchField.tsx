import './fields.css'
import type { ReactNode } from 'react'
import type { BooleanParameter } from '../../src/set/parameters.ts'
import type { Binding } from './binding.ts'

interface SwitchFieldProps {
  readonly spec: Pick<BooleanParameter, 'label' | 'help'>
  readonly binding: Binding<boolean>
  /** Stands beside the label: the field's knob. */
  readonly aside?: ReactNode
}

export function SwitchField({ spec, binding, aside }: SwitchFieldProps) {
  return (
    <div className="cw-field cw-field--choice">
      <div className="cw-field-row">
        <span className="cw-field-label" title={spec.help}>
          {spec.label}
        </span>
        {aside}
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
