// The parameter set: everything that defines one effect. Field for field the JSON of `*.set.json`.
// Ranges, units, defaults and help of every field stand in parameters.ts and nowhere else.

export type Intent = 'chorus' | 'flanger' | 'vibrato' | 'doubler' | 'comb' | 'other'
export type Layout = 'mono' | 'stereo' | 'monoToStereo'
export type Interpolation = 'nearest' | 'linear' | 'lagrange3' | 'hermite4' | 'allpass1'
export type SweepShape = 'sine' | 'triangle' | 'square' | 'rampUp' | 'rampDown' | 'drift' | 'drawn'
export type SweepLaw = 'time' | 'ratio'
export type Between = 'ramp' | 'hold'
export type LoopDelay = 'moving' | 'fixed'
export type DryTap = 'input' | 'line'
export type Curve = 'hardClip' | 'arctan' | 'tanh' | 'cubic' | 'diode' | 'deadZone' | 'drawn'
export type Antialias = 'none' | 'adaa1'
export type Taper = 'linear' | 'log' | 'drawn'
export type NumberFormat = 'float32' | 'q31' | 'q15'

/** A drawn point [x, y]: for the sweep [phase, s], for a shaper [t, k], for a taper [position, part of the way]. */
export type Point = readonly [number, number]

/** shaper(x) = ceiling · c(drive · x); c(v) = P k(v/P) for v ≥ 0 and −N k(−v/N) below. */
export interface Shaper {
  readonly curve: Curve
  readonly drive: number
  readonly ceiling: number
  readonly positive: number
  readonly negative: number
  readonly deadZone: number
  readonly points: readonly Point[]
  readonly tableSize: number
  readonly tableRange: number
  readonly tableInterpolation: 'linear'
  readonly antialias: Antialias
}

/** One parameter moved by a knob, from `min` (knob at 0) to `max` (knob at 1); min may exceed max. */
export interface Move {
  readonly parameter: string
  readonly min: number | string | boolean
  readonly max: number | string | boolean
  readonly taper: Taper
  readonly points: readonly Point[]
}

export interface Knob {
  readonly knob: string
  readonly position: number
  readonly steps: number
  readonly smoothMs: number
  readonly moves: readonly Move[]
}

export interface ParameterSet {
  readonly format: 'combwright-set'
  readonly version: 1
  readonly name: string
  readonly notes: string
  readonly intent: Intent
  readonly sampleRate: number
  readonly layout: Layout
  readonly input: { readonly gainDb: number; readonly shaper: Shaper | null }
  readonly line: { readonly baseMs: number; readonly interpolation: Interpolation }
  readonly sweep: {
    readonly shape: SweepShape
    readonly rateHz: number
    readonly law: SweepLaw
    readonly depthMs: number
    readonly depthOctaves: number
    readonly startPhase: number
    readonly stereoPhase: number
    readonly edgeMs: number
    readonly seed: number
    readonly points: readonly Point[]
    readonly updateEvery: number
    readonly between: Between
  }
  readonly voices: { readonly count: number; readonly phaseSpread: number; readonly spreadMs: number }
  readonly loop: {
    readonly feedback: number
    readonly delay: LoopDelay
    readonly interpolation: Interpolation
    readonly dampingHz: number | null
    readonly lowCutHz: number | null
    readonly crossFeed: number
    readonly shaper: Shaper | null
  }
  readonly mix: {
    readonly dry: number
    readonly wet: number
    readonly dryTap: DryTap
    readonly dryDelayMs: number
    readonly wetLowCutHz: number | null
    readonly wetHighCutHz: number | null
    readonly invertRight: boolean
    readonly outputGainDb: number
    readonly shaper: Shaper | null
  }
  readonly panel: readonly Knob[]
  /** A check's limit overridden, by check id. */
  readonly limits: Readonly<Record<string, number>>
  readonly target: {
    readonly part: string
    readonly numberFormat: NumberFormat
    readonly ramBytes: number
    readonly flashBytes: number
    readonly clockHz: number
    readonly cpuShare: number
    readonly blockSize: number
    readonly headroomDb: number
    readonly cyclesPerSample: number | null
  }
}
