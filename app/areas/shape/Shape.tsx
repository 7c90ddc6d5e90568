// Area Shape: the signal path drawn over three columns: fields of the chosen block, plots, checks. Where that does not fit, the path
// is a list whose fields open in place.
import './Shape.css'
import { useLayout } from '../../shell/layout.ts'
import { ChecksColumn } from './checks/ChecksColumn.tsx'
import { ChecksLine } from './checks/ChecksLine.tsx'
import { Drawing } from './drawing/Drawing.tsx'
import { PathList } from './drawing/PathList.tsx'
import { Equation } from './equation/Equation.tsx'
import { FieldsColumn } from './fields/FieldsColumn.tsx'
import { PlotColumn } from './plots/PlotColumn.tsx'

export function Shape() {
  const layout = useLayout((s) => s.layout)
  return (
    <main className="cw-shape" id="shape" aria-label="Shape">
      {layout === 'wide' ? <Wide /> : <Listed narrow={layout === 'narrow'} />}
    </main>
  )
}

function Wide() {
  return (
    <>
      <section className="cw-shape-drawing" aria-label="Signal path">
        <Drawing />
      </section>
      <section className="cw-shape-fields" aria-label="Fields">
        <FieldsColumn />
      </section>
      <div className="cw-shape-plots">
        <PlotColumn />
      </div>
      <div className="cw-shape-checks">
        <ChecksColumn />
      </div>
    </>
  )
}

function Listed({ narrow }: { readonly narrow: boolean }) {
  const path = (
    <section key="path" className="cw-shape-fields" aria-label="Signal path and fields">
      <Equation />
      <PathList />
    </section>
  )
  // Beside each other the path stands first; one below the other the plot stays near the top, where it is seen while fields change.
  return (
    <>
      {!narrow && path}
      <div className="cw-shape-checks">
        <ChecksLine />
      </div>
      <div className="cw-shape-plots">
        <PlotColumn single={narrow} />
      </div>
      {narrow && path}
    </>
  )
}
