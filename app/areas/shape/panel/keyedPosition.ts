import type { Knob } from '../../../../src/set/types.ts'

const DIRECTIONS: Readonly<Record<string, number>> = {
  ArrowUp: 1,
  ArrowRight: 1,
  ArrowDown: -1,
  ArrowLeft: -1,
  PageUp: 10,
  PageDown: -10,
}
const KEY_PART = 0.01
const FINE_PART = 0.001

/**
 * Where a key turns a knob: arrows by a hundredth (Shift: a thousandth) but at least one of its steps, Page by a tenth, Home and End to the ends;
 * null for other keys. Positions lie on a grid, so that the way back meets the same ones.
 */
export function keyedPosition(key: string, fine: boolean, { position, steps }: Pick<Knob, 'position' | 'steps'>): number | null {
  if (key === 'Home') return 0
  if (key === 'End') return 1
  const direction = DIRECTIONS[key]
  if (direction === undefined) return null
  const wanted = (fine ? FINE_PART : KEY_PART) * Math.abs(direction)
  const grid = steps < 2 ? wanted : Math.max(1, Math.round(wanted * (steps - 1))) / (steps - 1)
  const at = position / grid
  const next = direction > 0 ? Math.floor(at + 1e-6) + 1 : Math.ceil(at - 1e-6) - 1
  return Math.max(0, Math.min(1, Number((next * grid).toFixed(9))))
}
