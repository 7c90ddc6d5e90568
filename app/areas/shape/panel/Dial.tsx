// One knob as its player meets it: turned by drag, keys and wheel; what it gives now stands beneath and is typed there.
import { parted } from '../../../../src/set/panelSettle.ts'
import { parameter } from '../../../../src/set/parameters.ts'
import { getAt } from '../../../../src/set/path.ts'
import type { Knob, Move, ParameterSet } from '../../../../src/set/types.ts'
import { knobName } from '../../../state/panel.ts'
import { DIAL_SIZE, pointer, scaleArc, ticks } from './dialPath.ts'
import { KnobValue } from './KnobValue.tsx'
import { spokenKnob, valueWords } from './panelWords.ts'
import { useTurn } from './useTurn.ts'

interface DialProps {
  readonly set: ParameterSet
  readonly index: number
  readonly chosen: boolean
  readonly onChoose: (index: number) => void
  readonly onTurn: Parameters<typeof useTurn>[0]['onTurn']
}

export function Dial({ set, index, chosen, onChoose, onTurn }: DialProps) {
  const knob = set.panel[index] as Knob
  const name = knobName(knob, index)
  const turn = useTurn({ index, knob, onTurn })
  const [first, ...rest] = knob.moves as [Move, ...Move[]]
  const isParted = knob.moves.some((move) => parted(set, move.parameter)?.betweenSteps === false)
  return (
    <div className="cw-knob" data-chosen={chosen || undefined}>
      <div
        {...turn}
        className="cw-dial"
        role="slider"
        tabIndex={0}
        aria-label={name}
        aria-orientation="vertical"
        aria-valuemin={0}
        aria-valuemax={1}
        aria-valuenow={Number(knob.position.toFixed(3))}
        aria-valuetext={`${spokenKnob(set, knob)}, at ${knob.position.toFixed(2)}`}
        onFocus={() => onChoose(index)}
      >
        <svg viewBox={`0 0 ${DIAL_SIZE} ${DIAL_SIZE}`} aria-hidden="true">
          <path className="cw-dial-ticks" d={ticks(knob.steps)} />
          <path className="cw-dial-scale" d={scaleArc(0, 1)} />
          <path className="cw-dial-turned" d={scaleArc(0, knob.position)} />
          <path className="cw-dial-pointer" d={pointer(knob.position)} />
        </svg>
      </div>
      <span className="cw-knob-name" title={name}>
        {isParted && (
          <span className="cw-knob-parted" title="The set has another value than this knob gives">
            △{' '}
          </span>
        )}
        {name}
      </span>
      {typeof first.min === 'number' && parameter(first.parameter).kind !== 'choice' ? (
        <KnobValue
          index={index}
          name={name}
          move={first}
          value={getAt(set, first.parameter) as number | null}
          onFocus={() => onChoose(index)}
        />
      ) : (
        <span className="cw-knob-value">{valueWords(first.parameter, getAt(set, first.parameter))}</span>
      )}
      {rest.map((move) => (
        <span key={move.parameter} className="cw-knob-more" title={parameter(move.parameter).label}>
          {valueWords(move.parameter, getAt(set, move.parameter))}
        </span>
      ))}
    </div>
  )
}
