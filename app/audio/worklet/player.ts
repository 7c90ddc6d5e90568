// Plays what the effect is fed with: sample memory with an exact repeat region, a tone, the node's input, or nothing.
//
// Two heads: the one that plays and the one it takes over from, cross-faded in a straight line. Every jump (end of the region, a new
// region, a new source) is such a take-over, so none clicks. At the end of the region the new head starts `join` frames before the
// region's start and meets the old one at its end: the period is exactly end − start, and material that fits together is left untouched.
import { DEFAULT_TONE } from '../../../src/material/tone.ts'
import { createRamp, multiplyByRamp, type Ramp, rampTo } from './ramp.ts'

/** What a head plays. */
export const NOTHING = 0
export const SAMPLE = 1
export const TONE = 2
export const INPUT = 3

export interface SampleMemory {
  readonly id: number
  /** One or two channels of equal length, full scale ±1. */
  readonly channels: readonly Float32Array[]
  readonly frames: number
  /** What sounds at the end flows into the beginning (the phrases): the seam of the whole needs no join. */
  readonly circular: boolean
}

interface Head {
  kind: number
  memory: SampleMemory | null
  /** Next frame; negative in a join at the very start, where silence is read, or the end of circular memory. */
  frame: number
}

export interface Player {
  readonly sampleRate: number
  readonly now: Head
  readonly old: Head
  /** Frames left of the take-over; 0 while one head plays. */
  fadeLeft: number
  fadeLength: number
  /** Repeat region of the memory playing, frames; end is the first frame not played. */
  start: number
  end: number
  /** Frames of a join: 5 ms, at most half the region, so that a very short one still repeats. */
  join: number
  /** Cycle of the tone, 0 to 1, and its step a frame. */
  tonePhase: number
  toneStep: number
  /** Opens and closes the node's input: closed until the listener wears headphones, and when the device goes. */
  readonly inputGate: Ramp
  readonly gates: Float64Array
  readonly gains: Float64Array
}

const JOIN_S = 0.005
const SOURCE_FADE_S = 0.02
const GATE_S = 0.05
const TONE_PEAK = 10 ** (DEFAULT_TONE.levelDb / 20)

export function createPlayer(sampleRate: number, maxFrames: number): Player {
  return {
    sampleRate,
    now: { kind: NOTHING, memory: null, frame: 0 },
    old: { kind: NOTHING, memory: null, frame: 0 },
    fadeLeft: 0,
    fadeLength: 1,
    start: 0,
    end: 0,
    join: 1,
    tonePhase: 0.5,
    toneStep: 0.5 / sampleRate,
    inputGate: createRamp(0),
    gates: new Float64Array(maxFrames),
    gains: new Float64Array(maxFrames),
  }
}

/** Takes over with another source: SAMPLE with its memory, TONE, INPUT or NOTHING. Starts at the region's start. */
export function playSource(player: Player, kind: number, memory: SampleMemory | null, startFrame: number, endFrame: number): void {
  takeOver(player, seconds(player, SOURCE_FADE_S))
  player.now.kind = kind
  player.now.memory = memory
  setBounds(player, startFrame, endFrame)
  player.now.frame = player.start
}

/** Moves the repeat region; the head jumps to its start when it stands outside. */
export function setRegion(player: Player, startFrame: number, endFrame: number): void {
  setBounds(player, startFrame, endFrame)
  const { now } = player
  if (now.kind !== SAMPLE) return
  if (now.frame >= player.start - player.join && now.frame < player.end) return
  takeOver(player, player.join)
  now.frame = player.start
}

/** 0 to half the sample rate, Hz. */
export function setToneHz(player: Player, hz: number): void {
  player.toneStep = Math.min(Math.max(hz, 0), player.sampleRate / 2) / player.sampleRate
}

export function openInput(player: Player, open: boolean): void {
  rampTo(player.inputGate, open ? 1 : 0, seconds(player, GATE_S))
}

/** True while the memory may still be read. */
export function usesMemory(player: Player, memory: SampleMemory): boolean {
  return player.now.memory === memory || (player.fadeLeft > 0 && player.old.memory === memory)
}

/**
 * Writes `frames` frames of the source into left and right (one channel goes to both). `input` is the node's input, its channels of a whole
 * quantum read from `offset`; none means silence. Never throws, allocates nothing.
 */
export function renderPlayer(
  player: Player,
  left: Float64Array,
  right: Float64Array,
  input: readonly Float32Array[],
  offset: number,
  frames: number,
): void {
  const { now, old, gains, gates } = player
  if (playsPlainly(player, frames)) {
    copySample(now, left, right, frames)
    return
  }
  left.fill(0, 0, frames)
  right.fill(0, 0, frames)
  gates.fill(1, 0, frames)
  // The gate moves on whether the input is heard or not.
  multiplyByRamp(player.inputGate, gates, frames)
  let from = 0
  while (from < frames) {
    if (joinIsDue(player)) {
      takeOver(player, player.join)
      now.frame = player.start - player.join
    }
    const count = runLength(player, frames - from)
    const fading = player.fadeLeft > 0
    if (fading) {
      for (let i = 0; i < count; i++) gains[i] = (player.fadeLeft - i) / player.fadeLength
      addHead(player, old, left, right, input, from, offset, count)
    }
    for (let i = 0; i < count; i++) gains[i] = fading ? 1 - (player.fadeLeft - i) / player.fadeLength : 1
    addHead(player, now, left, right, input, from, offset, count)
    if (now.kind === TONE || old.kind === TONE) advanceTone(player, count)
    if (fading) {
      player.fadeLeft -= count
      if (player.fadeLeft === 0) {
        old.kind = NOTHING
        old.memory = null
      }
    }
    from += count
  }
}

function setBounds(player: Player, startFrame: number, endFrame: number): void {
  const length = player.now.memory === null ? 0 : player.now.memory.frames
  const end = Math.min(Math.max(Math.round(endFrame) || 0, 0), length)
  const start = Math.min(Math.max(Math.round(startFrame) || 0, 0), end)
  player.start = start
  player.end = Math.max(end, start + 1)
  player.join = Math.max(1, Math.min(seconds(player, JOIN_S), (player.end - player.start) >> 1))
}

const seconds = (player: Player, s: number) => Math.max(1, Math.round(s * player.sampleRate))

function joinIsDue(player: Player): boolean {
  return player.now.kind === SAMPLE && player.now.frame >= player.end - player.join
}

/** One head, no event within `frames`, and no gate that must move on. */
function playsPlainly(player: Player, frames: number): boolean {
  if (player.now.kind !== SAMPLE || player.fadeLeft > 0 || player.inputGate.left > 0) return false
  return player.now.frame + frames <= player.end - player.join
}

/** The playing head becomes the old one; whatever was still fading before it is dropped. */
function takeOver(player: Player, fade: number): void {
  const { now, old } = player
  old.kind = now.kind
  old.memory = now.memory
  old.frame = now.frame
  player.fadeLeft = fade
  player.fadeLength = fade
}

/** Frames until the next event: end of the fade, start of the next join. */
function runLength(player: Player, most: number): number {
  let count = most
  if (player.fadeLeft > 0 && player.fadeLeft < count) count = player.fadeLeft
  if (player.now.kind === SAMPLE) {
    const untilJoin = player.end - player.join - player.now.frame
    if (untilJoin < count) count = untilJoin
  }
  return Math.max(1, count)
}

function addHead(
  player: Player,
  head: Head,
  left: Float64Array,
  right: Float64Array,
  input: readonly Float32Array[],
  at: number,
  offset: number,
  count: number,
): void {
  if (head.kind === SAMPLE) addSample(player.gains, head, left, right, at, count)
  else if (head.kind === TONE) addTone(player, left, right, at, count)
  else if (head.kind === INPUT) addInput(player, left, right, input, at, offset, count)
}

function addSample(gains: Float64Array, head: Head, left: Float64Array, right: Float64Array, at: number, count: number): void {
  const { memory } = head
  if (memory !== null) {
    const first = memory.channels[0] as Float32Array
    const second = (memory.channels[1] ?? first) as Float32Array
    for (let i = 0; i < count; i++) {
      let frame = head.frame + i
      if (frame < 0 && memory.circular) frame += memory.frames
      if (frame < 0 || frame >= memory.frames) continue
      const gain = gains[i] as number
      left[at + i] = (left[at + i] as number) + gain * (first[frame] as number)
      right[at + i] = (right[at + i] as number) + gain * (second[frame] as number)
    }
  }
  head.frame += count
}

/** The same where one head plays alone and no event is near: the usual piece. */
function copySample(head: Head, left: Float64Array, right: Float64Array, frames: number): void {
  const { memory } = head
  if (memory === null || head.frame < 0 || head.frame + frames > memory.frames) {
    left.fill(0, 0, frames)
    right.fill(0, 0, frames)
  } else {
    const first = memory.channels[0] as Float32Array
    const second = (memory.channels[1] ?? first) as Float32Array
    for (let i = 0; i < frames; i++) {
      left[i] = first[head.frame + i] as number
      right[i] = second[head.frame + i] as number
    }
  }
  head.frame += frames
}

function addTone(player: Player, left: Float64Array, right: Float64Array, at: number, count: number): void {
  let phase = player.tonePhase
  for (let i = 0; i < count; i++) {
    const x = TONE_PEAK * (player.gains[i] as number) * Math.sin(2 * Math.PI * phase)
    left[at + i] = (left[at + i] as number) + x
    right[at + i] = (right[at + i] as number) + x
    phase += player.toneStep
    if (phase >= 1) phase -= 1
  }
}

function advanceTone(player: Player, count: number): void {
  const phase = player.tonePhase + count * player.toneStep
  player.tonePhase = phase - Math.floor(phase)
}

function addInput(
  player: Player,
  left: Float64Array,
  right: Float64Array,
  input: readonly Float32Array[],
  at: number,
  offset: number,
  count: number,
): void {
  const first = input[0]
  if (first === undefined || first.length === 0) return
  const second = input[1] ?? first
  for (let i = 0; i < count; i++) {
    const gain = (player.gains[i] as number) * (player.gates[at + i] as number)
    left[at + i] = (left[at + i] as number) + gain * (first[offset + at + i] as number)
    right[at + i] = (right[at + i] as number) + gain * (second[offset + at + i] as number)
  }
}
