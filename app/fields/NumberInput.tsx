import { type NumberSpec, speakQuantity } from './quantity.ts'
import type { NumberText } from './useNumberText.ts'

interface NumberInputProps {
  readonly text: NumberText
  readonly spec: Pick<NumberSpec, 'unit' | 'min' | 'max'>
  readonly value: number | null
  /** What is spoken for null. */
  readonly none?: string
  readonly describedBy: string
  readonly id?: string
  /** Spoken name where no label element has it. */
  readonly label?: string
  readonly title?: string
}

/** The input of a number: text of our own, the role and spoken value of a spin button. */
export function NumberInput({ text, spec, value, none, describedBy, id, label, title }: NumberInputProps) {
  return (
    <input
      id={id}
      ref={text.ref}
      className="cw-field-input"
      type="text"
      autoComplete="off"
      spellCheck={false}
      role="spinbutton"
      title={title}
      aria-label={label}
      aria-valuenow={value ?? undefined}
      aria-valuemin={spec.min}
      aria-valuemax={spec.max}
      aria-valuetext={value === null && none !== undefined ? none : speakQuantity(value, spec)}
      aria-invalid={text.refusal ? true : undefined}
      aria-describedby={describedBy}
      data-edited={text.edited}
      value={text.text}
      onChange={text.onChange}
      onFocus={text.onFocus}
      onBlur={text.onBlur}
      onKeyDown={text.onKeyDown}
      onKeyUp={text.onKeyUp}
    />
  )
}
