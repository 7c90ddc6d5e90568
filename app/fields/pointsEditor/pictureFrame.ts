// Where a point stands in its picture: fractions of its width from the left and of its height from the top.
import type { Point } from '../../../src/set/types.ts'

/** The shown range of each axis, [low, high]. */
export interface Frame {
  readonly x: readonly [number, number]
  readonly y: readonly [number, number]
}

export function fractionsOf({ x: [x0, x1], y: [y0, y1] }: Frame, [x, y]: Point): Point {
  return [(x - x0) / (x1 - x0), (y1 - y) / (y1 - y0)]
}

export function placeOf({ x: [x0, x1], y: [y0, y1] }: Frame, [across, down]: Point): Point {
  return [x0 + across * (x1 - x0), y1 - down * (y1 - y0)]
}
