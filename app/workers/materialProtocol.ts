// What the page and the material worker say. The worker keeps the sound that plays: it draws its outline and measures its loudness from it.
import type { ParameterSet } from '../../src/set/types.ts'
import type { Bypass, Overview } from '../state/session.ts'

/** Longest recording kept for audition, s. */
export const LONGEST_S = 600
/** Most samples kept over all channels: 256 MiB of single precision, 10 minutes of stereo at 96 kHz and a little more. */
export const MOST_SAMPLES = 2 ** 27 - 2 ** 24

export type MaterialRequest =
  /** A built-in phrase, made at `rate` Hz. */
  | { readonly kind: 'phrase'; readonly phrase: string; readonly rate: number }
  | { readonly kind: 'wav'; readonly file: Blob; readonly rate: number }
  /** What the browser decoded, already at `rate`. */
  | { readonly kind: 'decoded'; readonly channels: readonly Float32Array[]; readonly rate: number }
  /** Loudness of the dry sound over the set's, dB, both over the region. Newer measurements abandon older ones. */
  | {
      readonly kind: 'measure'
      readonly set: ParameterSet
      readonly bypass: Extract<Bypass, 'off' | 'wetOnly'>
      /** Which sound; the tone is made here. */
      readonly of: { readonly memory: number } | { readonly toneHz: number }
      readonly rate: number
      readonly startS: number
      readonly endS: number
    }

export interface Material {
  /** Names the sound in later requests and towards the processor. */
  readonly memory: number
  /** One or two channels. Shared with the worker where the page is isolated, else a copy for the processor. */
  readonly channels: readonly Float32Array[]
  readonly rate: number
  readonly overview: Overview
  /** Channels and rate of the source itself. */
  readonly sourceChannels: number
  readonly sourceRate: number
  /** What was done to it: "resampled from 44.1 kHz", "cut to its first 10 min"; empty when nothing. */
  readonly remarks: readonly string[]
}

export type MaterialReply =
  | { readonly ok: true; readonly material: Material }
  | { readonly ok: true; readonly gainDb: number | null }
  /** `code` as in src/media; 'abandoned' when a newer measurement came. */
  | { readonly ok: false; readonly code: string; readonly reason: string; readonly hint: string }

export interface ToMaterialWorker {
  readonly id: number
  readonly request: MaterialRequest
}

export interface FromMaterialWorker {
  readonly id: number
  readonly reply: MaterialReply
}
