// "First notch from 97 to 559 Hz": the brief's own quantity, read off the exact response at both ends of the sweep, and set by solving
// base and depth for it.
import { useId, useMemo } from 'react'
import { solveFirstExtremes } from '../../../../src/analysis/solveFirstExtremes.ts'
import { withAt } from '../../../../src/set/path.ts'
import type { Problem, Result } from '../../../../src/set/result.ts'
import type { ParameterSet } from '../../../../src/set/types.ts'
import { type Binding, type Refusal, refusal } from '../../../fields/binding.ts'
import { FieldNotes } from '../../../fields/FieldNotes.tsx'
import { sentence, withMinus } from '../../../fields/fieldWords.ts'
import { NumberInput } from '../../../fields/NumberInput.tsx'
import type { NumberSpec } from '../../../fields/quantity.ts'
import { type NumberText, useNumberText } from '../../../fields/useNumberText.ts'
import { useCurrent } from '../../../state/current.ts'
import { commit, committedSet } from '../../../state/document.ts'
import { dropGesture, endGesture, tryOut, useDraft } from '../../../state/draft.ts'
import { judge } from '../../../state/edit.ts'
import { depthPath } from './solveWidth.ts'
import { useFirstExtremes } from './useFirstExtremes.ts'

export type ExtremeKind = 'notch' | 'peak'

const LABELS: Readonly<Record<ExtremeKind, string>> = { notch: 'First notch', peak: 'First peak' }

export function ExtremeField({ kind }: { readonly kind: ExtremeKind }) {
  const id = useId()
  const stands = useCurrent((s) => s.set.sweep.rateHz === 0)
  const range = useFirstExtremes()?.[kind] ?? null
  const lowHz = range?.lowHz ?? null
  const highHz = range?.highHz ?? null
  const low = useEnd(kind, 'low', lowHz, stands ? null : highHz)
  const high = useEnd(kind, 'high', highHz, lowHz)
  const common = { spec: SPEC, none: 'none', title: SPEC.help, describedBy: `${id}-notes` }
  return (
    <fieldset className="cw-field cw-field--pair">
      <div className="cw-field-row">
        <legend className="cw-field-label">{LABELS[kind]}</legend>
        <span className="cw-field-value">
          <NumberInput text={low} value={lowHz} label={`${LABELS[kind]}${stands ? '' : ' where the delay is largest'}`} {...common} />
          {!stands && (
            <>
              <span className="cw-pair-arrow" aria-hidden="true">
                →
              </span>
              <NumberInput text={high} value={highHz} label={`${LABELS[kind]} where the delay is smallest`} {...common} />
            </>
          )}
          <span className="cw-field-unit">Hz</span>
        </span>
      </div>
      <FieldNotes id={`${id}-notes`} notes={[]} lines={0} refusal={low.refusal ?? high.refusal} held={low.held ?? high.held} />
    </fieldset>
  )
}

const SPEC: NumberSpec = {
  kind: 'number',
  label: 'First extreme',
  help: 'From the exact response; sets base and depth.',
  unit: 'Hz',
  min: 1,
  max: 96_000,
  taper: 'log',
  trackMin: 1,
  trackMax: 20_000,
}

/** One of the two frequencies. `other` stays where it is; null when the sweep stands and both are one. */
function useEnd(kind: ExtremeKind, end: 'low' | 'high', hz: number | null, other: number | null): NumberText {
  const binding = useMemo((): Binding<number | null> => {
    const targets = (value: number | null): readonly [number, number] | null => {
      if (value === null) return null
      return end === 'low' ? [value, other ?? value] : [other ?? value, value]
    }
    return {
      value: hz === null ? null : Number(hz.toPrecision(4)),
      attempt: (value) => {
        if (useDraft.getState().gesture !== LABELS[kind]) endGesture()
        const solved = solve(kind, targets(value))
        if (!solved.ok) return `Held: ${why(solved.problems)}`
        tryOut(LABELS[kind], solved.value)
        return null
      },
      settle: endGesture,
      drop: dropGesture,
      apply: (value): Refusal => {
        endGesture()
        const solved = solve(kind, targets(value))
        if (!solved.ok) return { why: sentence(why(solved.problems)), ways: [] }
        const proposal = judge(solved.value, 'line.baseMs')
        if (proposal.ok) commit(LABELS[kind], proposal.set)
        return refusal('line.baseMs', proposal, solved.value)
      },
    }
  }, [kind, end, hz, other])
  return useNumberText({ spec: SPEC, binding, context: () => ({}), whenOff: 100, none: '–' })
}

/** The set with base and depth solved, to six digits: a thousandth of a hertz at most. */
function solve(kind: ExtremeKind, targets: readonly [number, number] | null): Result<ParameterSet> {
  const set = committedSet()
  if (targets === null) return { ok: false, problems: [{ path: 'line.baseMs', message: 'type a frequency' }] }
  const solved = solveFirstExtremes(set, kind, targets[0], targets[1])
  if (!solved.ok) return solved
  const { baseMs, depth } = solved.value
  return { ok: true, value: withAt(withAt(set, 'line.baseMs', sixDigits(baseMs)), depthPath(set), sixDigits(depth)) }
}

const sixDigits = (value: number) => Number(value.toPrecision(6))
const why = ([first]: readonly Problem[]) => withMinus(first?.hint ? `${first.message}: ${first.hint}` : (first?.message ?? ''))
