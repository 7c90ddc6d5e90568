// What panel.box judges, and what it says where there is no panel. Apart from the judging, which a set without a panel can do without.
import type { ParameterSet } from '../set/types.ts'
import { type CheckId, labelOf } from './limits.ts'
import type { Check, WorkingStep } from './types.ts'

/** Figures that know no worse and no better: there is no worst place of them. */
export const VALUES: readonly CheckId[] = ['response.extremes', 'shaper.harmonics']

/** First step of the working. */
export const SCOPE: WorkingStep = {
  formula: 'worst figure over all knob positions, each knob anywhere from 0 to 1 by itself',
  numbers: 'steps count as continuous: a smoothed turn passes what lies between them',
  result: `what a delay change does while it glides is not judged; ${VALUES.map((id) => labelOf(id).toLowerCase()).join(', ')} know no worse and no better`,
  source: 'this project’s choice',
}

/** Whether any position of any knob gives another set. */
export const movesAnything = (set: ParameterSet): boolean => set.panel.some(({ moves }) => moves.length > 0)

/** The check where {@link movesAnything} is false. */
export function noPanel(set: ParameterSet): Check {
  const reason = set.panel.length === 0 ? 'The set has no panel' : 'No knob of the panel moves anything'
  return {
    id: 'panel.box',
    status: 'holds',
    value: null,
    limit: null,
    unit: '',
    label: labelOf('panel.box'),
    text: `${reason}: there are no other positions to judge.`,
    working: [{ ...SCOPE, numbers: '0 knobs that move anything', result: 'nothing to judge' }],
    worst: [],
  }
}
