// Rendered checks cost too much for a search: each is rendered once, at the worst corner of the closed-form check it follows.
import type { Knob } from '../set/types.ts'
import type { CheckId } from './limits.ts'
import { type Judged, judgedAt } from './panelBoxJudged.ts'
import { type PanelFinding, type PanelLook, rankOf } from './panelBoxLook.ts'
import type { Check, CheckEntry, CheckSteps } from './types.ts'

/** What grows with what: stepping with the speed of the delay, levels of what is played with the levels there can be. */
const FOLLOWS: Partial<Record<CheckId, CheckId>> = {
  'sweep.steps': 'sweep.detune',
  'level.dc': 'level.line',
  'level.loudness': 'level.peak',
  'level.mono': 'level.peak',
}

/** Parameters that cannot change what is rendered. */
const SILENT: Partial<Record<CheckId, RegExp>> = {
  'sweep.steps': /^mix\.(dry|dryTap|dryDelayMs|outputGainDb|invertRight)$|^mix\.shaper\.|^input\.gainDb$/,
}

/** One entry, or null where no knob moves anything that is rendered: the check beside panel.box says it then. */
export function* panelRendered(look: PanelLook, entry: CheckEntry, closed: readonly Judged[]): Generator<number, Judged | null> {
  const { knobs, own } = look.space
  const concerned = [...knobs.keys()].filter((k) => concerns(knobs[k] as Knob, entry.id))
  if (concerned.length === 0) return null
  const followed = closed.find(({ worst }) => worst.id === FOLLOWS[entry.id]) ?? worstOf(closed)
  const finding: PanelFinding = {
    positions: followed?.worst.positions ?? own,
    by: 'rendered corners',
    knobs: concerned,
    looks: 1,
    formula: `rendered where ${followed?.worst.id ?? 'the knobs stand'} is worst`,
    source: 'too costly for a search: nothing is shown of other positions',
  }
  const steps = entry.run(look.inputAt(finding.positions)) as CheckSteps | Check
  return judgedAt(look, finding, 'next' in steps ? yield* steps : steps)
}

const concerns = ({ moves }: Knob, id: CheckId): boolean => moves.some(({ parameter }) => !SILENT[id]?.test(parameter))

const worstOf = (judged: readonly Judged[]): Judged | undefined =>
  judged.reduce<Judged | undefined>((a, b) => (a === undefined || rankOf(b.worst.status) > rankOf(a.worst.status) ? b : a), undefined)
