// The same set judged at other sample rates, as a table of what changes.
import './rates.css'
import { Dialog } from '@base-ui/react/dialog'
import { useState } from 'react'
import { useOpenedTrigger } from '../../../../shell/usePopup.ts'
import { RatesTable } from './RatesTable.tsx'
import { useRates } from './useRates.ts'

export function RatesPopup({ button }: { readonly button: React.ReactElement }) {
  const trigger = useOpenedTrigger()
  const [open, setOpen] = useState(false)
  return (
    <Dialog.Root open={open} onOpenChange={setOpen}>
      <Dialog.Trigger ref={trigger} render={button} />
      <Dialog.Portal>
        <Dialog.Backdrop className="cw-dialog-backdrop" />
        <Dialog.Popup className="cw-dialog cw-rates">
          <Dialog.Title className="cw-dialog-title">At other rates</Dialog.Title>
          <Rates />
          <Dialog.Close className="cw-button">Close</Dialog.Close>
        </Dialog.Popup>
      </Dialog.Portal>
    </Dialog.Root>
  )
}

function Rates() {
  const state = useRates()
  return (
    <>
      <p className="cw-rates-about">
        The set as it stands, run at each rate: times and frequencies stay, samples do not. Only what changes is listed.
      </p>
      <RatesTable {...state} />
    </>
  )
}
