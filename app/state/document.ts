// The document: the sets in the slots and the history over them. It holds only valid sets; what a gesture is
// trying lives in draft.ts until the gesture ends. One slot is used for now; the shape is ready for four.
import { temporal } from 'zundo'
import { create } from 'zustand'
import { defaultSet } from '../../src/set/defaults.ts'
import type { ParameterSet } from '../../src/set/types.ts'

export type SlotId = 'A' | 'B' | 'C' | 'D'

export interface DocumentState {
  readonly slots: Readonly<Partial<Record<SlotId, ParameterSet>>>
  readonly slot: SlotId
  /** What the last change did and where, in words for the undo button: "Base delay". */
  readonly step: { readonly name: string; readonly slot: SlotId }
}

type History = Pick<DocumentState, 'slots' | 'step'>

export const useDocument = create<DocumentState>()(
  temporal((): DocumentState => ({ slots: { A: defaultSet() }, slot: 'A', step: { name: '', slot: 'A' } }), {
    partialize: ({ slots, step }): History => ({ slots, step }),
    equality: (before, after) => before.slots === after.slots,
    limit: 500,
  }),
)

/** The set of the slot being shown, as committed. */
export function committedSet(): ParameterSet {
  const { slots, slot } = useDocument.getState()
  const set = slots[slot]
  if (!set) throw new RangeError(`slot ${slot} is empty`)
  return set
}

/** One named step of history. `set` must be valid; nothing happens when it is the set already there. */
export function commit(name: string, set: ParameterSet): void {
  if (set === committedSet()) return
  useDocument.setState(({ slots, slot }) => ({ slots: { ...slots, [slot]: set }, step: { name, slot } }))
}

/** Replaces the document at start-up from storage; leaves no history. */
export function restoreDocument(state: Pick<DocumentState, 'slots' | 'slot'>): void {
  useDocument.setState({ ...state, step: { name: '', slot: state.slot } })
  useDocument.temporal.getState().clear()
}

/** Undo shows the slot it changed. Returns the name of the step taken back, null when there is none. */
export function undo(): string | null {
  if (useDocument.temporal.getState().pastStates.length === 0) return null
  const { step } = useDocument.getState()
  useDocument.temporal.getState().undo()
  useDocument.setState({ slot: step.slot })
  return step.name
}

export function redo(): string | null {
  if (useDocument.temporal.getState().futureStates.length === 0) return null
  useDocument.temporal.getState().redo()
  const { step } = useDocument.getState()
  useDocument.setState({ slot: step.slot })
  return step.name
}
