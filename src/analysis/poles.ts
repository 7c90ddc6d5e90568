// The poles of a frozen loop: how fast it dies away, and at which frequencies it rings.
import type { Frozen, FrozenLoop } from './frozen.ts'
import type { LoopLine } from './loopLine.ts'
import { type LoopPair, loopParts, pairDelay } from './loopPair.ts'
import type { Pole } from './polesNewton.ts'
import { allPolesOfLine, certifiedPole, distinctPoles, largestPoleOfLine } from './polesOneLine.ts'
import { allPolesOfPair, largestPoleOfPair } from './polesPair.ts'

export interface LargestPole {
  /** ln of the radius: compare this (or 1 − radius), not the radius, which is close to 1 for long lines. */
  readonly lnRadius: number
  readonly radius: number
  /** ln of a radius that no pole exceeds; above lnRadius only for crossed lines too long to be searched through. */
  readonly lnBound: number
  readonly bound: number
  /** Frequency of that pole; null where it was found by counting and not by its place. */
  readonly frequencyHz: number | null
}

export interface Resonance {
  readonly frequencyHz: number
  readonly radius: number
  readonly lnRadius: number
  /** Time in s to fall by 60 dB: ln 1000/(−ln r · fs); null when it does not fall. */
  readonly ringSeconds: number | null
}

/** 60 dB decay of a pole, s: ln 1000/(−ln r · fs); null for r ≥ 1. FACTS 1 (T60). */
export function ringSeconds(lnRadius: number, sampleRate: number): number | null {
  return lnRadius < 0 ? Math.log(1000) / (-lnRadius * sampleRate) : null
}

export interface PoleOptions {
  /** Gain the shaper is counted with: its small-signal slope unless given. */
  readonly slope?: number
  /** Prove that no pole lies outside the one found (one line: the winding of L around 1; crossed lines: a fuller search). */
  readonly certify?: boolean
  /** Only to choose among many loops one that is then looked at in full: on a coarser grid, nothing counted. */
  readonly quick?: boolean
}

/** Pole of largest radius of the frozen loop, exact for one line; null without a loop (gain 0). */
export function largestPole(frozen: Frozen, options: PoleOptions = {}): LargestPole | null {
  return largestPoleOfLoop(frozen.loop, frozen.sampleRate, options)
}

/** As largestPole, from the loop alone. sampleRate in Hz. */
export function largestPoleOfLoop(
  loop: FrozenLoop,
  sampleRate: number,
  { slope, certify = false, quick = false }: PoleOptions = {},
): LargestPole | null {
  const { lines, pair } = loopParts(loop, slope)
  const found = [...lines.map((line) => poleOf(line, certify, quick)), pair === null ? null : poleOfPair(pair, certify, quick)].filter(
    (p) => p !== null,
  )
  if (found.length === 0) return null
  const pole = found.reduce((a, b) => (b.x > a.x ? b : a))
  const lnBound = Math.max(...found.map((p) => p.bound))
  return {
    lnRadius: pole.x,
    radius: Math.exp(pole.x),
    lnBound,
    bound: Math.exp(lnBound),
    frequencyHz: Number.isNaN(pole.theta) ? null : (pole.theta * sampleRate) / (2 * Math.PI),
  }
}

interface Bounded extends Pole {
  readonly bound: number
}

function poleOf(line: LoopLine, certify: boolean, quick: boolean): Bounded | null {
  const pole = certify ? (certifiedPole(line)?.pole ?? null) : largestPoleOfLine(line, quick)
  return pole === null ? null : { ...pole, bound: pole.x }
}

function poleOfPair(pair: LoopPair, certify: boolean, quick: boolean): Bounded | null {
  const found = largestPoleOfPair(pair, certify ? { starts: 1200 } : { quick })
  return found === null ? null : { ...found.pole, bound: found.bound }
}

/** Branches looked through for the slowest: of one line, and of crossed lines, where each costs four Newton runs. */
const BRANCHES = 400
const PAIR_BRANCHES = 30
const HIGHEST_HZ = 20000

/**
 * The `count` slowest resonances of a frozen loop, slowest first, and how far up they were looked for, Hz: 20 kHz, or the first 400 (crossed lines: 30)
 * of them. sampleRate in Hz.
 */
export function slowestResonances(loop: FrozenLoop, sampleRate: number, count: number): { found: Resonance[]; upToHz: number } {
  const { lines, pair } = loopParts(loop)
  const delay = Math.max(1, ...loop.reads.map((read) => read.delaySamples))
  const upToHz = Math.min(
    HIGHEST_HZ,
    sampleRate / 2,
    ((pair ? PAIR_BRANCHES : BRANCHES) * sampleRate) / (delay * Math.max(1, lines.length)),
  )
  const found = resonancesOf({ lines, pair }, sampleRate, upToHz)
  return { found: found.sort((a, b) => b.lnRadius - a.lnRadius).slice(0, count), upToHz }
}

/** Every resonance up to maxHz (0 to fs/2), ascending in frequency. */
export function resonances(frozen: Frozen, maxHz: number): Resonance[] {
  if (!(maxHz >= 0 && maxHz <= frozen.sampleRate / 2))
    throw new RangeError(`maxHz must be in [0, ${frozen.sampleRate / 2}] Hz, got ${maxHz}`)
  return resonancesOf(loopParts(frozen.loop), frozen.sampleRate, maxHz)
}

function resonancesOf({ lines, pair }: ReturnType<typeof loopParts>, sampleRate: number, maxHz: number): Resonance[] {
  const maxTheta = (2 * Math.PI * maxHz) / sampleRate
  const poles = lines.flatMap((line) => allPolesOfLine(line, maxTheta))
  if (pair !== null) poles.push(...distinctPoles(allPolesOfPair(pair, maxTheta), pairDelay(pair)))
  return poles
    .filter((pole) => pole.theta <= maxTheta)
    .sort((a, b) => a.theta - b.theta)
    .map(({ x, theta }) => ({
      frequencyHz: (theta * sampleRate) / (2 * Math.PI),
      radius: Math.exp(x),
      lnRadius: x,
      ringSeconds: ringSeconds(x, sampleRate),
    }))
}
