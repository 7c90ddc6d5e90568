// One plot with its tabs, its reading line, and its menu: table, picture, numbers.
import { useId, useState } from 'react'
import { plotEntry } from '../../../plots/plotList.ts'
import type { MountedPlot } from '../../../plots/plotTypes.ts'
import { type PlotId, useView } from '../../../state/view.ts'
import { HoldButton } from './HoldButton.tsx'
import { PlotBody } from './PlotBody.tsx'
import { PlotMenu } from './PlotMenu.tsx'
import { PlotTableView } from './PlotTableView.tsx'
import { PlotTabs, plotTabId } from './PlotTabs.tsx'

/** Shows a plot in a pane; the other pane takes over what stood there when it showed the same. */
function showPlot(index: 0 | 1, id: PlotId): void {
  useView.setState(({ plots }) => {
    const shown: [PlotId, PlotId] = [...plots]
    if (shown[1 - index] === id) shown[1 - index] = shown[index]
    shown[index] = id
    return { plots: shown }
  })
}

interface PlotPaneProps {
  readonly index: 0 | 1
  /** There is no other pane. */
  readonly alone: boolean
}

export function PlotPane({ index, alone }: PlotPaneProps) {
  const id = useView((state) => state.plots[index])
  const { label } = plotEntry(id)
  // A held sweep can be released from wherever it shows.
  const releases = useView(({ held, plots }) => held !== null && index === 0 && (alone || plots[1] !== 'sweep'))
  const [mounted, setMounted] = useState<MountedPlot | null>(null)
  const [reading, setReading] = useState<HTMLElement | null>(null)
  const panelId = useId()
  const [asTable, setAsTable] = useState(false)
  return (
    <div className="cw-plot-pane">
      <div className="cw-plot-head">
        <PlotTabs
          label={index === 0 ? 'Upper plot' : 'Lower plot'}
          chosen={id}
          panelId={panelId}
          onChoose={(value) => showPlot(index, value)}
        />
        <p className="cw-plot-reading" ref={setReading} />
        {id === 'sweep' || releases ? <HoldButton /> : null}
        <PlotMenu id={id} label={label} mounted={mounted} asTable={asTable} onTable={setAsTable} />
      </div>
      <div className="cw-plot-panel" role="tabpanel" id={panelId} aria-labelledby={plotTabId(panelId, id)}>
        {reading ? <PlotBody key={id} id={id} label={label} reading={reading} hidden={asTable} onMounted={setMounted} /> : null}
        {asTable && mounted ? <PlotTableView mounted={mounted} /> : null}
      </div>
    </div>
  )
}
