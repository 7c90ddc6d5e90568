// The caution before the first sound: its dialog is fetched when it is to be shown.
import { type ComponentType, useEffect, useState } from 'react'
import { declineCaution } from '../../audio/audition.ts'
import { useSession } from '../../state/session.ts'
import { loadOrSay } from '../usePopup.ts'

export const loadCaution = () => import('./CautionDialog.tsx').then((part) => part.CautionDialog)

export function Caution() {
  const open = useSession((s) => s.cautionOpen)
  const [Dialog, setDialog] = useState<ComponentType | null>(null)
  useEffect(() => {
    if (open && Dialog === null) void loadOrSay(loadCaution).then((loaded) => (loaded ? setDialog(() => loaded) : declineCaution()))
  }, [open, Dialog])
  return Dialog && <Dialog />
}
