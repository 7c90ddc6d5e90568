// The limit a check is judged against, editable in place. Once typed it is the set's own and travels in its file, until taken away.
import { useId, useMemo } from 'react'
import { type CheckId, limitOf } from '../../../../src/checks/limits.ts'
import { FieldNotes } from '../../../fields/FieldNotes.tsx'
import { NumberInput } from '../../../fields/NumberInput.tsx'
import { showIn } from '../../../fields/quantity.ts'
import { useNumberText } from '../../../fields/useNumberText.ts'
import { useCurrent } from '../../../state/current.ts'
import { limitBinding, limitSpec, tableLimit } from './ownLimit.ts'

export function LimitField({ id }: { readonly id: CheckId }) {
  const set = useCurrent((state) => state.set)
  const fieldId = useId()
  const { limit, own } = limitOf(set, id)
  const table = tableLimit(set, id)
  const spec = limitSpec(set, id)
  const binding = useMemo(() => limitBinding(id, limit), [id, limit])
  const text = useNumberText({ spec, binding, context: () => ({}), whenOff: table ?? 0 })
  return (
    <div className="cw-field cw-limit">
      <div className="cw-field-row">
        <label className="cw-field-label" htmlFor={fieldId} title={spec.help}>
          {own ? 'Own limit' : 'Limit'}
        </label>
        <span className="cw-field-value">
          <NumberInput id={fieldId} text={text} spec={spec} value={limit} describedBy={`${fieldId}-notes`} />
          {spec.unit && <span className="cw-field-unit">{spec.unit}</span>}
        </span>
        {own && (
          <button type="button" className="cw-button" tabIndex={-1} onClick={() => binding.apply(null)}>
            {table === null ? 'No limit' : `Back to ${showIn(table, spec.unit)}`}
          </button>
        )}
      </div>
      <FieldNotes id={`${fieldId}-notes`} notes={[]} lines={0} refusal={text.refusal} held={text.held} />
    </div>
  )
}
