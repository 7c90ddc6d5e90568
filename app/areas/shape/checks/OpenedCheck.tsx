// What a check opens to: its limit, where it has one that may be the set's own, and its working.
import './opened.css'
import { limitOf } from '../../../../src/checks/limits.ts'
import type { Check } from '../../../../src/checks/types.ts'
import { useCurrent } from '../../../state/current.ts'
import { LimitField } from './LimitField.tsx'
import { Working } from './Working.tsx'

export function OpenedCheck({ id, check }: { readonly id: string; readonly check: Check }) {
  const judged = useCurrent(({ set }) => limitOf(set, check.id).row.sense !== 'none')
  return (
    <section className="cw-check-box cw-working" id={id} aria-label={`Working: ${check.label}`}>
      {judged ? <LimitField id={check.id} /> : null}
      <Working steps={check.working} />
    </section>
  )
}
