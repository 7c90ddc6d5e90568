import { STATUS_SIGN, useVerdict } from '../state/verdict.ts'
import { verdictText } from './Announcer.tsx'

/** The areas, each with the sign of its checks' verdict and the count of what it counts. One area for now. */
export function AreaTabs() {
  return (
    <nav className="cw-areas" aria-label="Areas">
      <a className="cw-area" href="#shape" aria-current="page">
        Shape <Verdict />
      </a>
    </nav>
  )
}

function Verdict() {
  const verdict = useVerdict((s) => s.verdict)
  const fails = useVerdict((s) => s.fails)
  const near = useVerdict((s) => s.near)
  const pending = useVerdict((s) => s.pending > 0)
  if (verdict === null) return null
  const count = verdict === 'fails' ? fails : verdict === 'near' ? near : null
  return (
    <span className="cw-area-verdict" data-verdict={verdict}>
      <span aria-hidden="true">
        {STATUS_SIGN[verdict]}
        {count !== null && ` ${count}`}
        <span className="cw-area-pending" data-on={pending || undefined}>
          …
        </span>
      </span>
      <span className="cw-unseen">
        checks: {verdictText(verdict, fails, near)}
        {pending && ', some still being worked out'}
      </span>
    </span>
  )
}
