import './KeyHelp.css'
import { Dialog } from '@base-ui/react/dialog'
import { COMMANDS } from './commands.ts'

/** Keys of the page beside those of the table: what fields and lists do with arrows. */
const INSIDE: readonly { readonly keys: string; readonly does: string }[] = [
  { keys: 'Escape', does: 'close, drop what is being changed; else mute, from anywhere' },
  { keys: 'Tab', does: 'one stop each for the drawing, plot tabs and checks; arrows move inside' },
  { keys: '↑ ↓', does: 'step a field; with Shift or Page, ten steps' },
  { keys: 'Enter', does: 'apply what was typed: 2.5 ms, 400 us, 1/8 @ 96, A3, −6 dB' },
]

interface KeyHelpProps {
  readonly open: boolean
  readonly onClose: () => void
}

export function KeyHelp({ open, onClose }: KeyHelpProps) {
  return (
    <Dialog.Root open={open} onOpenChange={(now) => !now && onClose()}>
      <Dialog.Portal>
        <Dialog.Backdrop className="cw-dialog-backdrop" />
        <Dialog.Popup className="cw-dialog">
          <Dialog.Title className="cw-dialog-title">Keys</Dialog.Title>
          <dl className="cw-keys">
            {[...COMMANDS, ...INSIDE].map(({ keys, does }) => (
              <div key={keys} className="cw-keys-row">
                <dt>
                  <kbd>{keys}</kbd>
                </dt>
                <dd>{does}</dd>
              </div>
            ))}
          </dl>
          <p className="cw-dialog-note">Single letters and Space do nothing while text is edited, and can be switched off under View.</p>
          <Dialog.Close className="cw-button">Close</Dialog.Close>
        </Dialog.Popup>
      </Dialog.Portal>
    </Dialog.Root>
  )
}
