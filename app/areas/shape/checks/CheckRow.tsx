// One check: sign, words, figure, limit; what would mend it; its working when open.
import { memo } from 'react'
import type { CheckId } from '../../../../src/checks/limits.ts'
import { useChecks } from '../../../state/checks.ts'
import { STATUS_SIGN, STATUS_WORD } from '../../../state/verdict.ts'
import { checkFigure, checkLimit } from './checkWords.ts'
import { Mends } from './Mends.tsx'
import { Working } from './Working.tsx'

interface CheckRowProps {
  readonly id: CheckId
  readonly open: boolean
  /** The list's one stop of the Tab key. */
  readonly tabStop: boolean
  onToggle(): void
}

export const CheckRow = memo(function CheckRow({ id, open, tabStop, onToggle }: CheckRowProps) {
  const check = useChecks((state) => state.checks.find((one) => one.id === id))
  if (!check) return null
  const { status, label, text, working, mend } = check
  const troubled = status === 'fails' || status === 'near'
  const workingId = `working-${id}`
  const limit = checkLimit(check)
  return (
    <li className="cw-check" data-check={id} data-status={status}>
      <button
        type="button"
        className="cw-check-row"
        tabIndex={tabStop ? 0 : -1}
        aria-expanded={open}
        aria-controls={open ? workingId : undefined}
        onClick={onToggle}
      >
        <span className="cw-check-sign" aria-hidden="true">
          {STATUS_SIGN[status]}
        </span>
        <span className="cw-check-label">{label}</span>
        <span className="cw-check-figure">{checkFigure(check)}</span>
        <span className="cw-check-limit">
          {STATUS_WORD[status]}
          {limit === '' ? '' : ` · ${limit}`}
        </span>
      </button>
      {troubled || open ? <p className="cw-check-text">{text}</p> : null}
      {(troubled || open) && mend && mend.length > 0 ? <Mends label={label} mends={mend} /> : null}
      {open ? <Working id={workingId} label={label} steps={working} /> : null}
    </li>
  )
})
