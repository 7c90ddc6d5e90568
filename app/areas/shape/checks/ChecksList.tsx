// The list of checks: one tab stop, arrows move inside, Enter opens a check's working. One working is open at a time.
import { type FocusEvent, type KeyboardEvent, useState } from 'react'
import type { CheckId } from '../../../../src/checks/limits.ts'
import { useChecks } from '../../../state/checks.ts'
import { useView } from '../../../state/view.ts'
import { CheckRow } from './CheckRow.tsx'

export function ChecksList() {
  const order = useChecks((state) => state.order)
  const problem = useChecks((state) => state.problem)
  const open = useView((state) => state.openCheck)
  const [stop, setStop] = useState<CheckId | null>(null)
  const tabStop = stop !== null && order.includes(stop) ? stop : order[0]
  return (
    <>
      {problem === null ? null : (
        <p className="cw-checks-problem" role="alert">
          The checks could not be computed: {problem}
        </p>
      )}
      <ul className="cw-checks-list" onKeyDown={moveFocus} onFocus={(event) => setStop(idOf(event))}>
        {order.map((id) => (
          <CheckRow key={id} id={id} open={open === id} tabStop={id === tabStop} onToggle={() => toggle(id)} />
        ))}
      </ul>
    </>
  )
}

const toggle = (id: CheckId) => useView.setState(({ openCheck }) => ({ openCheck: openCheck === id ? null : id }))

const idOf = (event: FocusEvent): CheckId | null =>
  (event.target.closest('[data-check]')?.getAttribute('data-check') ?? null) as CheckId | null

/** Up and down over the checks and the ways to mend them, in the order they stand; Home and End to the outer ones. */
function moveFocus(event: KeyboardEvent<HTMLUListElement>) {
  const stops = [...event.currentTarget.querySelectorAll<HTMLElement>('button')]
  const at = stops.indexOf(document.activeElement as HTMLElement)
  // The limit of an opened check has the arrows to itself.
  if (at < 0) return
  const to: Readonly<Record<string, number>> = {
    ArrowDown: at + 1,
    ArrowRight: at + 1,
    ArrowUp: at - 1,
    ArrowLeft: at - 1,
    Home: 0,
    End: stops.length - 1,
  }
  const next = stops[to[event.key] ?? -1]
  if (!next) return
  event.preventDefault()
  next.focus()
}
