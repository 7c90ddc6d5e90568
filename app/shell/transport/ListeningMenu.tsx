import { usePopup } from '../usePopup.ts'

const loadPopup = () => import('./ListeningPopup.tsx').then((part) => part.ListeningPopup)

export function ListeningMenu() {
  const [Popup, closed] = usePopup(loadPopup, 'menu')
  const button = (
    <button type="button" className="cw-button cw-listening" aria-label="Listening options" title="Listening options" {...closed}>
      <span aria-hidden="true">▾</span>
    </button>
  )
  return Popup ? <Popup button={button} /> : button
}
