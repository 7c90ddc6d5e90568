// The wires, drawn beneath the blocks: two signals side by side where two lines run, dashed where nothing flows.
import type { Geometry } from './geometry.ts'

const THIN = 1 / 16

interface WiresProps {
  readonly geometry: Geometry
  /** Nothing crosses over. */
  readonly crossIdle: boolean
}

export function Wires({ geometry, crossIdle }: WiresProps) {
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
      {cross && (
        <g className="cw-wire" data-idle={crossIdle || undefined}>
          <rect className="cw-wire-paper" x={cross.x} y={cross.y} width={cross.width} height={cross.height} />
          <path className="cw-wire-ink" strokeWidth={THIN} d={crossing(cross)} />
        </g>
      )}
      <circle className="cw-wire-paper cw-wire-ring" cx={sum.x} cy={sum.y} r={sum.r} strokeWidth={THIN} />
      {dots.map((dot) => (
        <circle key={`${dot.x} ${dot.y}`} className="cw-wire-dot" cx={dot.x} cy={dot.y} r={2.5 * THIN} />
      ))}
    </svg>
  )
}

/** Each loop goes on along its own wire and over to the other's. */
function crossing({
  x,
  y,
  width,
  height,
}: {
  readonly x: number
  readonly y: number
  readonly width: number
  readonly height: number
}): string {
  const middle = y + height / 2
  const a = middle - 1.5 * THIN
  const b = middle + 1.5 * THIN
  const top = y
  const bottom = y + height
  const lead = width * 0.2
  const x0 = x + lead
  const x1 = x + width - lead
  return `M${x} ${a}L${x0} ${top}H${x1}L${x + width} ${a}M${x} ${b}L${x0} ${bottom}H${x1}L${x + width} ${b}M${x0} ${top}L${x1} ${bottom}M${x0} ${bottom}L${x1} ${top}`
}
