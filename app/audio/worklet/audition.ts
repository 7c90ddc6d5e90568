// Everything the processor does, without the browser around it: source → engine → guard → meters → listening. The processor calls
// `receive` between quanta and `render` for each; both never throw, and render allocates nothing.
import {
  createEngine,
  type Engine,
  engineCounters,
  holdPosition,
  processEngine,
  resetEngine,
  retargetEngine,
  setBypass,
  setDelayChange,
  sweepPosition,
} from '../../../src/dsp/engine.ts'
import { MAX_DELAY_MS } from '../../../src/set/delayRange.ts'
import { FLAT_LENGTH, FLAT_PARAMETERS, flatIndex, flatten } from '../../../src/set/flat.ts'
import type { ParameterSet } from '../../../src/set/types.ts'
import { applyGuard, createGuard, forgetLatch, type Guard, guardRests, resumeGuard } from './guard.ts'
import {
  applyListening,
  createListening,
  isAtRest,
  type Listening,
  setEqualGain,
  setListeningLevel,
  setMuted,
  setPlaying,
} from './listening.ts'
import { createLiveLoudness, feedLiveLoudness, type LiveLoudness, resetLiveLoudness } from './liveLoudness.ts'
import { PIECE_FRAMES, REPORT, REPORT_LENGTH, REPORT_S, type Settings, type SourceMessage, type ToProcessor } from './messages.ts'
import { copyScope, createMeters, type Meters, meterInput, meterOutput } from './meters.ts'
import {
  createPlayer,
  INPUT,
  NOTHING,
  openInput,
  type Player,
  playSource,
  renderPlayer,
  SAMPLE,
  type SampleMemory,
  setRegion,
  setToneHz,
  TONE,
  usesMemory,
} from './player.ts'

const RATE_SLOT = flatIndex('sweep.rateHz')
const LAYOUT_SLOT = flatIndex('layout')
const layouts = FLAT_PARAMETERS[LAYOUT_SLOT]
const STEREO = layouts?.kind === 'choice' ? layouts.options.findIndex(({ value }) => value === 'stereo') : -1

export interface Audition {
  readonly sampleRate: number
  readonly engine: Engine
  readonly player: Player
  readonly guard: Guard
  readonly meters: Meters
  readonly listening: Listening
  readonly liveLoudness: LiveLoudness
  /** The newest set, taken at the start of the next quantum. */
  readonly flat: Float64Array
  hasNewFlat: boolean
  settings: Settings
  /** Memories that may still be read; those that are not come back through `takeUnused`. */
  memories: SampleMemory[]
  readonly input: readonly [Float64Array, Float64Array]
  readonly output: readonly [Float64Array, Float64Array]
  /** What bypass would sound like, for live equal loudness. */
  readonly dry: readonly [Float64Array, Float64Array]
  readonly report: Float64Array
  readonly reportFrames: number
  sinceReport: number
  wasRunning: boolean
}

/** All memory of the processor for `sampleRate` Hz: two engines' lines of MAX_DELAY_MS, pieces of PIECE_FRAMES. */
export function createAudition(set: ParameterSet, sampleRate: number, settings: Settings): Audition {
  const audition: Audition = {
    sampleRate,
    engine: createEngine(set, { sampleRate, maxDelayMs: MAX_DELAY_MS }),
    player: createPlayer(sampleRate, PIECE_FRAMES),
    guard: createGuard(sampleRate, PIECE_FRAMES),
    meters: createMeters(),
    listening: createListening(sampleRate, PIECE_FRAMES),
    liveLoudness: createLiveLoudness(sampleRate),
    flat: flatten(set),
    hasNewFlat: false,
    settings,
    memories: [],
    input: [new Float64Array(PIECE_FRAMES), new Float64Array(PIECE_FRAMES)],
    output: [new Float64Array(PIECE_FRAMES), new Float64Array(PIECE_FRAMES)],
    dry: [new Float64Array(PIECE_FRAMES), new Float64Array(PIECE_FRAMES)],
    report: new Float64Array(REPORT_LENGTH),
    reportFrames: Math.round(REPORT_S * sampleRate),
    sinceReport: 0,
    wasRunning: false,
  }
  takeSettings(audition, settings, true)
  return audition
}

/** Takes one message of the page. What says nothing understandable is left alone. */
export function receive(audition: Audition, message: ToProcessor): void {
  switch (message.type) {
    case 'set':
      if (message.flat.length !== FLAT_LENGTH) return
      audition.flat.set(message.flat)
      audition.hasNewFlat = true
      return
    case 'settings':
      takeSettings(audition, message.settings, false)
      return
    case 'source':
      takeSource(audition, message.source)
      return
    case 'region':
      if (audition.player.now.memory?.id === message.id) setRegion(audition.player, message.start, message.end)
      return
    case 'resume':
      if (resumeGuard(audition.guard)) resetEngine(audition.engine)
      return
  }
}

/** Sample memory that is no longer read, taken out of the list; null when there is none. */
export function takeUnused(audition: Audition): SampleMemory | null {
  for (let i = 0; i < audition.memories.length; i++) {
    const memory = audition.memories[i] as SampleMemory
    if (usesMemory(audition.player, memory)) continue
    audition.memories.splice(i, 1)
    return memory
  }
  return null
}

/**
 * One quantum of any size: `input` the node's input channels (none: silence), `output` its output channels, `frame` the context frame it
 * begins at. True when a report is due and stands in `audition.report`.
 */
export function render(audition: Audition, input: readonly Float32Array[], output: readonly Float32Array[], frame: number): boolean {
  const frames = output[0] === undefined ? 0 : output[0].length
  if (audition.hasNewFlat) {
    audition.hasNewFlat = false
    retargetEngine(audition.engine, audition.flat)
    forgetLatch(audition.guard)
  }
  const runs = !isAtRest(audition.listening)
  for (let at = 0; at < frames; at += PIECE_FRAMES) {
    const count = Math.min(PIECE_FRAMES, frames - at)
    if (runs) renderPiece(audition, input, output, at, count)
    else for (let c = 0; c < output.length; c++) (output[c] as Float32Array).fill(0, at, at + count)
  }
  audition.sinceReport += frames
  const due = runs ? audition.sinceReport >= audition.reportFrames : audition.wasRunning
  if (due) writeReport(audition, frame + frames, runs)
  audition.wasRunning = runs
  return due
}

function renderPiece(audition: Audition, input: readonly Float32Array[], output: readonly Float32Array[], at: number, count: number): void {
  const { engine, player, guard, meters, listening } = audition
  const inLeft = audition.input[0]
  const inRight = audition.input[1]
  const outLeft = audition.output[0]
  const outRight = audition.output[1]
  renderPlayer(player, inLeft, inRight, input, at, count)
  meterInput(meters, inLeft, inRight, count)
  if (guardRests(guard, count)) {
    outLeft.fill(0, 0, count)
    outRight.fill(0, 0, count)
  } else {
    processEngine(engine, audition.input, audition.output, count)
    if (audition.settings.equalLive) measureLive(audition, count)
    if (applyGuard(guard, outLeft, outRight, count)) resetEngine(engine)
  }
  meterOutput(meters, outLeft, outRight, count)
  applyListening(listening, outLeft, outRight, output, at, count)
}

/** Equal loudness of live input, against what bypass would sound like: one line hears the average of both inputs. */
function measureLive(audition: Audition, count: number): void {
  const { input, dry, output, flat, liveLoudness } = audition
  const isStereo = flat[LAYOUT_SLOT] === STEREO
  for (let i = 0; i < count; i++) {
    const left = input[0][i] as number
    const right = input[1][i] as number
    dry[0][i] = isStereo ? left : (left + right) / 2
    dry[1][i] = isStereo ? right : (left + right) / 2
  }
  if (feedLiveLoudness(liveLoudness, dry, output, count)) setEqualGain(audition.listening, liveLoudness.gainDb, false)
}

function takeSettings(audition: Audition, settings: Settings, first: boolean): void {
  const { engine, player, listening, liveLoudness } = audition
  const before = audition.settings
  audition.settings = settings
  const bypassChanged = first || settings.bypass !== before.bypass
  if (bypassChanged) setBypass(engine, settings.bypass)
  if (first || settings.delayChange !== before.delayChange) setDelayChange(engine, settings.delayChange)
  if (first || settings.held !== before.held) holdPosition(engine, settings.held)
  if (settings.equalLive && !before.equalLive) resetLiveLoudness(liveLoudness)
  setEqualGain(listening, settings.equalLive ? liveLoudness.gainDb : settings.equalDb, bypassChanged)
  setToneHz(player, settings.toneHz)
  openInput(player, settings.inputOpen)
  setListeningLevel(listening, settings.level)
  setMuted(listening, settings.muted)
  setPlaying(listening, settings.playing)
}

const KINDS = { tone: TONE, input: INPUT, nothing: NOTHING } as const

function takeSource(audition: Audition, source: SourceMessage): void {
  const { player } = audition
  if (source.type !== 'sample') {
    playSource(player, KINDS[source.type], null, 0, 0)
    return
  }
  const [first] = source.channels
  if (first === undefined) return
  const memory: SampleMemory = { id: source.id, channels: source.channels, frames: first.length, circular: source.circular }
  audition.memories.push(memory)
  playSource(player, SAMPLE, memory, source.start, source.end)
}

function writeReport(audition: Audition, frame: number, runs: boolean): void {
  const { report, meters, guard, engine, player, settings, flat, listening } = audition
  audition.sinceReport = 0
  report[REPORT.frame] = frame
  report[REPORT.position] = sweepPosition(engine)
  report[REPORT.positionStep] = settings.held === null && runs ? (flat[RATE_SLOT] as number) / audition.sampleRate : 0
  for (let i = 0; i < 4; i++) report[REPORT.peaks + i] = meters.peaks[i] as number
  meters.peaks.fill(0)
  report[REPORT.overs] = meters.overs
  report[REPORT.heldDelays] = engineCounters(engine).heldDelays
  report[REPORT.guardState] = guard.state
  report[REPORT.guardReason] = guard.reason
  report[REPORT.guardLatched] = guard.latched ? 1 : 0
  report[REPORT.guardTrips] = guard.trips
  report[REPORT.guardPeak] = guard.peak
  report[REPORT.playFrame] = player.now.kind === SAMPLE ? Math.max(player.now.frame, player.start) : -1
  report[REPORT.equalDb] = 20 * Math.log10(listening.equal.value)
  report[REPORT.running] = runs ? 1 : 0
  report[REPORT.count] = (report[REPORT.count] as number) + 1
  copyScope(meters, report, REPORT.scope)
}
