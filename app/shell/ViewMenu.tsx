import { usePopup } from './usePopup.ts'

const loadPopup = () => import('./ViewMenuPopup.tsx').then((part) => part.ViewMenuPopup)

export function ViewMenu() {
  const [Popup, closed] = usePopup(loadPopup, 'menu')
  const button = (
    <button type="button" className="cw-button" {...closed}>
      View<span aria-hidden="true"> ▾</span>
    </button>
  )
  return Popup ? <Popup button={button} /> : button
}
