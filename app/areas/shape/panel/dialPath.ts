// The drawing of a knob: a scale of three quarters of a circle, open at the bottom, 48 units wide.

export const DIAL_SIZE = 48
const MIDDLE = DIAL_SIZE / 2
const SCALE_RADIUS = 20
const START_DEG = 135
const TURN_DEG = 270
/** More steps than this would run into each other. */
const MOST_TICKS = 25

type Place = readonly [number, number]

function place(position: number, radius: number): Place {
  const angle = ((START_DEG + TURN_DEG * position) * Math.PI) / 180
  return [round(MIDDLE + radius * Math.cos(angle)), round(MIDDLE + radius * Math.sin(angle))]
}

const round = (x: number) => Math.round(x * 100) / 100

/** Path data of the scale from one position to another, clockwise. */
export function scaleArc(from: number, to: number): string {
  const [x0, y0] = place(from, SCALE_RADIUS)
  const [x1, y1] = place(to, SCALE_RADIUS)
  const large = (to - from) * TURN_DEG > 180 ? 1 : 0
  return `M${x0} ${y0}A${SCALE_RADIUS} ${SCALE_RADIUS} 0 ${large} 1 ${x1} ${y1}`
}

/** Path data of the line that points to a position. */
export function pointer(position: number): string {
  const [x0, y0] = place(position, 5)
  const [x1, y1] = place(position, SCALE_RADIUS - 3)
  return `M${x0} ${y0}L${x1} ${y1}`
}

/** Path data of the marks outside the scale: a knob's steps where they can be told apart, else its ends. */
export function ticks(steps: number): string {
  const count = steps >= 2 && steps <= MOST_TICKS ? steps : 2
  return Array.from({ length: count }, (_, i) => {
    const [x0, y0] = place(i / (count - 1), SCALE_RADIUS + 1)
    const [x1, y1] = place(i / (count - 1), SCALE_RADIUS + 3.5)
    return `M${x0} ${y0}L${x1} ${y1}`
  }).join('')
}
