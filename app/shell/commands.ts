// The one table of keyboard commands: the key handler and the key help are made from it.
import { toggleBypass, toggleMute, togglePlay } from '../audio/audition.ts'
import { redo, undo, useDocument } from '../state/document.ts'
import { dropGesture, useDraft } from '../state/draft.ts'
import { holdAt, shownPosition } from '../state/position.ts'
import { useView } from '../state/view.ts'
import { announce } from './announce.ts'
import { chooseSetFile, saveSet } from './setFiles.ts'

export interface Command {
  readonly keys: string
  readonly does: string
  /** A bare key: does nothing while text is edited, and can be switched off. */
  readonly letter: boolean
  readonly matches: (event: KeyboardEvent) => boolean
  readonly perform: () => void
}

const bare = (key: string) => (event: KeyboardEvent) =>
  event.key.toLowerCase() === key && !event.ctrlKey && !event.metaKey && !event.altKey && !event.repeat
const withControl =
  (key: string, shift = false) =>
  (event: KeyboardEvent) =>
    (event.ctrlKey || event.metaKey) && !event.altKey && event.shiftKey === shift && event.key.toLowerCase() === key

export const COMMANDS: readonly Command[] = [
  { keys: 'Space', does: 'play, pause', letter: true, matches: bare(' '), perform: togglePlay },
  { keys: 'M', does: 'mute, sound on', letter: true, matches: bare('m'), perform: toggleMute },
  { keys: 'B', does: 'bypass, effect', letter: true, matches: bare('b'), perform: toggleBypass },
  { keys: 'H', does: 'hold the sweep, let it run', letter: true, matches: bare('h'), perform: toggleHold },
  { keys: 'Ctrl+Z', does: 'undo', letter: false, matches: withControl('z'), perform: undoStep },
  { keys: 'Ctrl+Shift+Z', does: 'redo', letter: false, matches: withControl('z', true), perform: redoStep },
  { keys: 'Ctrl+O', does: 'open a set file', letter: false, matches: withControl('o'), perform: () => void chooseSetFile() },
  { keys: 'Ctrl+S', does: 'save the set', letter: false, matches: withControl('s'), perform: () => void saveSet() },
]

function toggleHold(): void {
  const { held } = useView.getState()
  holdAt(held === null ? shownPosition() : null)
  announce(held === null ? 'Sweep held' : 'Sweep runs')
}

/** Takes back the last step; a gesture that is still running is dropped first and counts as the step. */
export function undoStep(): void {
  if (useDraft.getState().set !== null) {
    dropGesture()
    return
  }
  const name = undo()
  announce(name === null ? 'Nothing to undo' : `Undone: ${name}`)
}

export function redoStep(): void {
  dropGesture()
  const name = redo()
  announce(name === null ? 'Nothing to redo' : `Redone: ${useDocument.getState().step.name}`)
}
