// Words and numbers of the transport, the same wherever they stand.
import { PHRASES } from '../../../src/material/phraseList.ts'
import type { Bypass, DelayChange, Source } from '../../state/session.ts'

/** What the source button says. */
export function sourceLabel(source: Source): string {
  if (source.kind === 'file') return source.name
  if (source.kind === 'live') return source.label
  return PHRASES.find(({ id }) => id === source.id)?.label ?? 'Source'
}

export const BYPASS_MODES: readonly { readonly value: Exclude<Bypass, 'off'>; readonly label: string; readonly about: string }[] = [
  { value: 'hard', label: 'Hard', about: 'The input goes straight through and the effect stops.' },
  { value: 'tails', label: 'With tails', about: 'The input goes straight through; what is in the line rings out.' },
  { value: 'wetOnly', label: 'Wet only', about: 'The dry path is shut: only what the effect adds.' },
]

export const DELAY_CHANGES: readonly { readonly value: DelayChange; readonly label: string; readonly about: string }[] = [
  { value: 'glide', label: 'Glide', about: 'Delays move to their new value: pitch bends on the way.' },
  { value: 'crossfade', label: 'Cross-fade', about: 'The new delay fades in over the old one: pitch stays.' },
]

/** "−20", "−0.5", "+3.1": a real minus sign. `digits` after the point. */
export function signed(value: number, digits: number): string {
  const text = Math.abs(value).toFixed(digits)
  if (Number(text) === 0) return text
  return `${value < 0 ? '−' : '+'}${text}`
}

/** A level for a meter's number: one decimal, and the sign of silence below −99.9. */
export function meterText(db: number): string {
  return db < -99.9 ? '−∞' : signed(db, 1)
}

/** The level control: whole decibels; the lowest is off. */
export function levelText(db: number, lowest: number): string {
  return db <= lowest ? 'off' : `${signed(db, Number.isInteger(db) ? 0 : 1)} dB`
}

/** "1.25 s", "2:05.3". */
export function timeText(seconds: number): string {
  if (seconds < 60) return `${seconds.toFixed(2)} s`
  return `${Math.floor(seconds / 60)}:${(seconds % 60).toFixed(1).padStart(4, '0')}`
}
