// Files, links and flags come from outside: reading them returns a reason, it does not throw.

/** One thing wrong with something read: where, what stood there, what would be accepted. */
export interface Problem {
  /** Path inside the document ("loop.feedback", "panel[0].moves[1].taper"); "" for the document itself. */
  readonly path: string
  /** One lower-case sentence without a full stop, complete in itself, path, value and range included. */
  readonly message: string
  readonly value?: unknown
  /** Accepted range or choices in words: "-2 to 2", "sine, triangle, …". */
  readonly range?: string
  /** What to do instead. */
  readonly hint?: string
  /** Single changes, each of which would mend it by itself: what a page offers in place. */
  readonly mends?: readonly { readonly path: string; readonly value: number | string }[]
}

export type Result<T> = { readonly ok: true; readonly value: T } | { readonly ok: false; readonly problems: readonly Problem[] }

export const good = <T>(value: T): Result<T> => ({ ok: true, value })
export const bad = (...problems: readonly Problem[]): Result<never> => ({ ok: false, problems })
