// Ways to mend a check, each a button that makes the change as one step of history.
import { useState } from 'react'
import type { Mend } from '../../../../src/checks/types.ts'
import { applyMend } from '../../../state/mend.ts'

export function Mends({ label, mends }: { readonly label: string; readonly mends: readonly Mend[] }) {
  const [refused, setRefused] = useState('')
  const apply = (mend: Mend) => {
    const proposal = applyMend(mend)
    setRefused(proposal.ok ? '' : (proposal.problems[0]?.message ?? 'this change is not possible now'))
  }
  return (
    <fieldset className="cw-check-box cw-check-mends" aria-label={`Ways to mend: ${label}`}>
      {mends.map((mend) => (
        <button key={mend.label} type="button" className="cw-button" tabIndex={-1} onClick={() => apply(mend)}>
          {mend.label}
        </button>
      ))}
      {refused === '' ? null : <p role="alert">{refused}</p>}
    </fieldset>
  )
}
