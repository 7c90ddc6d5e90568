// Drawn points of the engine: room for the most there may be, taken at start, so that a live edit of any count allocates nothing.
import { MAX_POINTS } from '../set/parameters.ts'
import type { Point } from '../set/types.ts'

export interface PointStore {
  readonly pairs: readonly [number, number][]
  /** views[n]: the first n pairs, the same pairs in every view. */
  readonly views: readonly (readonly Point[])[]
}

export function createPointStore(): PointStore {
  // Not whole numbers, so that the engine's JavaScript machine stores doubles in the pairs from the start.
  const pairs = Array.from({ length: MAX_POINTS }, (): [number, number] => [0.5, 0.5])
  return { pairs, views: Array.from({ length: MAX_POINTS + 1 }, (_, n) => pairs.slice(0, n)) }
}

/** The points standing in a flat set from `offset` (count, then x, y pairs), as a view of the store. */
export function takePoints({ pairs, views }: PointStore, flat: Float64Array, offset: number): readonly Point[] {
  const count = flat[offset]!
  for (let i = 0; i < count; i++) {
    const pair = pairs[i]!
    pair[0] = flat[offset + 1 + 2 * i]!
    pair[1] = flat[offset + 2 + 2 * i]!
  }
  return views[count]!
}
