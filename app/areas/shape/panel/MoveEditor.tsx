// One parameter that a knob moves: from where to where, along which taper.
import { useId, useMemo, useState } from 'react'
import { TAPER_POINTS } from '../../../../src/set/drawnPoints.ts'
import { moveValue, switchValues } from '../../../../src/set/panel.ts'
import { MOVE_TAPER } from '../../../../src/set/parameters/panel.ts'
import { type NumberParameter, parameter } from '../../../../src/set/parameters.ts'
import { getAt } from '../../../../src/set/path.ts'
import type { Move, ParameterSet } from '../../../../src/set/types.ts'
import type { Refusal } from '../../../fields/binding.ts'
import { quantityContext } from '../../../fields/contexts.ts'
import { FieldNotes } from '../../../fields/FieldNotes.tsx'
import { NumberInput } from '../../../fields/NumberInput.tsx'
import { PointsField } from '../../../fields/PointsField.tsx'
import { PointsEditor } from '../../../fields/pointsEditor/PointsEditor.tsx'
import type { NumberSpec } from '../../../fields/quantity.ts'
import { useNumberText } from '../../../fields/useNumberText.ts'
import { dropGesture, endGesture } from '../../../state/draft.ts'
import { EndsTrack } from './EndsTrack.tsx'
import { KnobNote } from './KnobNote.tsx'
import { takeOffKnob } from './knobActs.ts'
import { changeAsStep, chooseTaper, endActs, type MovePlace, tryChange } from './moveActs.ts'
import { parameterLabel, valueWords } from './panelWords.ts'

interface MoveEditorProps {
  readonly set: ParameterSet
  readonly place: MovePlace
  readonly move: Move
}

export function MoveEditor({ set, place, move }: MoveEditorProps) {
  const row = parameter(move.parameter)
  const label = parameterLabel(move.parameter)
  const [refusal, setRefusal] = useState<Refusal>(null)
  const values = switchValues(row)
  return (
    <li className="cw-move">
      <fieldset>
        <div className="cw-field-row">
          <legend className="cw-move-name">{label}</legend>
          <Taper {...{ place, move, setRefusal }} listed={values !== null} />
          <button
            type="button"
            className="cw-icon"
            aria-label={`Take ${label.toLowerCase()} off knob ${place.knob}`}
            title="Take it off the knob"
            onClick={() => takeOffKnob(move.parameter)}
          >
            <span aria-hidden="true">×</span>
          </button>
        </div>
        {values ? (
          <ListedEnds values={values} {...{ place, move, setRefusal }} />
        ) : (
          <NumberEnds spec={{ ...(row as NumberParameter), nullable: false }} value={getAt(set, move.parameter)} {...{ place, move }} />
        )}
        <FieldNotes id={`cw-move-${place.index}-${place.at}`} notes={[]} lines={0} refusal={refusal} />
        <KnobNote path={move.parameter} />
        {move.taper === 'drawn' && <DrawnTaper {...{ place, move }} />}
      </fieldset>
    </li>
  )
}

interface TaperProps {
  readonly place: MovePlace
  readonly move: Move
  /** The move steps through listed values, which have no ratios. */
  readonly listed: boolean
  readonly setRefusal: (refusal: Refusal) => void
}

function Taper({ place, move, listed, setRefusal }: TaperProps) {
  const shown = TAPER_WORDS[move.taper]
  return (
    <span className="cw-choice cw-taper">
      <span className="cw-taper-shown" aria-hidden="true">
        {shown} <span className="cw-choice-arrow">▾</span>
      </span>
      <select
        className="cw-choice-select"
        aria-label={`Taper of ${parameterLabel(move.parameter).toLowerCase()}`}
        title={MOVE_TAPER.help}
        value={move.taper}
        onChange={(event) => setRefusal(chooseTaper(place, event.target.value as Move['taper']))}
      >
        {(['linear', 'log', 'drawn'] as const)
          .filter((taper) => !listed || taper !== 'log')
          .map((taper) => (
            <option key={taper} value={taper}>
              {TAPER_WORDS[taper]}
            </option>
          ))}
      </select>
    </span>
  )
}

const TAPER_WORDS: Readonly<Record<Move['taper'], string>> = { linear: 'linear', log: 'logarithmic', drawn: 'drawn' }

interface NumberEndsProps {
  readonly spec: NumberSpec
  readonly place: MovePlace
  readonly move: Move
  readonly value: unknown
}

function NumberEnds({ spec, place, move, value }: NumberEndsProps) {
  const id = useId()
  const { index, at, knob } = place
  const acts = useMemo(() => ({ min: endActs({ index, at, knob }, 'min'), max: endActs({ index, at, knob }, 'max') }), [index, at, knob])
  const [min, max] = [move.min as number, move.max as number]
  const context = quantityContext
  const left = useNumberText({ spec, binding: { value: min, ...acts.min }, context, whenOff: min })
  const right = useNumberText({ spec, binding: { value: max, ...acts.max }, context, whenOff: max })
  const name = parameterLabel(move.parameter)
  const flip = () => changeAsStep(place, { min: move.max, max: move.min })
  return (
    <>
      <div className="cw-move-ends">
        <NumberInput text={left} spec={spec} value={min} label={`${name} at the knob’s left end`} describedBy={id} />
        <button type="button" className="cw-icon" aria-label={`Reverse ${name.toLowerCase()}`} title="Reverse" onClick={flip}>
          <span aria-hidden="true">→</span>
        </button>
        <NumberInput text={right} spec={spec} value={max} label={`${name} at the knob’s right end`} describedBy={id} />
        {spec.unit !== '' && <span className="cw-field-unit">{spec.unit}</span>}
      </div>
      <EndsTrack
        {...{ spec, min, max }}
        value={typeof value === 'number' ? value : null}
        move={(end, to) => (end === 'min' ? left : right).setHeld(tryChange(place, { [end]: to }))}
        end={endGesture}
      />
      <FieldNotes id={id} notes={[]} lines={0} refusal={left.refusal ?? right.refusal} held={left.held ?? right.held} />
    </>
  )
}

interface ListedEndsProps {
  readonly values: NonNullable<ReturnType<typeof switchValues>>
  readonly place: MovePlace
  readonly move: Move
  readonly setRefusal: (refusal: Refusal) => void
}

/** The ends of a choice, a switch or listed numbers; the turn is divided among the values between them. */
function ListedEnds({ values, place, move, setRefusal }: ListedEndsProps) {
  const name = parameterLabel(move.parameter)
  const words = (value: Move['min']) => valueWords(move.parameter, value)
  const chooser = (end: 'min' | 'max', where: string) => (
    <span className="cw-choice">
      <span className="cw-choice-shown" aria-hidden="true">
        {words(move[end])} <span className="cw-choice-arrow">▾</span>
      </span>
      <select
        className="cw-choice-select"
        aria-label={`${name} at the knob’s ${where} end`}
        value={values.indexOf(move[end])}
        onChange={(event) => setRefusal(changeAsStep(place, { [end]: values[Number(event.target.value)] as Move['min'] }))}
      >
        {values.map((value, i) => (
          <option key={String(value)} value={i}>
            {words(value)}
          </option>
        ))}
      </select>
    </span>
  )
  return (
    <div className="cw-move-ends">
      {chooser('min', 'left')}
      <span className="cw-pair-arrow" aria-hidden="true">
        →
      </span>
      {chooser('max', 'right')}
    </div>
  )
}

function DrawnTaper({ place, move }: { readonly place: MovePlace; readonly move: Move }) {
  const { points } = move
  const apply = (next: Move['points']) => changeAsStep(place, { points: next })
  return (
    <>
      <PointsEditor
        label={`Taper of ${parameterLabel(move.parameter).toLowerCase()}`}
        rule={TAPER_POINTS}
        points={points}
        attempt={(next) => tryChange(place, { points: next })}
        settle={endGesture}
        drop={dropGesture}
        apply={apply}
        xRange={[0, 1]}
        yRange={[0, 1]}
        meaning={([x]) => valueWords(move.parameter, moveValue(move, x))}
      />
      <PointsField label="Taper" rule={TAPER_POINTS} points={points} apply={apply} />
    </>
  )
}
