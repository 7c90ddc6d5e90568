// The core's own copy of a set, decoded from the flat form: what the passes ask for, with everything derived that does not change
// from sample to sample. Written in place, so that a live edit allocates nothing.
import { smallestDelay, voiceOffsetMs } from '../set/delayRange.ts'
import { flatIndex, flatPointsOffset } from '../set/flat.ts'
import { sweepEdge } from '../set/sweepShape.ts'
import type { Curve, Interpolation, Layout, ParameterSet, SweepLaw, SweepShape } from '../set/types.ts'
import { choicesOf } from './flatRules.ts'
import { createPointStore, type PointStore, takePoints } from './points.ts'
import { MAX_VOICES } from './runs.ts'
import type { EngineShaper } from './shaperPass.ts'
import { createSineTables, type SineTables, takeSine } from './sine.ts'

type Mutable<T> = { -readonly [K in keyof T]: T[K] }

export interface Settings {
  readonly fs: number
  /** Largest delay the line can give, samples. */
  readonly longest: number
  lines: 1 | 2
  outputs: 1 | 2
  voiceRead: Interpolation
  loopRead: Interpolation
  /** Smallest delay of voices and loop, samples. */
  voiceLeast: number
  loopLeast: number
  /** Samples by which the loop is read sooner because its shaper delays by them: ½ with adaa1. */
  loopLess: number
  readonly sweep: Mutable<ParameterSet['sweep']>
  /** Edge of squares and ramps, cycles. */
  edge: number
  baseMs: number
  readonly voices: Mutable<ParameterSet['voices']>
  /** Base and spread offset of each voice, ms. */
  readonly centreMs: Float64Array
  /** Phase of each voice against voice 0, and of each channel against channel 0, cycles. */
  readonly voicePhase: Float64Array
  readonly channelPhase: Float64Array
  /** Whether the sweep is one that sine.ts evaluates; its tables, one slot a read. */
  plainSine: boolean
  readonly sineTables: SineTables
  /** V^(−1/2). */
  voiceScale: number
  loopMoves: boolean
  dryFromLine: boolean
  /** Whole samples, rounded half up, at most `longest`. */
  dryDelay: number
  /** Input, loop, output. */
  readonly shapers: readonly EngineShaper[]
  readonly sweepStore: PointStore
  readonly shaperStores: readonly PointStore[]
}

export const SHAPER_PATHS = ['input.shaper', 'loop.shaper', 'mix.shaper'] as const
/** Which of `shapers` stands where. */
export const INPUT = 0
export const LOOP = 1
export const OUTPUT = 2

export function createSettings(fs: number, longest: number): Settings {
  const shaperStores = SHAPER_PATHS.map(createPointStore)
  const sweepStore = createPointStore()
  return {
    fs,
    longest,
    lines: 1,
    outputs: 1,
    voiceRead: 'linear',
    loopRead: 'linear',
    voiceLeast: 0.5,
    loopLeast: 0.5,
    loopLess: 0.5,
    // Halves keep these fields in double representation, so that writing them later stays in place.
    sweep: {
      shape: 'sine',
      rateHz: 0.5,
      law: 'time',
      depthMs: 0.5,
      depthOctaves: 0.5,
      startPhase: 0.5,
      stereoPhase: 0.5,
      edgeMs: 0.5,
      seed: 0.5,
      points: sweepStore.views[0]!,
      updateEvery: 1,
      between: 'ramp',
    },
    edge: 0.5,
    baseMs: 0.5,
    voices: { count: 1, phaseSpread: 0.5, spreadMs: 0.5 },
    centreMs: new Float64Array(MAX_VOICES),
    voicePhase: new Float64Array(MAX_VOICES),
    channelPhase: new Float64Array(2),
    plainSine: false,
    sineTables: createSineTables(),
    voiceScale: 0.5,
    loopMoves: true,
    dryFromLine: false,
    dryDelay: 0,
    shapers: shaperStores.map(
      ({ views }): EngineShaper => ({
        on: false,
        mean: false,
        curve: 'hardClip',
        drive: 0.5,
        ceiling: 0.5,
        positive: 0.5,
        negative: 0.5,
        deadZone: 0.5,
        points: views[0]!,
      }),
    ),
    sweepStore,
    shaperStores,
  }
}

const LAYOUTS = choicesOf('layout') as readonly Layout[]
const INTERPOLATIONS = choicesOf('line.interpolation') as readonly Interpolation[]
const SHAPES = choicesOf('sweep.shape') as readonly SweepShape[]
const LAWS = choicesOf('sweep.law') as readonly SweepLaw[]
const BETWEEN = choicesOf('sweep.between') as readonly ('ramp' | 'hold')[]
const CURVES = choicesOf('loop.shaper.curve') as readonly Curve[]
const FIXED = choicesOf('loop.delay').indexOf('fixed')
const FROM_LINE = choicesOf('mix.dryTap').indexOf('line')
const MEAN = choicesOf('loop.shaper.antialias').indexOf('adaa1')

const AT = {
  layout: flatIndex('layout'),
  voiceRead: flatIndex('line.interpolation'),
  loopRead: flatIndex('loop.interpolation'),
  voices: flatIndex('voices.count'),
  dryTap: flatIndex('mix.dryTap'),
  dryDelay: flatIndex('mix.dryDelayMs'),
  base: flatIndex('line.baseMs'),
  shape: flatIndex('sweep.shape'),
  rate: flatIndex('sweep.rateHz'),
  law: flatIndex('sweep.law'),
  depthMs: flatIndex('sweep.depthMs'),
  depthOctaves: flatIndex('sweep.depthOctaves'),
  startPhase: flatIndex('sweep.startPhase'),
  stereoPhase: flatIndex('sweep.stereoPhase'),
  edge: flatIndex('sweep.edgeMs'),
  seed: flatIndex('sweep.seed'),
  updateEvery: flatIndex('sweep.updateEvery'),
  between: flatIndex('sweep.between'),
  phaseSpread: flatIndex('voices.phaseSpread'),
  spreadMs: flatIndex('voices.spreadMs'),
  loopDelay: flatIndex('loop.delay'),
} as const
const CURVE_AT = SHAPER_PATHS.map((path) => flatIndex(`${path}.curve`))
const ANTIALIAS_AT = SHAPER_PATHS.map((path) => flatIndex(`${path}.antialias`))
const POINTS_AT = SHAPER_PATHS.map(flatPointsOffset)
const SWEEP_POINTS_AT = flatPointsOffset('sweep')

/** Takes what only a cross-fade can change. */
export function takeStructure(s: Settings, flat: Float64Array): void {
  const layout = LAYOUTS[flat[AT.layout]!]!
  s.lines = layout === 'stereo' ? 2 : 1
  s.outputs = layout === 'mono' ? 1 : 2
  s.voiceRead = INTERPOLATIONS[flat[AT.voiceRead]!]!
  s.loopRead = INTERPOLATIONS[flat[AT.loopRead]!]!
  s.voiceLeast = smallestDelay(s.voiceRead, 'voice')
  s.loopLeast = smallestDelay(s.loopRead, 'loop')
  s.voices.count = flat[AT.voices]! | 0
  s.voiceScale = 1 / Math.sqrt(s.voices.count)
  s.dryFromLine = flat[AT.dryTap] === FROM_LINE
  s.dryDelay = Math.min(Math.floor((flat[AT.dryDelay]! * s.fs) / 1000 + 0.5), Math.floor(s.longest)) | 0
  for (let i = 0; i < s.shapers.length; i++) {
    const shaper = s.shapers[i]!
    const curve = flat[CURVE_AT[i]!]!
    shaper.on = curve >= 0
    if (shaper.on) shaper.curve = CURVES[curve]!
    shaper.mean = shaper.on && flat[ANTIALIAS_AT[i]!] === MEAN
    shaper.points = takePoints(s.shaperStores[i]!, flat, POINTS_AT[i]!)
  }
  s.loopLess = s.shapers[LOOP]!.mean ? 0.5 : 0
  takeDelays(s, flat)
}

/** Takes what decides the delays, for as many voices as takeStructure last took. */
export function takeDelays(s: Settings, flat: Float64Array): void {
  const { sweep } = s
  s.baseMs = flat[AT.base]!
  sweep.shape = SHAPES[flat[AT.shape]!]!
  sweep.rateHz = flat[AT.rate]!
  sweep.law = LAWS[flat[AT.law]!]!
  sweep.depthMs = flat[AT.depthMs]!
  sweep.depthOctaves = flat[AT.depthOctaves]!
  sweep.startPhase = flat[AT.startPhase]!
  sweep.stereoPhase = flat[AT.stereoPhase]!
  sweep.edgeMs = flat[AT.edge]!
  sweep.seed = flat[AT.seed]!
  sweep.updateEvery = flat[AT.updateEvery]! | 0
  sweep.between = BETWEEN[flat[AT.between]!]!
  sweep.points = takePoints(s.sweepStore, flat, SWEEP_POINTS_AT)
  s.edge = sweepEdge(sweep)
  s.loopMoves = flat[AT.loopDelay] !== FIXED
  const { voices } = s
  voices.phaseSpread = flat[AT.phaseSpread]!
  voices.spreadMs = flat[AT.spreadMs]!
  for (let v = 0; v < voices.count; v++) {
    s.voicePhase[v] = (v * voices.phaseSpread) / (360 * voices.count)
    s.centreMs[v] = s.baseMs + voiceOffsetMs(voices, v)
  }
  for (let c = 0; c < 2; c++) s.channelPhase[c] = (c * sweep.stereoPhase) / 360
  s.plainSine = takeSine(s)
}
