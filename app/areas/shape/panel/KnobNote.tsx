// Where a field and its knob have parted: what the knob would give, and the ways to make both one again. Nothing while they agree.
import { moveOf } from '../../../../src/set/panelEdit.ts'
import { type Parted, parted, takeFromKnob, turnToField, widenToField } from '../../../../src/set/panelSettle.ts'
import type { ParameterSet } from '../../../../src/set/types.ts'
import { useCurrent } from '../../../state/current.ts'
import { stepName } from '../../../state/edit.ts'
import { commitPanel, knobName, panelEditProblems } from '../../../state/panel.ts'
import { valueWords } from './panelWords.ts'

interface Settle {
  readonly label: string
  readonly edit: (set: ParameterSet) => ParameterSet
}

export function KnobNote({ path }: { readonly path: string }) {
  const set = useCurrent((s) => s.set)
  const inGesture = useCurrent((s) => s.inGesture)
  const found = parted(set, path)
  // Two values that read the same are no news.
  if (!found || valueWords(path, found.stored) === valueWords(path, found.gives)) return null
  const name = knobName({ knob: found.knob }, found.index)
  const gives = valueWords(path, found.gives)
  return (
    <div className="cw-knob-note">
      <p className={found.betweenSteps ? undefined : 'cw-field-held'}>
        {found.betweenSteps ? (
          `knob ${name}: its nearest step gives ${gives}`
        ) : (
          <>
            <span aria-hidden="true">△ </span>knob {name} would give {gives}
          </>
        )}
      </p>
      {!inGesture && (
        <div className="cw-field-ways">
          {settles(set, found, name).map(({ label, edit }) => (
            <button key={label} type="button" className="cw-button" onClick={() => void commitPanel(stepName(path), edit)}>
              {label}
            </button>
          ))}
        </div>
      )}
    </div>
  )
}

/** Ways to settle, each tried; turning the knob says what it takes along. */
function settles(set: ParameterSet, found: Parted, name: string): readonly Settle[] {
  const others = (moveOf(set, found.parameter)?.knob.moves ?? []).filter(({ parameter }) => parameter !== found.parameter)
  const along = others.map(({ parameter }) => stepName(parameter).toLowerCase()).join(', ')
  const all: readonly (readonly [string, (set: ParameterSet, found: Parted) => ParameterSet | null])[] = [
    [`Turn ${name} there${along === '' ? '' : `, ${along} too`}`, found.betweenSteps ? () => null : turnToField],
    [`Widen ${name} to ${valueWords(found.parameter, found.stored)}`, widenToField],
    [`Use ${valueWords(found.parameter, found.gives)}`, takeFromKnob],
  ]
  return all.flatMap(([label, way]): Settle[] => {
    const settled = way(set, found)
    if (!settled || panelEditProblems(settled).length > 0) return []
    return [{ label, edit: (now) => way(now, found) ?? now }]
  })
}
