// A number that is typed with its unit, dragged and stepped. Beneath it, room kept for what follows from the value, or for why it was refused.
import './fields.css'
import { type ReactNode, useId } from 'react'
import type { QuantityContext } from '../../src/set/units.ts'
import type { Binding } from './binding.ts'
import { FieldNotes } from './FieldNotes.tsx'
import { NumberInput } from './NumberInput.tsx'
import type { NumberSpec } from './quantity.ts'
import { Track } from './Track.tsx'
import { positionOf, trackHigh, trackLow, valueAt } from './taper.ts'
import { useNumberText } from './useNumberText.ts'
import { useScrub } from './useScrub.ts'

export interface NumberFieldProps {
  readonly spec: NumberSpec
  readonly binding: Binding<number | null>
  readonly context?: () => QuantityContext
  /** A usual range, as a band on the track. */
  readonly usual?: { readonly low: number; readonly high: number } | null
  /** What follows from the value; `lines` keeps that much room whatever it says. */
  readonly notes?: readonly string[]
  readonly lines?: number
  /** First value when the field is switched on. */
  readonly whenOff?: number
  readonly onApplied?: (text: string) => void
  /** Stands beside the label: the field's knob. */
  readonly aside?: ReactNode
}

const noContext = () => ({})

export function NumberField({
  spec,
  binding,
  context = noContext,
  usual = null,
  notes = [],
  lines,
  whenOff,
  onApplied,
  aside,
}: NumberFieldProps) {
  const id = useId()
  const { value } = binding
  const startAt = whenOff ?? trackLow(spec)
  const text = useNumberText({ spec, binding, context, whenOff: startAt, onApplied })
  const scrub = useScrub({
    position: () => positionOf(spec, value ?? startAt),
    move: (position) => text.setHeld(binding.attempt(valueAt(spec, position))),
    end: binding.settle,
  })
  const switchable = spec.nullable === true
  return (
    <div className="cw-field" data-off={value === null || undefined}>
      <div className="cw-field-row">
        <label className="cw-field-label cw-field-label--drag" htmlFor={id} title={spec.help} {...scrub.label}>
          {spec.label}
        </label>
        {aside}
        {switchable && <OffSwitch label={spec.label} on={value !== null} onClick={() => binding.apply(value === null ? startAt : null)} />}
        <span className="cw-field-value">
          <NumberInput id={id} text={text} spec={spec} value={value} describedBy={`${id}-help ${id}-notes`} />
          <span id={`${id}-help`} hidden>
            {spec.help}
          </span>
          {spec.unit && value !== null && <span className="cw-field-unit">{spec.unit}</span>}
        </span>
      </div>
      <Track
        at={value === null ? null : positionOf(spec, value)}
        from={trackLow(spec) < 0 && trackHigh(spec) > 0 ? positionOf(spec, 0) : 0}
        band={usual && [positionOf(spec, usual.low), positionOf(spec, usual.high)]}
        handlers={scrub.track}
      />
      <FieldNotes id={`${id}-notes`} notes={notes} lines={lines ?? (notes.length > 0 ? 1 : 0)} refusal={text.refusal} held={text.held} />
    </div>
  )
}

function OffSwitch({ label, on, onClick }: { readonly label: string; readonly on: boolean; readonly onClick: () => void }) {
  return (
    <button type="button" className="cw-switch" role="switch" aria-checked={on} aria-label={`${label} in the path`} onClick={onClick}>
      {on ? 'on' : 'off'}
    </button>
  )
}
