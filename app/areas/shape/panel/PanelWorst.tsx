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
import { placesWords, whyNotPanel } from './panelWords.ts'

const ROWS = new Map(LIMITS.map((row) => [row.id, row]))

export function PanelWorst({ check }: { readonly check: Check }) {
  const [all, setAll] = useState(false)
  const places = check.worst ?? []
  const troubled = places.filter(({ status }) => status === 'fails' || status === 'near')
  const shown = all || troubled.length === 0 ? places : troubled
  const rest = places.length - troubled.length
  return (
    <div className="cw-worst">
      <ul aria-label="Worst places of the panel">
        {shown.map((worst) => (
          <Place key={worst.id} worst={worst} />
        ))}
      </ul>
      {troubled.length > 0 && rest > 0 && (
        <button type="button" className="cw-link cw-worst-rest" tabIndex={-1} aria-expanded={all} onClick={() => setAll(!all)}>
          {all ? 'Only what is not inside its limit' : `${rest} more inside their limits`}
        </button>
      )}
    </div>
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
  return (
    <li className="cw-worst-place" data-status={worst.status}>
      <p className="cw-worst-head">
        <span className="cw-check-sign" data-status={worst.status} aria-hidden="true">
          {STATUS_SIGN[worst.status]}
        </span>
        <span>{label}</span>
        <span className="cw-worst-figure">{checkFigure({ ...worst, unit })}</span>
      </p>
      <p className="cw-worst-text">{worst.text}</p>
      <p className="cw-worst-where">
        {STATUS_WORD[worst.status]} · <span title={HOW_KNOWN[worst.by].title}>{HOW_KNOWN[worst.by].word}</span> ·{' '}
        {placesWords(set, worst.positions, worst.at)}
      </p>
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

const HOW_KNOWN: Readonly<Record<Worst['by'], { readonly word: string; readonly title: string }>> = {
  corners: { word: 'a corner', title: 'In each knob the figure only grows or falls: its worst lies at a corner' },
  intervals: { word: 'a bound', title: 'Bounded over intervals of every knob' },
  samples: { word: 'of those tried', title: 'The worst of the positions tried; nothing is shown of those between' },
  'rendered corners': { word: 'a rendered corner', title: 'The worst of the corners rendered' },
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
