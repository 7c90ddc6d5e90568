import './fields.css'
import { type KeyboardEvent, useId, useState } from 'react'
import type { PointRule } from '../../src/set/drawnPoints.ts'
import type { Point } from '../../src/set/types.ts'
import type { Refusal } from './binding.ts'
import { FieldNotes } from './FieldNotes.tsx'
import { pointsToText, readPoints } from './pointsText.ts'

interface PointsFieldProps {
  readonly label: string
  readonly rule: PointRule
  readonly points: readonly Point[]
  readonly apply: (points: readonly Point[]) => Refusal
}

const ROWS = 8

/** A drawn curve as its list of points, one a line; applied on leaving or Ctrl+Enter, Escape restores. */
export function PointsField({ label, rule, points, apply }: PointsFieldProps) {
  const id = useId()
  const [draft, setDraft] = useState<string | null>(null)
  const [refusal, setRefusal] = useState<Refusal>(null)
  const [lastPoints, setLastPoints] = useState(points)
  if (points !== lastPoints) {
    setLastPoints(points)
    setDraft(null)
    setRefusal(null)
  }
  const leave = () => {
    if (draft === null) return
    const read = readPoints(draft, rule)
    const refused = read.ok ? apply(read.points) : { why: `${label}: ${read.why}`, ways: [] }
    setRefusal(refused)
    if (!refused) setDraft(null)
  }
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.key === 'Enter' && (event.ctrlKey || event.metaKey)) leave()
    if (event.key === 'Escape' && draft !== null) {
      event.preventDefault()
      setDraft(null)
      setRefusal(null)
    }
  }
  return (
    <div className="cw-field cw-field--text">
      <label className="cw-field-label" htmlFor={id}>
        {label}, {rule.xName} and {rule.yName} a line
      </label>
      <textarea
        id={id}
        className="cw-text-input"
        rows={ROWS}
        spellCheck={false}
        aria-describedby={`${id}-notes`}
        aria-invalid={refusal ? true : undefined}
        data-edited={draft !== null}
        value={draft ?? pointsToText(points)}
        onChange={(event) => setDraft(event.target.value)}
        onBlur={leave}
        onKeyDown={onKeyDown}
      />
      <FieldNotes id={`${id}-notes`} notes={[`${points.length} points`]} lines={1} refusal={refusal} />
    </div>
  )
}
