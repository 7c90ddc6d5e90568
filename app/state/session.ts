// The listening session: what is played and how. Settings persist for the tab where storage.ts says so;
// nothing here is history. Fast values (meters, position) are in live.ts.
import { create } from 'zustand'

export type Bypass = 'off' | 'hard' | 'tails' | 'wetOnly'
export type DelayChange = 'glide' | 'crossfade'

export type Source =
  | { readonly kind: 'phrase'; readonly id: string }
  | {
      readonly kind: 'file'
      readonly name: string
      readonly seconds: number
      readonly channels: number
      readonly rate: number
      /** "read as WAV" or "decoded by the browser", plus what was cut or resampled. */
      readonly remark: string
    }
  | { readonly kind: 'live'; readonly deviceId: string; readonly label: string }

export type AudioStatus = 'idle' | 'starting' | 'running' | 'interrupted' | 'failed'

export interface SessionState {
  readonly status: AudioStatus
  readonly playing: boolean
  /** The caution before the first sound has been read and confirmed in this browser. */
  readonly cautionRead: boolean
  readonly source: Source
  /** Repeat region of the source in seconds; null repeats everything. */
  readonly repeat: { readonly startS: number; readonly endS: number } | null
  readonly toneHz: number
  readonly bypass: Bypass
  readonly equalLoudness: boolean
  /** Gain equal loudness applies now, dB; null while unmeasured. */
  readonly equalDb: number | null
  readonly levelDb: number
  readonly muted: boolean
  readonly delayChange: DelayChange
  /** Set while the guard holds the output muted: what tripped it, in words. */
  readonly guard: string | null
  /** "heard at 44.1 kHz, set at 48" and the like; null when there is nothing to say. */
  readonly remark: string | null
  readonly error: string | null
  readonly contextRate: number | null
  /** Live input sounds only after "I wear headphones". */
  readonly headphones: boolean
  readonly devices: readonly { readonly deviceId: string; readonly label: string }[]
}

export const useSession = create<SessionState>()(() => ({
  status: 'idle',
  playing: false,
  cautionRead: false,
  source: { kind: 'phrase', id: 'plucked' },
  repeat: null,
  toneHz: 440,
  bypass: 'off',
  equalLoudness: false,
  equalDb: null,
  levelDb: -20,
  muted: false,
  delayChange: 'glide',
  guard: null,
  remark: null,
  error: null,
  contextRate: null,
  headphones: false,
  devices: [],
}))
