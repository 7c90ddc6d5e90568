// The signal path where the page is narrow: the blocks as a list from in to out, the loop's set in beside the line; the chosen one's
// fields open in place.
import './PathList.css'
import { Suspense, useState } from 'react'
import { useCurrent } from '../../../state/current.ts'
import { type BlockId, useView } from '../../../state/view.ts'
import { BLOCK_TITLES, BlockFields } from '../fields/blockFields.tsx'
import { Panel } from '../fields/FieldsColumn.tsx'
import { blockFace, hasLoop, LOOP_BLOCKS, type PathBlockId } from './blocks.ts'
import { LineFace } from './LineFace.tsx'

/** The loop in the order of its signal, from the line back to the sum. */
const BACK: readonly PathBlockId[] = [...LOOP_BLOCKS].reverse()
const ORDER: readonly BlockId[] = ['set', 'inputShaper', 'line', ...BACK, 'voices', 'wetTone', 'mix', 'outputShaper']

export function PathList() {
  const block = useView((s) => s.block)
  const column = useView((s) => s.column)
  const [closed, setClosed] = useState(false)
  const chosen = column === 'panel' ? 'panel' : block
  const choose = (id: BlockId | 'panel') => {
    setClosed(id === chosen && !closed)
    useView.setState(id === 'panel' ? { column: 'panel' } : { block: id, column: 'fields' })
  }
  return (
    <ol className="cw-path">
      {ORDER.map((id) => (
        <Item key={id} id={id} open={id === chosen && !closed} onClick={() => choose(id)} />
      ))}
      <PanelItem open={chosen === 'panel' && !closed} onClick={() => choose('panel')} />
    </ol>
  )
}

interface ItemProps {
  readonly id: BlockId
  readonly open: boolean
  readonly onClick: () => void
}

function Item({ id, open, onClick }: ItemProps) {
  const set = useCurrent((s) => s.set)
  const inLoop = BACK.includes(id as PathBlockId)
  const face = id === 'set' ? null : blockFace(id, set)
  const absent = face?.text === null || (inLoop && !hasLoop(set))
  const panel = `cw-path-${id}`
  return (
    <li className="cw-path-item" data-loop={inLoop || undefined} data-absent={absent || undefined}>
      <button type="button" className="cw-path-button" aria-expanded={open} aria-controls={panel} onClick={onClick}>
        <span className="cw-path-title">{id === 'feedback' ? 'Feedback g' : (face?.title ?? BLOCK_TITLES[id])}</span>
        {id === 'line' ? (
          <span className="cw-path-line">
            <LineFace set={set} />
          </span>
        ) : (
          <span className="cw-path-text">{face ? (face.text ?? 'not in the path') : `${set.intent} · ${set.sampleRate / 1000} kHz`}</span>
        )}
      </button>
      <div id={panel}>
        {open && (
          <div className="cw-fields">
            <BlockFields block={id} />
          </div>
        )}
      </div>
    </li>
  )
}

function PanelItem({ open, onClick }: Omit<ItemProps, 'id'>) {
  const knobs = useCurrent((s) => s.set.panel.map(({ knob }) => knob).join(', '))
  return (
    <li className="cw-path-item" data-absent={knobs === '' || undefined}>
      <button type="button" className="cw-path-button" aria-expanded={open} aria-controls="cw-path-panel" onClick={onClick}>
        <span className="cw-path-title">Panel</span>
        <span className="cw-path-text">{knobs === '' ? 'no knobs' : knobs}</span>
      </button>
      <div id="cw-path-panel">
        {open && (
          <div className="cw-fields">
            <Suspense fallback={null}>
              <Panel />
            </Suspense>
          </div>
        )}
      </div>
    </li>
  )
}
