// What ties a field to what it changes. Fields of the set come from the table; the tempo and the brief's own quantities bring their own.
import { useMemo } from 'react'
import { parameter } from '../../src/set/parameters.ts'
import { getAt } from '../../src/set/path.ts'
import type { Problem } from '../../src/set/result.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { replaceField } from '../state/companions.ts'
import { currentSet, useCurrent } from '../state/current.ts'
import { committedSet } from '../state/document.ts'
import { dropGesture, endGesture } from '../state/draft.ts'
import { commitField, commitOffer, type Proposal, propose, tryField } from '../state/edit.ts'
import { offerLabel, whyNot } from './fieldWords.ts'

/** A button beside a refused value, and what it does. */
export interface Way {
  readonly label: string
  readonly take: () => void
}

/** null when the value stands; else why not, and ways to have it. */
export type Refusal = { readonly why: string; readonly ways: readonly Way[] } | null

export interface Binding<T> {
  readonly value: T
  /** Tries a value within a gesture; returns why it was held, null when it was not. */
  readonly attempt: (value: T) => string | null
  /** Ends the gesture: one step of history. */
  readonly settle: () => void
  readonly drop: () => void
  /** Applies a typed value as one step. */
  readonly apply: (value: T) => Refusal
}

/** The field of the set at a path. */
export function useField<T>(path: string): Binding<T> {
  const value = useCurrent((s) => getAt(s.set, path)) as T
  return useMemo(() => ({ value, ...fieldActs(path) }), [value, path])
}

/** The field's current value without subscribing. */
export const fieldNow = (path: string): unknown => getAt(currentSet(), path)

function fieldActs(path: string): Omit<Binding<unknown>, 'value'> {
  return {
    attempt: (value) => (tryField(path, value) ? `Held: ${lower(whyHeld(path, value))}` : null),
    settle: endGesture,
    drop: dropGesture,
    apply: (value) => refusal(path, commitField(path, value), replaced(path, value)),
  }
}

/** Why a proposal was refused, with its offers as ways; null when it was not. */
export function refusal(path: string, proposal: Proposal, set: ParameterSet | null): Refusal {
  if (proposal.ok) return null
  const ways = proposal.offers.map((offer) => ({ label: offerLabel(offer), take: () => commitOffer(path, offer) }))
  return { why: whyNot(path, proposal.problems[0] as Problem, set), ways }
}

function whyHeld(path: string, value: unknown): string {
  const proposal = propose(path, value)
  return proposal.ok ? '' : whyNot(path, proposal.problems[0] as Problem, replaced(path, value))
}

/** The set as it would be, valid or not; null when the value itself is out of its range or the holder is gone. */
function replaced(path: string, value: unknown): ParameterSet | null {
  const row = parameter(path)
  if (typeof value === 'number' && 'min' in row && !(value >= row.min && value <= row.max)) return null
  return replaceField(committedSet(), path, value)
}

const lower = (text: string) => text.charAt(0).toLowerCase() + text.slice(1)
