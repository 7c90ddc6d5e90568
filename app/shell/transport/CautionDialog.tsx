// Before the first sound in this browser: a page cannot know how loud it will be.
import { AlertDialog } from '@base-ui/react/alert-dialog'
import { confirmCaution, declineCaution } from '../../audio/audition.ts'
import { LEVEL_START_DB, useSession } from '../../state/session.ts'
import { signed } from './words.ts'

export function CautionDialog() {
  const open = useSession((s) => s.cautionOpen)
  return (
    <AlertDialog.Root open={open} onOpenChange={(next) => !next && declineCaution()}>
      <AlertDialog.Portal>
        <AlertDialog.Backdrop className="cw-dialog-backdrop" />
        <AlertDialog.Popup className="cw-dialog">
          <AlertDialog.Title className="cw-dialog-title">Before the first sound</AlertDialog.Title>
          <AlertDialog.Description render={<div />} className="cw-dialog-text">
            <p>
              This page cannot know how loud your headphones or loudspeakers are. Turn them down first; take headphones off your ears until
              you have heard the level.
            </p>
            <p>
              It starts at {signed(LEVEL_START_DB, 0)} dB and rises slowly. A guard mutes an output that runs away, but a resonance may
              still be loud. M mutes; Escape mutes from anywhere.
            </p>
          </AlertDialog.Description>
          <div className="cw-dialog-acts">
            <AlertDialog.Close className="cw-button">Not now</AlertDialog.Close>
            <button type="button" className="cw-button cw-button--now" onClick={confirmCaution}>
              Start quietly
            </button>
          </div>
        </AlertDialog.Popup>
      </AlertDialog.Portal>
    </AlertDialog.Root>
  )
}
