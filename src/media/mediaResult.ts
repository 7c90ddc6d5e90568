// What reading bytes from outside gives back. media knows nothing else of ours, so it has its own small result.

/** Why bytes were refused: a word for code, a sentence for people, and what to do instead. */
export interface Refusal {
  readonly ok: false
  /** `empty`: nothing in it; `foreign`: another kind of file; `cut`: shorter than its own header says; `damaged`: contradicts itself;
   * `unsupported`: a sound encoding or a size that is not read; `nonFinite`: a sample that is no number. */
  readonly code: 'empty' | 'foreign' | 'cut' | 'damaged' | 'unsupported' | 'nonFinite'
  /** One lower-case sentence without a full stop. */
  readonly reason: string
  readonly hint: string
}

export type MediaResult<T> = { readonly ok: true; readonly value: T } | Refusal

export const refuse = (code: Refusal['code'], reason: string, hint: string): Refusal => ({ ok: false, code, reason, hint })
