// Area Shape: the signal path drawn over three columns: fields of the chosen block, plots, checks.
import './Shape.css'

export function Shape() {
  return (
    <main className="cw-shape" id="shape" aria-label="Shape">
      <div className="cw-shape-drawing" />
      <div className="cw-shape-fields" />
    </main>
  )
}
