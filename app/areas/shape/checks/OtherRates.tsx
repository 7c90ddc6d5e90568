// The button behind which the same set is judged at other sample rates.
import { usePopup } from '../../../shell/usePopup.ts'

const loadPopup = () => import('./rates/RatesPopup.tsx').then((part) => part.RatesPopup)

export function OtherRates() {
  const [Popup, closed] = usePopup(loadPopup, 'dialog')
  const button = (
    <button type="button" className="cw-checks-rates" {...closed}>
      At other rates
    </button>
  )
  return Popup ? <Popup button={button} /> : button
}
