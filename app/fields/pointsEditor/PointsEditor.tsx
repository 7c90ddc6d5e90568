// The editor of drawn points, fetched when it is first shown. It stands beside the typed list (PointsField.tsx), never instead of it.
import './pointsEditor.css'
import { type ComponentType, useEffect, useState } from 'react'
import type { PointRule } from '../../../src/set/drawnPoints.ts'
import type { Point } from '../../../src/set/types.ts'
import { loadOrSay } from '../../shell/usePopup.ts'
import type { Refusal } from '../binding.ts'

export interface PointsEditorProps {
  /** Names the editor: "Drawn sweep". */
  readonly label: string
  /** Limits of a point. A first point that must be [0, 0] stays there. */
  readonly rule: PointRule
  /** As they are now, a running gesture's included. */
  readonly points: readonly Point[]
  /** Tries points within a gesture; returns why they (or some of the way to them) were held back, null when they were not. Points only ever differ by one that moved. */
  readonly attempt: (points: readonly Point[]) => string | null
  /** Ends the gesture: one step of history. */
  readonly settle: () => void
  /** Drops the gesture. */
  readonly drop: () => void
  /** Applies points as one step: one was added or removed. */
  readonly apply: (points: readonly Point[]) => Refusal
  /** What the picture shows, [low, high] of each axis; may follow the points: while a point is dragged the ranges stand still. A pointer moves within them, keys within the rule. */
  readonly xRange: readonly [number, number]
  readonly yRange: readonly [number, number]
  /** x is a phase: the curve runs from the last point to the first, a whole xMax − xMin later. Else its ends are held level. */
  readonly closed?: boolean
  /** A curve that is no straight line between the points: y at x, drawn in their stead. */
  readonly curveThrough?: (x: number) => number
  /** A second curve to compare with, dashed. */
  readonly compare?: (x: number) => number
  /** Where grid lines and their numbers stand; by default the ends and the middle. */
  readonly xTicks?: readonly number[]
  readonly yTicks?: readonly number[]
  /** What a point means besides its numbers: "6.00 ms". Stands in the reading line and is spoken. */
  readonly meaning?: (point: Point) => string
}

type Picture = ComponentType<PointsEditorProps>
const loadPicture = (): Promise<Picture> => import('./PointsPicture.tsx').then((part) => part.PointsPicture)

/**
 * Points that are dragged, or moved by arrows (Shift finer); Page Up and Page Down go to another, Enter or a double click adds one,
 * Delete removes the chosen one. What is drawn sounds at once; a gesture ends as one step, Escape drops it.
 */
export function PointsEditor(props: PointsEditorProps) {
  const [Picture, setPicture] = useState<Picture | null>(null)
  useEffect(() => {
    let gone = false
    void loadOrSay(loadPicture).then((picture) => {
      if (!gone && picture) setPicture(() => picture)
    })
    return () => {
      gone = true
    }
  }, [])
  // Its room is kept, so that nothing moves when it comes.
  return <div className="cw-points">{Picture && <Picture {...props} />}</div>
}
