// The checks where the page is narrow: one line that opens.
import './checks.css'
import { useEffect, useId, useState } from 'react'
import { followChecks } from '../../../state/checks.ts'
import { STATUS_SIGN, useVerdict } from '../../../state/verdict.ts'
import { ChecksBar } from './ChecksBar.tsx'
import { ChecksList } from './ChecksList.tsx'
import { useVerdictWords } from './verdictWords.ts'

export function ChecksLine() {
  useEffect(followChecks, [])
  const [open, setOpen] = useState(false)
  const verdict = useVerdict((state) => state.verdict)
  const id = useId()
  return (
    <section className="cw-checks" data-line aria-label="Checks">
      <button type="button" className="cw-checks-line" aria-expanded={open} aria-controls={id} onClick={() => setOpen(!open)}>
        <span className="cw-check-sign" data-status={verdict ?? undefined} aria-hidden="true">
          {verdict ? STATUS_SIGN[verdict] : ''}
        </span>
        <span>{useVerdictWords()}</span>
        <span className="cw-checks-open" aria-hidden="true">
          {open ? '▴' : '▾'}
        </span>
      </button>
      <div id={id}>
        {open && (
          <>
            <ChecksBar />
            <ChecksList />
          </>
        )}
      </div>
    </section>
  )
}
