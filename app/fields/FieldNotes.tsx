// The lines beneath a field: what follows from its value, else why the last one was held or refused and the ways to have it.
import type { CSSProperties } from 'react'
import type { Refusal } from './binding.ts'

interface FieldNotesProps {
  readonly id: string
  readonly notes: readonly string[]
  /** Room kept, in lines. */
  readonly lines: number
  readonly refusal: Refusal
  readonly held?: string | null
}

export function FieldNotes({ id, notes, lines, refusal, held = null }: FieldNotesProps) {
  return (
    <div id={id} className="cw-field-notes" style={{ '--lines': lines } as CSSProperties}>
      {refusal ? (
        <div role="alert">
          <p className="cw-field-refusal">
            <span aria-hidden="true">■ </span>
            {refusal.why}
          </p>
          {refusal.ways.length > 0 && (
            <div className="cw-field-ways">
              {refusal.ways.map((way) => (
                <button key={way.label} type="button" className="cw-button" onClick={way.take}>
                  {way.label}
                </button>
              ))}
            </div>
          )}
        </div>
      ) : held ? (
        <p className="cw-field-held" role="status">
          <span aria-hidden="true">△ </span>
          {held}
        </p>
      ) : (
        notes.map((note) => <p key={note}>{note}</p>)
      )}
    </div>
  )
}
