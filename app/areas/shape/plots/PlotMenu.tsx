// What can be had of a plot besides looking at it.
import type { MountedPlot } from '../../../plots/plotTypes.ts'
import { usePopup } from '../../../shell/usePopup.ts'
import type { PlotId } from '../../../state/view.ts'

const loadPopup = () => import('./PlotPopup.tsx').then((part) => part.PlotPopup)

export interface PlotMenuProps {
  readonly id: PlotId
  readonly label: string
  readonly mounted: MountedPlot | null
  readonly asTable: boolean
  onTable(asTable: boolean): void
}

export function PlotMenu(props: PlotMenuProps) {
  const [Popup, closed] = usePopup(loadPopup, 'menu')
  const button = (
    <button type="button" className="cw-button cw-plot-more" aria-label={`${props.label}: table and files`} {...closed}>
      ⋯
    </button>
  )
  return Popup ? <Popup {...props} button={button} /> : button
}
