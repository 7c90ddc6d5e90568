// What is lost when both outputs are summed to one: the power of (y₀ + y₁)/2 against the mean power of y₀ and y₁, for pink noise at every input (as much power
// in every octave, 20 Hz to 20 kHz), the sweep held where most is lost.
//
//   loss = 10 log10( Σ (|H₀|² + |H₁|²)/2 / Σ |H₀ + H₁|²/4 )        over frequencies of equal ratio
//
// Like outputs lose nothing, outputs that have nothing to do with each other 3 dB, opposite ones everything. Over the whole band and not at single
// frequencies: a comb has notches in its sum as in each output, and one that has them elsewhere has lost nothing. By octaves the same, to show where.
import type { ParameterSet } from '../set/types.ts'
import { freeze, frozenVoiceDelay } from './frozen.ts'
import { sweepStands } from './levelsSet.ts'
import { goldenMaximum, localMaxima } from './loopSearch.ts'
import { DB_LIMIT } from './response.ts'
import { transferAt, transferOf } from './transfer.ts'

export interface MonoOctave {
  /** From lowHz to twice that. */
  readonly lowHz: number
  readonly lossDb: number
}

export interface MonoLoss {
  /** Where most is lost; null where nothing comes out. −3 … 400 dB (400: nothing is left). */
  readonly lossDb: number | null
  /** Position of the cycle where it is. */
  readonly position: number
  /** Power averaged over the sweep as well; null where nothing comes out. */
  readonly averageDb: number | null
  readonly octaves: readonly MonoOctave[]
  /** Even steps of the cycle, and, with a channel turned over, places between them where both channels' delays come closest. */
  readonly positions: number
  readonly meetings: number
  readonly frequencies: number
}

const LOWEST_HZ = 20
const HIGHEST_HZ = 20000
const OCTAVES = 10
const PER_OCTAVE = 80
const POSITIONS = 8

/** Loss of the mono sum of a set with two outputs. RangeError for one. sampleRate in Hz. Milliseconds. */
export function monoLoss(set: ParameterSet, sampleRate = set.sampleRate): MonoLoss {
  if (set.layout === 'mono') throw new RangeError('layout must have two outputs, got mono')
  const stands = sweepStands(set)
  const even = stands ? [set.sweep.startPhase] : Array.from({ length: POSITIONS }, (_, i) => i / POSITIONS)
  const meetings = stands || !set.mix.invertRight ? [] : meetingPlaces(set, sampleRate)
  const places = [...even, ...meetings]
  const powers = places.map((position) => powersAt(set, position, sampleRate))
  const losses = powers.map((octaves) => ratioDb(total(octaves)))
  let worst = 0
  losses.forEach((loss, i) => {
    if ((loss ?? Number.NEGATIVE_INFINITY) > (losses[worst] ?? Number.NEGATIVE_INFINITY)) worst = i
  })
  return {
    lossDb: losses[worst] ?? null,
    position: places[worst] as number,
    averageDb: ratioDb(total(powers.slice(0, even.length).map(total))),
    octaves: (powers[worst] as Power[]).flatMap((power, i) => {
      const lossDb = ratioDb(power)
      return lossDb === null ? [] : [{ lowHz: LOWEST_HZ * 2 ** i, lossDb }]
    }),
    positions: even.length,
    meetings: meetings.length,
    frequencies: OCTAVES * PER_OCTAVE,
  }
}

/** Positions at which the delays of both channels are compared, and the closest of which the loss is worked out. */
const COMPARED = 256
const MOST_MEETINGS = 4

/** Where the delays of both channels, voice by voice, come closest: an instant, between even steps as a rule, at which a wet sound turned over cancels most. */
function meetingPlaces(set: ParameterSet, sampleRate: number): number[] {
  const delay = (position: number, channel: number, voice: number) => frozenVoiceDelay(set, position, { channel, voice }, sampleRate)
  const closeness = (position: number): number => {
    let apart = 0
    for (let v = 0; v < set.voices.count; v++) apart += Math.abs(delay(position, 0, v) - delay(position, 1, v))
    return -apart
  }
  const compared = Array.from({ length: COMPARED }, (_, i) => closeness(i / COMPARED))
  return localMaxima(compared)
    .slice(0, MOST_MEETINGS)
    .map((i) => goldenMaximum(closeness, (i - 1) / COMPARED, (i + 1) / COMPARED, 1e-15).at)
    .map((position) => position - Math.floor(position))
}

interface Power {
  /** Mean power of both outputs, and power of their half sum. */
  readonly outputs: number
  readonly sum: number
}

const total = (powers: readonly Power[]): Power => ({
  outputs: powers.reduce((all, power) => all + power.outputs, 0),
  sum: powers.reduce((all, power) => all + power.sum, 0),
})

/** Rounding of two opposite outputs, and of the place where they are, leaves no more than this of them. */
const NOTHING = 1e-20

function ratioDb({ outputs, sum }: Power): number | null {
  if (outputs === 0) return null
  return sum <= NOTHING * outputs ? DB_LIMIT : 10 * Math.log10(outputs / sum)
}

function powersAt(set: ParameterSet, position: number, sampleRate: number): Power[] {
  const transfer = transferOf(freeze(set, position, sampleRate))
  const out = new Float64Array(8)
  const top = Math.min(HIGHEST_HZ, sampleRate / 2)
  return Array.from({ length: OCTAVES }, (_, octave) => {
    let outputs = 0
    let sum = 0
    for (let i = 0; i < PER_OCTAVE; i++) {
      const hz = LOWEST_HZ * 2 ** (octave + (i + 0.5) / PER_OCTAVE)
      if (hz > top) break
      transferAt(transfer, (2 * Math.PI * hz) / sampleRate, out)
      const [aRe, aIm, bRe, bIm] = [out[0] as number, out[1] as number, out[4] as number, out[5] as number]
      outputs += (aRe * aRe + aIm * aIm + bRe * bRe + bIm * bIm) / 2
      sum += ((aRe + bRe) ** 2 + (aIm + bIm) ** 2) / 4
    }
    return { outputs, sum }
  })
}
