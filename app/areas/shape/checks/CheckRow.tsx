// One check: sign, words, figure, limit; what would mend it; its working when open.
import { memo, Suspense } from 'react'
import { useShallow } from 'zustand/react/shallow'
import type { CheckId } from '../../../../src/checks/limits.ts'
import type { Check } from '../../../../src/checks/types.ts'
import { fetched } from '../../../shell/fetched.tsx'
import { useChecks } from '../../../state/checks.ts'
import { STATUS_SIGN, STATUS_WORD } from '../../../state/verdict.ts'
import { checkFigure, checkLimit, panelWords } from './checkWords.ts'
import { Mends } from './Mends.tsx'

const OpenedCheck = fetched(() => import('./OpenedCheck.tsx').then((part) => part.OpenedCheck))

/** The panel's worst places, with the ways there: panel.box alone has them. */
const PanelWorst = fetched(() => import('../panel/PanelWorst.tsx').then((part) => part.PanelWorst))

interface CheckRowProps {
  readonly id: CheckId
  readonly open: boolean
  /** The list's one stop of the Tab key. */
  readonly tabStop: boolean
  onToggle(): void
}

export const CheckRow = memo(function CheckRow({ id, open, tabStop, onToggle }: CheckRowProps) {
  const check = useChecks((state) => state.checks.find((one) => one.id === id))
  const before = useChecks((state) => state.before.includes(id))
  const own = useChecks(({ set }) => set?.limits[id] ?? null)
  const { figure, what } = useChecks(useShallow(({ checks }) => rowWords(check, checks, own)))
  if (!check) return null
  const { status, label, text, mend } = check
  const troubled = status === 'fails' || status === 'near'
  const workingId = `working-${id}`
  const limit = before ? 'before this change' : what
  return (
    <li className="cw-check" data-check={id} data-status={status} data-before={before || undefined}>
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
        <span className="cw-check-figure">{figure}</span>
        <span className="cw-check-limit">
          {STATUS_WORD[status]}
          {limit === '' ? '' : ` · ${limit}`}
        </span>
      </button>
      {troubled || open ? <p className="cw-check-text">{text}</p> : null}
      {(troubled || open) && mend && mend.length > 0 ? <Mends label={label} mends={mend} /> : null}
      <Suspense fallback={null}>
        {(troubled || open) && check.worst && check.worst.length > 0 ? <PanelWorst check={check} /> : null}
        {open ? <OpenedCheck id={workingId} check={check} /> : null}
      </Suspense>
    </li>
  )
})

function rowWords(
  check: Check | undefined,
  checks: readonly Check[],
  own: number | null,
): { readonly figure: string; readonly what: string } {
  if (!check) return { figure: '', what: '' }
  if (check.id === 'panel.box') return panelWords(check, checks)
  return { figure: checkFigure(check), what: checkLimit(check, own) }
}
