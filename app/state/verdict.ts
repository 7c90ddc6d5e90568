// What the checks say about the set being shown, in numbers, for the area's tab and the header of the checks.
import { create } from 'zustand'
import type { Status, Verdict } from '../../src/checks/types.ts'

export interface VerdictState {
  /** null until the first answer of the worker. */
  readonly verdict: Verdict | null
  readonly fails: number
  readonly near: number
  readonly notes: number
  readonly holds: number
  /** Checks still being worked out; counted by what they said before, where they said anything. */
  readonly pending: number
  /** Every check speaks of the set as it stands, and nothing is being tried. */
  readonly settled: boolean
}

export const useVerdict = create<VerdictState>()(() => ({
  verdict: null,
  fails: 0,
  near: 0,
  notes: 0,
  holds: 0,
  pending: 0,
  settled: false,
}))

/** The sign and word of a status: never colour alone. */
export const STATUS_SIGN: Readonly<Record<Status, string>> = { fails: '■', near: '△', note: '·', holds: '○' }
export const STATUS_WORD: Readonly<Record<Status, string>> = { fails: 'fails', near: 'near', note: 'note', holds: 'holds' }
