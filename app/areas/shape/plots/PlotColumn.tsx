// The middle column: two plots at once, one where the page is narrow.
import './plots.css'
import { PlotPane } from './PlotPane.tsx'

export function PlotColumn({ single = false }: { readonly single?: boolean }) {
  return (
    <section className="cw-plots" aria-label="Plots" data-single={single || undefined}>
      <PlotPane index={0} alone={single} />
      {single ? null : <PlotPane index={1} alone={false} />}
    </section>
  )
}
