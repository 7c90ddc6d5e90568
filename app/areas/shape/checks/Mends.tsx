// Ways to mend a check, each a button that makes the change as one step of history.
import { useState } from 'react'
import type { Mend } from '../../../../src/checks/types.ts'
import { isParameterPath } from '../../../../src/set/parameters.ts'
import { withAt } from '../../../../src/set/path.ts'
import { commit, committedSet } from '../../../state/document.ts'
import { endGesture } from '../../../state/draft.ts'
import { commitField, judge, type Proposal } from '../../../state/edit.ts'

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

function applyMend({ label, path, value }: Mend): Proposal {
  if (isParameterPath(path)) return commitField(path, value)
  // A whole shaper is no single field.
  endGesture()
  const proposal = judge(withAt(committedSet(), path, value), path)
  if (proposal.ok) commit(label, proposal.set)
  return proposal
}
