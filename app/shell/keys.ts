// The page's keys. Letter keys do nothing while text is edited. Escape belongs to popups and edits first, then to a
// running gesture and the newest message; only then it mutes.
import { dropGesture, useDraft } from '../state/draft.ts'
import { useView } from '../state/view.ts'
import { COMMANDS } from './commands.ts'
import { dismissNewest } from './messages.ts'

/** Listens on the window; `mute` is what Escape comes to at last. Returns the way to stop. */
export function watchKeys(mute: () => void): () => void {
  const onKey = (event: KeyboardEvent) => handleKey(event, mute)
  addEventListener('keydown', onKey)
  return () => removeEventListener('keydown', onKey)
}

function handleKey(event: KeyboardEvent, mute: () => void): void {
  if (event.defaultPrevented || event.isComposing) return
  if (event.key === 'Escape') {
    if (!popupIsOpen()) leave(mute)
    return
  }
  const command = COMMANDS.find((one) => one.matches(event))
  if (!command) return
  if (command.letter && (!useView.getState().letterKeys || popupIsOpen() || takesKeys(event.target, event.key))) return
  // A field being edited has its own undo.
  if (!command.letter && event.key.toLowerCase() === 'z' && isEditedText(event.target)) return
  event.preventDefault()
  command.perform()
}

function leave(mute: () => void): void {
  if (useDraft.getState().set !== null) dropGesture()
  else if (!dismissNewest()) mute()
}

const popupIsOpen = () =>
  document.querySelector(
    '[role="dialog"][data-open], [role="alertdialog"][data-open], [role="menu"][data-open], [role="listbox"][data-open], dialog[open]',
  ) !== null

/** Controls that write or choose by letters, and buttons for Space. */
function takesKeys(target: EventTarget | null, key: string): boolean {
  if (!(target instanceof HTMLElement)) return false
  if (target.isContentEditable || target.matches('textarea, select, [role="menuitem"], [role="option"]')) return true
  if (target instanceof HTMLInputElement) return !['range', 'checkbox', 'radio', 'button'].includes(target.type) || key === ' '
  return (
    key === ' ' &&
    target.closest('button, a, summary, [role="button"], [role="tab"], [role="switch"], [role="checkbox"], [role="radio"]') !== null
  )
}

/** Text the user has changed and not yet applied keeps its own undo. */
function isEditedText(target: EventTarget | null): boolean {
  if (target instanceof HTMLTextAreaElement) return true
  return (
    target instanceof HTMLInputElement &&
    target.type === 'text' &&
    (target.dataset.edited === 'true' || target.getAttribute('role') !== 'spinbutton')
  )
}
