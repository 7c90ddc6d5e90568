// The right column: every check as a sentence with its figure and limit; one opens to its working.
import './checks.css'
import { useEffect } from 'react'
import { followChecks } from '../../../state/checks.ts'
import { ChecksBar } from './ChecksBar.tsx'
import { ChecksList } from './ChecksList.tsx'
import { useVerdictWords } from './verdictWords.ts'

export function ChecksColumn() {
  useEffect(followChecks, [])
  return (
    <section className="cw-checks" aria-labelledby="checks-head">
      <h2 className="cw-checks-head" id="checks-head">
        {useVerdictWords()}
      </h2>
      <ChecksBar />
      <ChecksList />
    </section>
  )
}
