import { useStore } from 'zustand'
import { useDocument } from '../state/document.ts'
import { redoStep, undoStep } from './commands.ts'

/** Undo and redo; their titles name the step. */
export function HistoryButtons() {
  const step = useDocument((s) => s.step.name)
  const canUndo = useStore(useDocument.temporal, (t) => t.pastStates.length > 0)
  const next = useStore(useDocument.temporal, (t) => t.futureStates.at(-1)?.step?.name ?? null)
  const undoTitle = canUndo ? `Undo ${step}` : 'Nothing to undo'
  const redoTitle = next !== null ? `Redo ${next}` : 'Nothing to redo'
  return (
    <div className="cw-history">
      <Button title={undoTitle} disabled={!canUndo} sign="↶" onClick={undoStep} />
      <Button title={redoTitle} disabled={next === null} sign="↷" onClick={redoStep} />
    </div>
  )
}

interface ButtonProps {
  readonly title: string
  readonly disabled: boolean
  readonly sign: string
  readonly onClick: () => void
}

/** Stays focusable while there is nothing to do, so that undoing to the end does not throw the focus away. */
function Button({ title, disabled, sign, onClick }: ButtonProps) {
  return (
    <button
      type="button"
      className="cw-button cw-history-button"
      title={title}
      aria-label={title}
      aria-disabled={disabled}
      onClick={disabled ? undefined : onClick}
    >
      <span aria-hidden="true">{sign}</span>
    </button>
  )
}
