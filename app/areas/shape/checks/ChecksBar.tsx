// Between the heading and the list: how far the checks are, once that takes over a second, and the same set at other rates.
import { useChecks } from '../../../state/checks.ts'
import { OtherRates } from './OtherRates.tsx'

export function ChecksBar() {
  const working = useChecks((state) => state.working)
  const part = working === null ? 0 : (working.done + working.part) / working.total
  const words = working === null ? '' : `${working.label}, ${working.done + 1} of ${working.total}`
  return (
    <div className="cw-checks-bar">
      <p className="cw-checks-working" aria-hidden="true">
        {words}
      </p>
      <OtherRates />
      {working === null ? null : (
        <progress className="cw-checks-progress" aria-label="Checks being worked out" aria-valuetext={words} value={part} max={1} />
      )}
    </div>
  )
}
