import type { ParameterSet } from '../../../../src/set/types.ts'
import { useView } from '../../../state/view.ts'
import { blockFace, FIELDS_ID, hasLoop, LOOP_BLOCKS, type PathBlockId } from './blocks.ts'
import type { Box } from './geometry.ts'
import { LineFace, lineSummary } from './LineFace.tsx'

interface BlockTabProps {
  readonly id: PathBlockId
  readonly set: ParameterSet
  readonly box: Box
  readonly chosen: boolean
  readonly isStop: boolean
}

/** One block: a tab of the drawing. Hollow when it is not in the path. */
export function BlockTab({ id, set, box, chosen, isStop }: BlockTabProps) {
  const face = blockFace(id, set)
  const absent = face.text === null
  const idle = LOOP_BLOCKS.includes(id) && !hasLoop(set)
  const spoken = id === 'line' ? lineSummary(set) : absent ? 'not in the path' : face.text
  const style = { left: `${box.x}rem`, top: `${box.y}rem`, width: `${box.width}rem`, height: `${box.height}rem` }
  return (
    <button
      type="button"
      id={`cw-block-${id}`}
      className="cw-block"
      role="tab"
      aria-selected={chosen}
      aria-controls={FIELDS_ID}
      aria-label={`${id === 'feedback' ? 'Feedback' : LOOP_BLOCKS.includes(id) ? `Loop ${face.title.toLowerCase()}` : face.title}: ${spoken}`}
      tabIndex={isStop ? 0 : -1}
      data-absent={absent || undefined}
      data-idle={idle || undefined}
      data-two={(id === 'line' && set.layout === 'stereo') || undefined}
      style={style}
      onClick={() => useView.setState({ block: id, column: 'fields' })}
    >
      <span className="cw-block-title">{face.title}</span>
      {id === 'line' ? <LineFace set={set} /> : face.text !== null && <span className="cw-block-text">{face.text}</span>}
    </button>
  )
}
