// What a shaper has besides its curve, each value with what follows from it.
import { SHAPER_POINTS } from '../../../../src/set/drawnPoints.ts'
import type { Point } from '../../../../src/set/types.ts'
import { PointsField } from '../../../fields/PointsField.tsx'
import { useDrawnPoints } from '../../../fields/pointsEditor/drawnBinding.ts'
import { PointsEditor } from '../../../fields/pointsEditor/PointsEditor.tsx'
import { useCurrent } from '../../../state/current.ts'
import { SetField } from './SetField.tsx'
import type { ShaperBodyProps } from './ShaperFields.tsx'
import { type ShaperNotes, shaperNotes } from './shaperNotes.ts'

export function ShaperBody({ owner, shaper }: ShaperBodyProps) {
  const set = useCurrent((s) => s.set)
  const notes = shaperNotes(set, owner, shaper)
  const field = (key: keyof ShaperNotes, lines: number) => <SetField path={`${owner}.${key}`} notes={notes[key]} lines={lines} />
  return (
    <>
      {shaper.curve === 'drawn' && <DrawnCurve owner={owner} shaper={shaper} />}
      {shaper.curve === 'deadZone' && field('deadZone', 1)}
      {field('drive', 2)}
      {field('ceiling', 1)}
      {field('positive', 1)}
      {field('negative', 2)}
      {field('antialias', 2)}
      {field('tableSize', 2)}
      {field('tableRange', 2)}
    </>
  )
}

/** Room past the last point, so that it can be drawn on. */
const AIR = 1.15

function DrawnCurve({ owner }: ShaperBodyProps) {
  const drawn = useDrawnPoints(`${owner}.points`, `${owner}.curve`)
  const { points, apply } = drawn
  return (
    <>
      <PointsEditor
        label="Drawn curve"
        rule={SHAPER_POINTS}
        {...drawn}
        xRange={[0, nice(AIR * largest(points, 0))]}
        yRange={[Math.min(0, -nice(-least(points))), nice(AIR * largest(points, 1))]}
        meaning={meaning}
      />
      <PointsField label="Points" rule={SHAPER_POINTS} points={points} apply={apply} />
    </>
  )
}

const largest = (points: readonly Point[], of: 0 | 1) => points.reduce((most, point) => Math.max(most, point[of]), 0.1)
const least = (points: readonly Point[]) => points.reduce((least, [, k]) => Math.min(least, k), 0)

/** Up to the next half of a power of ten, so that axes end on plain numbers. */
function nice(value: number): number {
  if (!(value > 0)) return 0
  const unit = 10 ** Math.floor(Math.log10(value)) / 2
  return Number((Math.ceil(value / unit) * unit).toPrecision(6))
}

/** "gain 0.62": out over in at the point. */
const meaning = ([t, k]: Point): string => (t === 0 ? 'stays at 0' : `gain ${(k / t).toFixed(2).replace('-', '−')}`)
