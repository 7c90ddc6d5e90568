// The shape of a drawn sweep: points to draw with, the delays and cents that come of them, and the points as a list to type.

import { delayMs, voiceOffsetMs } from '../../../../src/set/delayRange.ts'
import { SWEEP_POINTS } from '../../../../src/set/drawnPoints.ts'
import type { Point } from '../../../../src/set/types.ts'
import { PointsField } from '../../../fields/PointsField.tsx'
import { useDrawnPoints } from '../../../fields/pointsEditor/drawnBinding.ts'
import { PointsEditor } from '../../../fields/pointsEditor/PointsEditor.tsx'
import { showIn } from '../../../fields/quantity.ts'
import { currentSet, useCurrent } from '../../../state/current.ts'
import { fieldNotes, widthText } from './notes.ts'

const RANGE_X = [0, 1] as const
const RANGE_Y = [-1, 1] as const
const TICKS_X = [0, 0.25, 0.5, 0.75, 1]

export function DrawnSweep() {
  const drawn = useDrawnPoints('sweep.points', 'sweep.shape')
  const set = useCurrent((s) => s.set)
  const depth = set.sweep.law === 'time' ? 'sweep.depthMs' : 'sweep.depthOctaves'
  return (
    <>
      <PointsEditor
        label="Drawn sweep"
        rule={SWEEP_POINTS}
        {...drawn}
        xRange={RANGE_X}
        yRange={RANGE_Y}
        xTicks={TICKS_X}
        closed
        meaning={delayOf}
      />
      <p className="cw-drawn-follows">{[...fieldNotes(depth, set, { tempoBpm: 0 }), widthText(set)].join(' · ')}</p>
      <PointsField label="Points" rule={SWEEP_POINTS} points={drawn.points} apply={drawn.apply} />
    </>
  )
}

/** Delay of the first voice where the sweep has the point's s. */
function delayOf([, sweep]: Point): string {
  const set = currentSet()
  const ms = delayMs(set, { offsetMs: voiceOffsetMs(set.voices, 0), sweep })
  return showIn(Number(ms.toFixed(Math.abs(ms) < 0.1 ? 4 : 2)), 'ms')
}
