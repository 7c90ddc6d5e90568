// The sweep's curves as the plot draws them: delay and cents of every voice over one cycle, its end repeating its start.
import { centsOfSlope, delaySlope, sweepTable } from '../../../src/analysis/sweepTable.ts'
import { frozenShapeValue } from '../../../src/dsp/sweep.ts'
import { delayMs, voiceOffsetMs } from '../../../src/set/delayRange.ts'
import type { ParameterSet } from '../../../src/set/types.ts'
import { cents, decimal, milliseconds } from '../words.ts'

export interface VoiceCurve {
  readonly channel: number
  readonly voice: number
  readonly delayMs: Float64Array
  /** NaN where the read stalls or runs backwards, and of a drift: the sine in its place bends otherwise. */
  readonly cents: Float64Array
}

export interface SweepCurves {
  /** 0 to 1. */
  readonly positions: Float64Array
  readonly voices: readonly VoiceCurve[]
  readonly minMs: number
  readonly maxMs: number
  readonly maxCents: number
}

const POINTS = 512

export function sweepCurves(set: ParameterSet): SweepCurves {
  const table = sweepTable(set, POINTS)
  const drifts = set.sweep.shape === 'drift'
  const closed = (values: readonly (number | null)[]) => Float64Array.from([...values, values[0] ?? null], (value) => value ?? Number.NaN)
  const voices = table.voices.map(
    ({ channel, voice, delayMs, cents }): VoiceCurve => ({
      channel,
      voice,
      delayMs: closed(delayMs),
      cents: closed(drifts ? cents.map(() => null) : cents),
    }),
  )
  const delays = voices.flatMap(({ delayMs }) => [Math.min(...delayMs), Math.max(...delayMs)])
  const first = voices[0]?.cents ?? new Float64Array()
  return {
    positions: Float64Array.from([...table.positions, 1]),
    voices,
    minMs: Math.min(...delays),
    maxMs: Math.max(...delays),
    maxCents: first.reduce((most, value) => (Number.isFinite(value) ? Math.max(most, Math.abs(value)) : most), 0),
  }
}

/** Delay and cents of the first voice at a position; cents null where nothing is played forwards. */
export function sweepAt(set: ParameterSet, position: number): { readonly delayMs: number; readonly cents: number | null } {
  const corner = { offsetMs: voiceOffsetMs(set.voices, 0), sweep: frozenShapeValue(set.sweep, position) }
  return { delayMs: delayMs(set, corner), cents: centsOfSlope(delaySlope(set, position, 0)) }
}

/** "position 0.38 · 5.21 ms · +4.5 cents" */
export function sweepWords(set: ParameterSet, position: number): string {
  const at = sweepAt(set, position)
  const place = `position ${decimal(position, 2)} · ${milliseconds(at.delayMs)}`
  if (set.sweep.shape === 'drift') return place
  return `${place} · ${at.cents === null ? 'not played forwards' : cents(at.cents)}`
}

/** A range with a little air, never empty. */
export function delayAxis({ minMs, maxMs }: Pick<SweepCurves, 'minMs' | 'maxMs'>): [number, number] {
  const air = Math.max((maxMs - minMs) * 0.12, maxMs * 0.01, 0.01)
  return [minMs - air, maxMs + air]
}
