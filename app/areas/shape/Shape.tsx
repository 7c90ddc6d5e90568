// Area Shape: the signal path drawn over three columns: fields of the chosen block, plots, checks.
import './Shape.css'
import { useLayout } from '../../shell/layout.ts'
import { Drawing } from './drawing/Drawing.tsx'
import { FieldsColumn } from './fields/FieldsColumn.tsx'

export function Shape() {
  const layout = useLayout((s) => s.layout)
  return (
    <main className="cw-shape" id="shape" aria-label="Shape">
      {layout === 'wide' && (
        <section className="cw-shape-drawing" aria-label="Signal path">
          <Drawing />
        </section>
      )}
      <section className="cw-shape-fields" aria-label="Fields">
        <FieldsColumn />
      </section>
    </main>
  )
}
