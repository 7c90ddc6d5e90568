// The wires, drawn beneath the blocks: two signals side by side where two lines run, dashed where nothing flows.
import type { Box, Geometry } from './geometry.ts'

const THIN = 1 / 16

interface WiresProps {
  readonly geometry: Geometry
  /** Part of each loop that goes over to the other line; 0 draws no crossing. */
  readonly crossFeed: number
}

export function Wires({ geometry, crossFeed }: WiresProps) {
  const { width, height, wires, dots, sum, cross } = geometry
  return (
    <svg className="cw-wires" viewBox={`0 0 ${width} ${height}`} aria-hidden="true">
      <defs>
        <marker
          id="cw-arrow"
          viewBox="0 0 8 7"
          refX="8"
          refY="3.5"
          markerWidth="8"
          markerHeight="7"
          orient="auto"
          markerUnits="strokeWidth"
        >
          <path className="cw-wire-arrow" d="M0 0L8 3.5L0 7z" />
        </marker>
      </defs>
      {wires.map((wire) => (
        <g key={wire.path} className="cw-wire" data-idle={wire.idle || undefined}>
          <path className="cw-wire-ink" d={wire.path} strokeWidth={wire.double ? 4 * THIN : THIN} />
          {wire.double && <path className="cw-wire-gap" d={wire.path} strokeWidth={2 * THIN} />}
          {wire.arrow && <path d={wire.path} fill="none" strokeWidth={THIN} markerEnd="url(#cw-arrow)" />}
        </g>
      ))}
      {cross && crossFeed > 0 && (
        <g className="cw-wire">
          <rect className="cw-wire-paper" x={cross.x} y={cross.y} width={cross.width} height={cross.height} />
          <path className="cw-wire-ink" strokeWidth={THIN} d={crossing(cross, crossFeed < 1)} />
        </g>
      )}
      <circle className="cw-wire-paper cw-wire-ring" cx={sum.x} cy={sum.y} r={sum.r} strokeWidth={THIN} />
      {dots.map((dot) => (
        <circle key={`${dot.x} ${dot.y}`} className="cw-wire-dot" cx={dot.x} cy={dot.y} r={2.5 * THIN} />
      ))}
    </svg>
  )
}

/** Each loop goes over to the other's wire and, while `own`, on along its own as well. */
function crossing({ x, y, width, height }: Box, own: boolean): string {
  const a = y + height / 2 - 1.5 * THIN
  const b = y + height / 2 + 1.5 * THIN
  const bottom = y + height
  const end = x + width
  const x0 = x + 0.2 * width
  const x1 = end - 0.2 * width
  const ends = `M${x} ${a}L${x0} ${y}M${x} ${b}L${x0} ${bottom}M${x1} ${y}L${end} ${a}M${x1} ${bottom}L${end} ${b}`
  const over = `M${x0} ${y}L${x1} ${bottom}M${x0} ${bottom}L${x1} ${y}`
  return own ? `${ends}${over}M${x0} ${y}H${x1}M${x0} ${bottom}H${x1}` : `${ends}${over}`
}
