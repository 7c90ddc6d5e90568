// The fields of the knob being edited, and what it moves.
import { useMemo } from 'react'
import { changeKnob, removeKnob, shiftKnob } from '../../../../src/set/panelEdit.ts'
import { KNOB_NAME, KNOB_POSITION, KNOB_SMOOTH, KNOB_STEPS } from '../../../../src/set/parameters/panel.ts'
import type { Knob, ParameterSet } from '../../../../src/set/types.ts'
import type { Binding, Refusal } from '../../../fields/binding.ts'
import { NumberField } from '../../../fields/NumberField.tsx'
import { TextField } from '../../../fields/TextField.tsx'
import { dropGesture, endGesture } from '../../../state/draft.ts'
import { commitPanel, commitTurn, knobName, tryPanel, tryTurn } from '../../../state/panel.ts'
import { FieldChooser } from './FieldChooser.tsx'
import { putOnKnob } from './knobActs.ts'
import { MoveEditor } from './MoveEditor.tsx'
import { fullKnob, whyNotPanel } from './panelWords.ts'

interface KnobEditorProps {
  readonly set: ParameterSet
  readonly index: number
  /** The knob went to another place of the row, or away (null). */
  readonly onPlaced: (index: number | null) => void
}

export function KnobEditor({ set, index, onPlaced }: KnobEditorProps) {
  const knob = set.panel[index] as Knob
  const name = knobName(knob, index)
  const { steps, smoothMs, position } = knob
  const stepsBinding = useMemo(() => knobBinding(index, `${name}, steps`, 'steps', steps), [index, name, steps])
  const smoothBinding = useMemo(() => knobBinding(index, `${name}, smoothing`, 'smoothMs', smoothMs), [index, name, smoothMs])
  const positionBinding = useMemo(() => turnBinding(index, position), [index, position])
  const nameBinding = useMemo(
    (): Binding<string> => ({
      value: knob.knob,
      attempt: () => null,
      settle: () => {},
      drop: () => {},
      apply: (text) => wordsOf(commitPanel(`Knob ${text}`, (now) => changeKnob(now, index, { knob: text.trim() }))),
    }),
    [index, knob.knob],
  )
  const shift = (to: number) => {
    commitPanel(`Knob ${name}, place`, (now) => shiftKnob(now, index, to))
    onPlaced(to)
  }
  const remove = () => {
    commitPanel(`Remove knob ${name}`, (now) => removeKnob(now, index))
    onPlaced(null)
  }
  const full = fullKnob(knob)
  return (
    <section className="cw-knob-editor" aria-label={`Knob ${name}`}>
      <TextField spec={{ ...KNOB_NAME, label: 'Name' }} binding={nameBinding} />
      <h3 className="cw-panel-head">Moves</h3>
      <ul>
        {knob.moves.map((move, at) => (
          <MoveEditor key={move.parameter} set={set} move={move} place={{ index, at, knob: name }} />
        ))}
      </ul>
      {full === null ? <FieldChooser label="Move another field" onChoose={(path) => void putOnKnob(path, index)} /> : <p>{full}</p>}
      <div className="cw-knob-settings">
        <NumberField spec={KNOB_POSITION} binding={positionBinding} />
        <NumberField spec={KNOB_STEPS} binding={stepsBinding} notes={[stepsNote(steps)]} lines={1} />
        <NumberField spec={KNOB_SMOOTH} binding={smoothBinding} />
      </div>
      <div className="cw-knob-acts">
        <ActButton label="◂ Earlier" spoken={`Put knob ${name} earlier`} off={index === 0} act={() => shift(index - 1)} />
        <ActButton label="Later ▸" spoken={`Put knob ${name} later`} off={index === set.panel.length - 1} act={() => shift(index + 1)} />
        <ActButton label="Remove knob" spoken={`Remove knob ${name}`} off={false} act={remove} />
      </div>
    </section>
  )
}

interface ActButtonProps {
  readonly label: string
  readonly spoken: string
  readonly off: boolean
  readonly act: () => void
}

/** Stays focusable while there is nothing to do, so that going to the end of the row does not throw the focus away. */
const ActButton = ({ label, spoken, off, act }: ActButtonProps) => (
  <button type="button" className="cw-button" aria-label={spoken} aria-disabled={off} onClick={off ? undefined : act}>
    {label}
  </button>
)

const stepsNote = (steps: number) =>
  steps === 0 ? 'continuous' : `a step every ${Number((100 / (steps - 1)).toPrecision(2))} % of the turn`

const wordsOf = ([problem]: ReturnType<typeof commitPanel>): Refusal => (problem ? { why: whyNotPanel(problem, null), ways: [] } : null)

function knobBinding(index: number, step: string, key: 'steps' | 'smoothMs', value: number): Binding<number | null> {
  // One step would not turn: stepping passes over it.
  const passed = (to: number) => (key === 'steps' && to === 1 ? (value > 1 ? 0 : 2) : to)
  const edit = (to: number) => (now: ParameterSet) => changeKnob(now, index, { [key]: to })
  return {
    value,
    attempt: (to) => (to === null ? null : (wordsOf(tryPanel(step, edit(passed(to))))?.why ?? null)),
    settle: endGesture,
    drop: dropGesture,
    apply: (to) => (to === null ? null : wordsOf(commitPanel(step, edit(to)))),
  }
}

function turnBinding(index: number, position: number): Binding<number | null> {
  const held = ([problem]: ReturnType<typeof tryTurn>) => (problem ? `Held: ${whyNotPanel(problem, null)}` : null)
  return {
    value: position,
    attempt: (to) => (to === null ? null : held(tryTurn(index, to))),
    settle: endGesture,
    drop: dropGesture,
    apply: (to) => (to === null ? null : wordsOf(commitTurn(index, to))),
  }
}
