// Holds the sweep where it is, or lets it follow the sound again.
import { holdAt, shownPosition } from '../../../state/position.ts'
import { useView } from '../../../state/view.ts'

function toggleHold(): void {
  holdAt(useView.getState().held === null ? shownPosition() : null)
}

export function HoldButton() {
  const held = useView((state) => state.held !== null)
  return (
    <button type="button" className={held ? 'cw-button cw-button--now' : 'cw-button'} onClick={toggleHold} aria-keyshortcuts="h">
      {held ? 'Release' : 'Hold'}
    </button>
  )
}
