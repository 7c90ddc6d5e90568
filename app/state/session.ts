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

/** The waveform's outline: smallest and largest sample of each of its columns, all channels together. */
export interface Overview {
  readonly min: Float32Array
  readonly max: Float32Array
  readonly seconds: number
}

export interface Device {
  readonly deviceId: string
  readonly label: string
}

/** What Resume, Restart or Dismiss belong to. */
export type GuardState = 'recovers' | 'latched'

export type AudioStatus = 'idle' | 'starting' | 'running' | 'interrupted' | 'failed'

export interface SessionState {
  readonly status: AudioStatus
  readonly playing: boolean
  /** The caution before the first sound has been read and confirmed in this browser. */
  readonly cautionRead: boolean
  /** The caution is being shown: Play was pressed before it was confirmed. */
  readonly cautionOpen: boolean
  readonly source: Source
  /** "Reading take.wav …" while a source is made ready; null otherwise. */
  readonly loading: string | null
  /** Of recorded material; null for the tone, live input, and while loading. */
  readonly overview: Overview | null
  /** Repeat region of the source in seconds; null repeats everything. */
  readonly repeat: { readonly startS: number; readonly endS: number } | null
  readonly toneHz: number
  readonly bypass: Bypass
  /** What the Bypass button and its key switch to. */
  readonly bypassMode: Exclude<Bypass, 'off'>
  readonly equalLoudness: boolean
  /** Gain equal loudness applies now, dB; null while unmeasured. */
  readonly equalDb: number | null
  readonly levelDb: number
  readonly muted: boolean
  readonly delayChange: DelayChange
  /** Set while the guard holds the output muted: what tripped it, in words. */
  readonly guard: string | null
  /** Null while the guard is open; latched: only a changed set or Resume brings the sound back. */
  readonly guardState: GuardState | null
  /** "heard at 44.1 kHz, set at 48" and the like; null when there is nothing to say. */
  readonly remark: string | null
  /** Delays are being held at their limit right now. */
  readonly delaysHeld: boolean
  readonly error: string | null
  readonly contextRate: number | null
  /** Live input sounds only after "I wear headphones". */
  readonly headphones: boolean
  readonly devices: readonly Device[]
  /** Output devices, known after a permission; empty where the browser cannot choose. */
  readonly outputs: readonly Device[]
  /** '' is the system's own choice. */
  readonly outputId: string
}

export const LEVEL_MIN_DB = -60
export const LEVEL_MAX_DB = 0
/** Where every visit starts: the level is not kept. */
export const LEVEL_START_DB = -20
export const TONE_MIN_HZ = 20
export const TONE_MAX_HZ = 20_000

export const useSession = create<SessionState>()(() => ({
  status: 'idle',
  playing: false,
  cautionRead: false,
  cautionOpen: false,
  source: { kind: 'phrase', id: 'pluckedChords' },
  loading: null,
  overview: null,
  repeat: null,
  toneHz: 440,
  bypass: 'off',
  bypassMode: 'hard',
  equalLoudness: false,
  equalDb: null,
  levelDb: LEVEL_START_DB,
  muted: false,
  delayChange: 'glide',
  guard: null,
  guardState: null,
  remark: null,
  delaysHeld: false,
  error: null,
  contextRate: null,
  headphones: false,
  devices: [],
  outputs: [],
  outputId: '',
}))
