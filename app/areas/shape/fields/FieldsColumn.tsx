import './FieldsColumn.css'
import { useView } from '../../../state/view.ts'
import { FIELDS_ID } from '../drawing/blocks.ts'
import { BLOCK_TITLES, BlockFields } from './blockFields.tsx'

/** The fields of the block chosen in the drawing. */
export function FieldsColumn() {
  const block = useView((s) => s.block)
  const inside = (
    <>
      <h2 className="cw-column-title">{BLOCK_TITLES[block]}</h2>
      <BlockFields key={block} block={block} />
    </>
  )
  // The set as a whole is opened from the top bar; it is no tab of the drawing.
  if (block === 'set') return <div className="cw-fields">{inside}</div>
  return (
    <div id={FIELDS_ID} className="cw-fields" role="tabpanel" aria-labelledby={`cw-block-${block}`}>
      {inside}
    </div>
  )
}
