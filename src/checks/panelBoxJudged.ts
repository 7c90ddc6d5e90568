// One check at its worst place, as panel.box lists it.
import { valuesAt } from '../analysis/panelSpace.ts'
import { type PanelFinding, type PanelLook, rankOf } from './panelBoxLook.ts'
import { worstText } from './panelBoxText.ts'
import type { Check, PanelWorst, Status } from './types.ts'

export interface Judged {
  readonly worst: PanelWorst
  readonly finding: PanelFinding
  readonly unit: string
}

export function judgedAt({ space }: PanelLook, finding: PanelFinding, check: Check): Judged {
  const worst: PanelWorst = {
    id: check.id,
    status: raised(check.status, finding.bound?.status),
    value: check.value,
    at: valuesAt(space, finding.positions),
    positions: finding.positions,
    by: finding.by,
    ...(finding.bound && { bound: finding.bound.value }),
    text: worstText(space.knobs, finding, check),
  }
  return { worst, finding, unit: check.unit }
}

/** A bound past the limit does not say that any position is: but that none is, is not shown either. */
function raised(found: Status, bound: Status | undefined): Status {
  if (bound === undefined || rankOf(bound) <= rankOf(found)) return found
  return bound === 'fails' ? 'near' : bound
}
