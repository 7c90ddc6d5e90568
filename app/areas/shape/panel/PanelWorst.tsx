// The worst places of the panel, as panel.box found them: what is wrong there, where each knob stands, and the way there.
import './worst.css'
import { useState } from 'react'
import { LIMITS } from '../../../../src/checks/limits.ts'
import type { Check, PanelWorst as Worst } from '../../../../src/checks/types.ts'
import type { Problem } from '../../../../src/set/result.ts'
import { useCurrent } from '../../../state/current.ts'
import { committedSet } from '../../../state/document.ts'
import { applyMend } from '../../../state/mend.ts'
import { atPositions, goToPositions } from '../../../state/panel.ts'
import { STATUS_SIGN, STATUS_WORD } from '../../../state/verdict.ts'
import { checkFigure } from '../checks/checkWords.ts'
import { type EndOffer, endThatHolds } from './endThatHolds.ts'
import { parameterLabel, placesWords, valueWords, whyNotPanel } from './panelWords.ts'

const ROWS = new Map(LIMITS.map((row) => [row.id, row]))

export function PanelWorst({ check }: { readonly check: Check }) {
  return (
    <ul className="cw-worst" aria-label="Worst places of the panel">
      {(check.worst ?? []).map((worst) => (
        <Place key={worst.id} worst={worst} />
      ))}
    </ul>
  )
}

function Place({ worst }: { readonly worst: Worst }) {
  const set = useCurrent((s) => s.set)
  const [refused, setRefused] = useState<Refused | null>(null)
  const { label, unit } = ROWS.get(worst.id) ?? { label: worst.id, unit: '' }
  const go = () => {
    const problems = goToPositions(`Go to ${label.toLowerCase()}`, worst.positions)
    setRefused(problems.length === 0 ? null : refusedAt(worst, problems))
  }
  const at = Object.entries(worst.at)
  return (
    <li className="cw-worst-place" data-status={worst.status}>
      <p className="cw-worst-head">
        <span className="cw-check-sign" data-status={worst.status} aria-hidden="true">
          {STATUS_SIGN[worst.status]}
        </span>
        <span>{label}</span>
        <span className="cw-worst-figure">{checkFigure({ ...worst, unit })}</span>
      </p>
      <p className="cw-worst-where">
        {STATUS_WORD[worst.status]} · {placesWords(set, worst.positions)}
      </p>
      {at.length > 0 && (
        <p className="cw-worst-where">
          {at.map(([path, value]) => `${parameterLabel(path).toLowerCase()} ${valueWords(path, value)}`).join(', ')}
        </p>
      )}
      <p className="cw-worst-where">{HOW_KNOWN[worst.by]}</p>
      <div className="cw-field-ways">
        <button type="button" className="cw-button" tabIndex={-1} aria-label={`Go there: ${label}`} onClick={go}>
          Go there
        </button>
      </div>
      {refused && (
        <div role="alert" className="cw-worst-refused">
          <p>
            <span aria-hidden="true">■ </span>
            It cannot sound there. {refused.why}.
          </p>
          {refused.offer && (
            <button type="button" className="cw-button" tabIndex={-1} onClick={() => refused.offer && take(refused.offer, setRefused)}>
              {refused.offer.label}
            </button>
          )}
        </div>
      )}
    </li>
  )
}

const HOW_KNOWN: Readonly<Record<Worst['by'], string>> = {
  corners: 'worst corner of the knobs, the figure being monotone in each',
  intervals: 'bounded over intervals of every knob',
  samples: 'worst of the positions tried',
  'rendered corners': 'worst of the corners rendered',
}

interface Refused {
  readonly why: string
  readonly offer: EndOffer | null
}

function refusedAt({ positions }: Worst, problems: readonly Problem[]): Refused {
  const set = committedSet()
  return { why: whyNotPanel(problems[0] as Problem, atPositions(set, positions)), offer: endThatHolds(set, positions) }
}

function take(offer: EndOffer, refuse: (refused: Refused | null) => void): void {
  const proposal = applyMend(offer)
  refuse(proposal.ok ? null : { why: whyNotPanel(proposal.problems[0] as Problem, null), offer: null })
}
