// What is heard, and the panel for choosing it; `children` stand at the panel's end.
import { useSession } from '../../state/session.ts'
import { usePopup } from '../usePopup.ts'
import { sourceLabel } from './words.ts'

const loadPopup = () => import('./SourcePopup.tsx').then((part) => part.SourcePopup)

export function SourcePanel({ children }: { readonly children?: React.ReactNode }) {
  const source = useSession((s) => s.source)
  const [Popup, closed] = usePopup(loadPopup, 'dialog')
  const button = (
    <button type="button" className="cw-button cw-source" title={sourceLabel(source)} {...closed}>
      <span className="cw-unseen">Source: </span>
      <span className="cw-source-name">{sourceLabel(source)}</span>
      <span aria-hidden="true"> ▾</span>
    </button>
  )
  return Popup ? <Popup button={button}>{children}</Popup> : button
}
