import { useCurrent } from '../../../state/current.ts'
import { movableGroups } from './movable.ts'

interface FieldChooserProps {
  /** Names the list; stands in it while nothing is chosen. */
  readonly label: string
  readonly onChoose: (path: string) => void
}

/** What a knob could move that none moves yet, in the groups of the signal path. Choosing acts at once. */
export function FieldChooser({ label, onChoose }: FieldChooserProps) {
  const set = useCurrent((s) => s.set)
  return (
    <span className="cw-button cw-chooser">
      <span aria-hidden="true">
        {label} <span className="cw-choice-arrow">▾</span>
      </span>
      <select className="cw-choice-select" aria-label={label} value="" onChange={(event) => onChoose(event.target.value)}>
        <option value="" disabled>
          {label}
        </option>
        {movableGroups(set).map((group) => (
          <optgroup key={group.label} label={group.label}>
            {group.options.map(({ path, label: name }) => (
              <option key={path} value={path}>
                {name}
              </option>
            ))}
          </optgroup>
        ))}
      </select>
    </span>
  )
}
