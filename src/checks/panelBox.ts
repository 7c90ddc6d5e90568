// panel.box: the worst of every check over all positions of the panel's knobs. Closed-form checks by monotone corners, interval bounds or, where nothing is known, places
// tried; rendered ones where what causes them is worst, and where the knobs stand. Knobs count as continuous: while a turn is smoothed it passes what lies between its steps.
// What a delay change does while it glides is not judged here.
import { panelSpace } from '../analysis/panelSpace.ts'
import type { ParameterSet } from '../set/types.ts'
import { type CheckId, labelOf } from './limits.ts'
import { type Judged, judgedAt } from './panelBoxJudged.ts'
import { panelLine, panelPeak } from './panelBoxLevels.ts'
import { type PanelJudge, type PanelLook, panelLook, rankOf } from './panelBoxLook.ts'
import { panelMargin, panelPoles, panelRing, panelStability } from './panelBoxLoop.ts'
import { endsThatHold } from './panelBoxMends.ts'
import { panelRendered } from './panelBoxRendered.ts'
import { movesAnything, noPanel, SCOPE, VALUES } from './panelBoxScope.ts'
import { panelDetune, panelFusion, panelRange } from './panelBoxSweep.ts'
import { knownText, valueText } from './panelBoxText.ts'
import { panelTried } from './panelBoxTried.ts'
import { CHECKS, type CheckOptions, checkInput, verdictOf } from './registry.ts'
import type { Check, CheckEntry, CheckFunction, CheckProgress, Mend, PanelWorst, WorkingStep } from './types.ts'

const JUDGES: Partial<Record<CheckId, PanelJudge>> = {
  'loop.stability': panelStability,
  'loop.margin': panelMargin,
  'loop.poles': panelPoles,
  'loop.ring': panelRing,
  'sweep.range': panelRange,
  'sweep.detune': panelDetune,
  'sweep.fusion': panelFusion,
  'level.peak': panelPeak,
  'level.line': panelLine,
}

/** Checks for which ends are worked out: a page shows a few. */
const MOST_MENDED = 3

/**
 * Judges a valid set over its whole panel, step by step. `status`: the worst of `worst`, a note weighing nothing. `value`: id of the worst check, null where all hold or there is no panel.
 * `worst`: one entry a check, worst first. Positions at which the set itself would be refused are judged like others: sweep.range fails there. Deterministic.
 */
export function* panelBoxSteps(set: ParameterSet, options: CheckOptions = {}): Generator<CheckProgress, Check> {
  const { sampleRate, material } = checkInput(set, options)
  if (!movesAnything(set)) return noPanel(set)
  const entries = CHECKS.filter(({ id, kind }) => !VALUES.includes(id) && (options.kinds?.includes(kind) ?? true))
  const look = panelLook(panelSpace(set, sampleRate), material)
  const judged: Judged[] = []
  const total = entries.length + 1
  // Rendered ones last: they follow what the closed ones found.
  const inOrder = [...entries.filter(({ kind }) => kind === 'closed'), ...entries.filter(({ kind }) => kind === 'rendered')]
  for (const [done, entry] of inOrder.entries()) {
    const at = { id: entry.id, done, total }
    yield { ...at, part: 0 }
    const steps = entry.kind === 'closed' ? closedWorst(look, entry) : panelRendered(look, entry, judged)
    let step = steps.next()
    for (; !step.done; step = steps.next()) yield { ...at, part: step.value ?? 0 }
    if (step.value) judged.push(step.value)
  }
  judged.sort((a, b) => rankOf(b.worst.status) - rankOf(a.worst.status))
  const mend: Mend[] = []
  const troubled = judged.filter(({ worst }) => rankOf(worst.status) >= rankOf('near')).slice(0, MOST_MENDED)
  for (const [i, { worst, finding }] of troubled.entries()) {
    const steps = endsThatHold(set, sampleRate, worst, finding.knobs)
    let step = steps.next()
    for (; !step.done; step = steps.next()) yield { id: 'panel.box', done: entries.length, total, part: i / troubled.length }
    mend.push(...step.value.filter(({ path }) => !mend.some((other) => other.path === path)))
  }
  return whole(judged, mend)
}

function* closedWorst(look: PanelLook, entry: CheckEntry): Generator<number, Judged> {
  const steps = (JUDGES[entry.id] ?? panelTried)(look, entry)
  let step = steps.next()
  for (; !step.done; step = steps.next()) yield 0
  const finding = step.value
  return judgedAt(look, finding, (entry.run as CheckFunction)(look.inputAt(finding.positions)))
}

function whole(judged: readonly Judged[], mend: readonly Mend[]): Check {
  const worst = judged.map((one) => one.worst)
  const status = verdictOf(worst)
  const [first, ...more] = worst.filter((one) => rankOf(one.status) >= rankOf('near'))
  const others =
    more.length === 0
      ? ''
      : ` ${more.length === 1 ? 'Another check is' : `${more.length} other checks are`} near or past a limit at some position.`
  return {
    id: 'panel.box',
    status,
    value: first?.id ?? null,
    limit: null,
    unit: '',
    label: labelOf('panel.box'),
    text: first ? `${first.text}${others}` : allHold(worst),
    working: [SCOPE, ...judged.map(stepOf)],
    ...(mend.length > 0 && { mend }),
    worst,
  }
}

function allHold(worst: readonly PanelWorst[]): string {
  const tried = worst.filter(({ by }) => by === 'samples' || by === 'rendered corners').length
  return `Every check holds: ${worst.length - tried} at all knob positions${tried > 0 ? `, ${tried} where ${tried === 1 ? 'it was' : 'they were'} tried` : ''}.`
}

function stepOf({ worst, finding, unit }: Judged): WorkingStep {
  return {
    formula: `${labelOf(worst.id)}: ${finding.formula}`,
    numbers: `${finding.knobs.length === 0 ? 'no knob' : finding.knobs.length === 1 ? '1 knob' : `${finding.knobs.length} knobs`}, ${finding.looks} sets looked at`,
    result: `${worst.status}, ${valueText(worst.value, unit)}; ${knownText(worst.by)}`,
    source: finding.source,
  }
}
