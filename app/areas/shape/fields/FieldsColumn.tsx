import './FieldsColumn.css'
import { Suspense } from 'react'
import { fetched } from '../../../shell/fetched.tsx'
import { useView, type ViewState } from '../../../state/view.ts'
import { FIELDS_ID } from '../drawing/blocks.ts'
import { BLOCK_TITLES, BlockFields } from './blockFields.tsx'

/** The panel, wherever it is shown. */
export const Panel = fetched(() => import('../panel/Panel.tsx').then((part) => part.Panel))

/** The fields of the block chosen in the drawing, or the panel beside them. */
export function FieldsColumn() {
  const block = useView((s) => s.block)
  const column = useView((s) => s.column)
  const head = (
    <div className="cw-column-head">
      <ColumnTitle column="fields" title={BLOCK_TITLES[block]} chosen={column === 'fields'} />
      <ColumnTitle column="panel" title="Panel" chosen={column === 'panel'} />
    </div>
  )
  if (column === 'panel')
    return (
      <div className="cw-fields">
        {head}
        <Suspense fallback={null}>
          <Panel />
        </Suspense>
      </div>
    )
  const fields = <BlockFields key={block} block={block} />
  return (
    <div className="cw-fields">
      {head}
      {/* The set as a whole is opened from the top bar; it is no tab of the drawing. */}
      {block === 'set' ? (
        <div>{fields}</div>
      ) : (
        <div id={FIELDS_ID} role="tabpanel" aria-labelledby={`cw-block-${block}`}>
          {fields}
        </div>
      )}
    </div>
  )
}

interface ColumnTitleProps {
  readonly column: ViewState['column']
  readonly title: string
  readonly chosen: boolean
}

const ColumnTitle = ({ column, title, chosen }: ColumnTitleProps) => (
  <h2 className="cw-column-title">
    <button type="button" aria-pressed={chosen} onClick={() => useView.setState({ column })}>
      {title}
    </button>
  </h2>
)
