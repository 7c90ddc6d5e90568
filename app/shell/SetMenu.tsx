// The set's own menu, opened from its name.
import './SetMenu.css'
import { useCurrent } from '../state/current.ts'
import { usePopup } from './usePopup.ts'

const loadPopup = () => import('./SetMenuPopup.tsx').then((part) => part.SetMenuPopup)

export function SetMenu() {
  const name = useCurrent((s) => s.set.name)
  const [Popup, closed] = usePopup(loadPopup, 'menu')
  const button = (
    <button type="button" className="cw-menu-trigger" {...closed}>
      <span className="cw-set-name-text">{name || 'Unnamed set'}</span>
      <span aria-hidden="true"> ▾</span>
    </button>
  )
  return Popup ? <Popup button={button} /> : <h1 className="cw-set-name">{button}</h1>
}
