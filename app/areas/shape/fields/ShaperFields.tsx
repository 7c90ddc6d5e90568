// The fields of one shaper: its curve, and the rest while it is there.
import { SHAPER_POINTS } from '../../../../src/set/drawnPoints.ts'
import { getAt, withAt } from '../../../../src/set/path.ts'
import type { Point, Shaper } from '../../../../src/set/types.ts'
import { refusal } from '../../../fields/binding.ts'
import { PointsField } from '../../../fields/PointsField.tsx'
import { useCurrent } from '../../../state/current.ts'
import { commit, committedSet } from '../../../state/document.ts'
import { judge, stepName } from '../../../state/edit.ts'
import { SetField } from './SetField.tsx'

export function ShaperFields({ owner }: { readonly owner: 'input.shaper' | 'loop.shaper' | 'mix.shaper' }) {
  const shaper = useCurrent((s) => getAt(s.set, owner)) as Shaper | null
  return (
    <>
      <SetField path={`${owner}.curve`} label="Curve" />
      {shaper && (
        <>
          {shaper.curve === 'drawn' && (
            <PointsField
              label="Points"
              rule={SHAPER_POINTS}
              points={shaper.points}
              apply={(points) => applyPoints(`${owner}.points`, `${owner}.curve`, points)}
            />
          )}
          <SetField path={`${owner}.drive`} />
          <SetField path={`${owner}.ceiling`} />
          <SetField path={`${owner}.positive`} />
          <SetField path={`${owner}.negative`} />
          {shaper.curve === 'deadZone' && <SetField path={`${owner}.deadZone`} />}
          <SetField path={`${owner}.antialias`} />
          <SetField path={`${owner}.tableSize`} />
          <SetField path={`${owner}.tableRange`} />
        </>
      )}
    </>
  )
}

/** Points of a drawn curve as one step, named for the field that draws it. */
export function applyPoints(path: string, curvePath: string, points: readonly Point[]) {
  const set = withAt(committedSet(), path, points)
  const proposal = judge(set, path)
  if (proposal.ok) commit(`${stepName(curvePath)}, points`, set)
  return refusal(curvePath, proposal, set)
}
