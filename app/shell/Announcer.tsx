import { useEffect } from 'react'
import { STATUS_WORD, useVerdict } from '../state/verdict.ts'
import { announce, useAnnouncement } from './announce.ts'

/** The page's one live region; speaks a change of the checks' verdict once every check speaks of the set as the gesture left it. */
export function Announcer() {
  const text = useAnnouncement((s) => s.text)
  const verdict = useVerdict((s) => s.verdict)
  const fails = useVerdict((s) => s.fails)
  const near = useVerdict((s) => s.near)
  const settled = useVerdict((s) => s.settled)
  const summary = verdict === null ? null : verdictText(verdict, fails, near)
  useSpokenOnce(settled ? summary : null)
  return (
    <div className="cw-unseen" role="status" aria-live="polite">
      {text}
    </div>
  )
}

let spoken: string | null = null

function useSpokenOnce(summary: string | null) {
  useEffect(() => {
    if (summary === null || summary === spoken) return
    // The first verdict describes what was opened, not a change.
    if (spoken !== null) announce(`Checks: ${summary}`)
    spoken = summary
  }, [summary])
}

/** "1 fails, 2 near", "all hold". */
export function verdictText(verdict: 'holds' | 'near' | 'fails', fails: number, near: number): string {
  if (verdict === 'holds') return 'all hold'
  const parts = [fails > 0 && `${fails} ${STATUS_WORD.fails}`, near > 0 && `${near} ${STATUS_WORD.near}`]
  return parts.filter(Boolean).join(', ')
}
