import { useId, useMemo } from 'react'
import { movePosition, turnKnob } from '../../../../src/set/panel.ts'
import { changeMove } from '../../../../src/set/panelEdit.ts'
import { type NumberParameter, parameter } from '../../../../src/set/parameters.ts'
import type { Move } from '../../../../src/set/types.ts'
import { valueProblem } from '../../../../src/set/valueProblem.ts'
import type { Binding, Refusal } from '../../../fields/binding.ts'
import { quantityContext } from '../../../fields/contexts.ts'
import { NumberInput } from '../../../fields/NumberInput.tsx'
import { useNumberText } from '../../../fields/useNumberText.ts'
import { committedSet } from '../../../state/document.ts'
import { dropGesture, endGesture } from '../../../state/draft.ts'
import { commitPanel, commitTurn, tryTurn } from '../../../state/panel.ts'
import { valueWords, whyNotPanel } from './panelWords.ts'

interface KnobValueProps {
  readonly index: number
  readonly name: string
  readonly move: Move
  readonly value: number | null
  readonly onFocus: () => void
}

/** What a knob gives, typed with its unit: the knob turns to where it gives that. */
export function KnobValue({ index, name, move, value, onFocus }: KnobValueProps) {
  const id = useId()
  const spec = parameter(move.parameter) as NumberParameter
  const binding = useMemo((): Binding<number | null> => ({ value, ...turnActs(index, name, move) }), [index, name, move, value])
  const text = useNumberText({ spec: { ...spec, nullable: false }, binding, context: quantityContext, whenOff: move.min as number })
  const focused: typeof text.onFocus = (event) => {
    onFocus()
    text.onFocus(event)
  }
  return (
    <>
      <span className="cw-knob-value">
        <NumberInput
          text={{ ...text, onFocus: focused }}
          spec={spec}
          value={value}
          label={`${name}, ${spec.label.toLowerCase()}`}
          describedBy={id}
        />
        {spec.unit !== '' && value !== null && <span className="cw-field-unit">{spec.unit}</span>}
      </span>
      <span id={id} className="cw-knob-notes">
        {text.refusal && (
          <span role="alert">
            <span className="cw-field-refusal">■ {text.refusal.why}</span>
            {text.refusal.ways.map((way) => (
              <button key={way.label} type="button" className="cw-button" onClick={way.take}>
                {way.label}
              </button>
            ))}
          </span>
        )}
      </span>
    </>
  )
}

function turnActs(index: number, name: string, move: Move): Omit<Binding<number | null>, 'value'> {
  const nearest = (value: number) => movePosition(move, value) ?? (isPastMax(move, value) ? 1 : 0)
  return {
    attempt: (value) => {
      if (value === null) return null
      const [problem] = tryTurn(index, nearest(value))
      return problem ? `Held: ${whyNotPanel(problem, null)}` : null
    },
    settle: endGesture,
    drop: dropGesture,
    apply: (value): Refusal => {
      if (value === null) return null
      const position = movePosition(move, value)
      if (position === null) return outOfReach(index, name, move, value)
      const [problem] = commitTurn(index, position)
      return problem ? { why: whyNotPanel(problem, committedSet()), ways: [] } : null
    },
  }
}

/** Past the end called max, on a scale of either direction. */
const isPastMax = ({ min, max }: Move, value: number) => Math.abs(value - (max as number)) < Math.abs(value - (min as number))

function outOfReach(index: number, name: string, move: Move, value: number): Refusal {
  const why = `${name} goes from ${valueWords(move.parameter, move.min)} to ${valueWords(move.parameter, move.max)}`
  const end = isPastMax(move, value) ? 'max' : 'min'
  const isFit = valueProblem(parameter(move.parameter), value) === null && (move.taper !== 'log' || value * (move.min as number) > 0)
  if (!isFit || move.taper === 'drawn') return { why, ways: [] }
  const at = committedSet().panel[index]?.moves.findIndex(({ parameter: path }) => path === move.parameter) ?? 0
  const take = () =>
    void commitPanel(`${name}, range`, (set) => turnKnob(changeMove(set, index, at, { [end]: value }), index, end === 'max' ? 1 : 0))
  return { why, ways: [{ label: `Widen to ${valueWords(move.parameter, value)}`, take }] }
}
