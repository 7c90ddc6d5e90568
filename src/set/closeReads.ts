// A set that reads closer to the write point than an interpolator can, or further back than a line may reach, is refused;
// what would mend it is worked out by solving for one field at a time and trying the answer.
import { CLOSE_TOLERANCE, type Corner, delayMs, delayRange, loopCorners, MAX_DELAY_MS, smallestDelay, voiceCorners } from './delayRange.ts'
import { withAt } from './path.ts'
import type { Problem } from './result.ts'
import type { Interpolation, ParameterSet } from './types.ts'

type Mend = NonNullable<Problem['mends']>[number]

/** Problems of the delays a set really reaches, at `sampleRate` in Hz. A loop without feedback reads nothing that is heard and is not judged. */
export function closeReads(set: ParameterSet, sampleRate: number): readonly Problem[] {
  const problems: Problem[] = []
  if (tooClose(set, 'voice', sampleRate)) problems.push(closeProblem(set, 'voice', sampleRate))
  if (tooClose(set, 'loop', sampleRate)) problems.push(closeProblem(set, 'loop', sampleRate))
  const longest = longestMs(set)
  if (longest > MAX_DELAY_MS) problems.push(longProblem(set, longest))
  return problems
}

function longestMs(set: ParameterSet): number {
  // At 1000 Hz a sample is a millisecond.
  const { voices, loop } = delayRange(set, 1000)
  return Math.max(voices.maxSamples, loop.maxSamples)
}

function tooClose(set: ParameterSet, where: 'voice' | 'loop', sampleRate: number): boolean {
  if (where === 'loop' && set.loop.feedback === 0) return false
  const range = delayRange(set, sampleRate)
  return where === 'voice'
    ? range.voices.minSamples < range.voiceLimitSamples - CLOSE_TOLERANCE
    : range.loop.minSamples < range.loopLimitSamples - CLOSE_TOLERANCE
}

function closeProblem(set: ParameterSet, where: 'voice' | 'loop', sampleRate: number): Problem {
  const range = delayRange(set, sampleRate)
  const limit = where === 'voice' ? range.voiceLimitSamples : range.loopLimitSamples
  const reached = where === 'voice' ? range.voices.minSamples : range.loop.minSamples
  const mends = findMends(set, where, sampleRate, limit)
  const base = mends.find((mend) => mend.path === 'line.baseMs')
  const reader = where === 'voice' ? `a voice's ${set.line.interpolation} read` : `the loop's ${set.loop.interpolation} read`
  const least = base ? `at least ${base.value} ms here` : undefined
  const samples = (n: number) => `${figure(n)} ${n === 1 ? 'sample' : 'samples'}`
  return {
    path: 'line.baseMs',
    message:
      `line.baseMs ${set.line.baseMs} ms lets ${reader} come to ${samples(reached)} (${figure((reached * 1000) / sampleRate)} ms), ` +
      `where it needs at least ${samples(limit)} (${figure((limit * 1000) / sampleRate)} ms at ${sampleRate} Hz)` +
      (base ? `: line.baseMs must be ${least}` : ''),
    value: set.line.baseMs,
    ...(least && { range: least }),
    ...(mends.length > 0 && { hint: mends.map((mend) => `set ${mend.path} to ${mend.value}`).join(', or '), mends }),
  }
}

function longProblem(set: ParameterSet, longest: number): Problem {
  const path = set.sweep.law === 'ratio' ? 'sweep.depthOctaves' : 'line.baseMs'
  const value = set.sweep.law === 'ratio' ? set.sweep.depthOctaves : set.line.baseMs
  return {
    path,
    message: `${path} ${value} makes the delay reach ${figure(longest)} ms, where a line holds at most ${MAX_DELAY_MS} ms`,
    value,
    range: `a largest delay of at most ${MAX_DELAY_MS} ms`,
    hint: 'lower the base delay or the depth',
  }
}

/** Single changes that lift the smallest delay to the limit, each tried before it is offered. */
function findMends(set: ParameterSet, where: 'voice' | 'loop', sampleRate: number, limit: number): Mend[] {
  const corners = where === 'voice' ? voiceCorners(set) : loopCorners(set)
  const limitMs = (limit * 1000) / sampleRate
  const candidates: (Mend | null)[] = [
    { path: 'line.baseMs', value: roundUp(baseFor(set, corners, limitMs)) },
    depthMend(set, corners, limitMs),
    where === 'voice' ? spreadMend(set, limitMs, corners) : null,
    interpolationMend(set, where),
  ]
  return candidates.filter((mend): mend is Mend => mend !== null && mendWorks(set, mend, where, sampleRate))
}

function mendWorks(set: ParameterSet, { path, value }: Mend, where: 'voice' | 'loop', sampleRate: number): boolean {
  if (typeof value === 'number' && value < 0) return false
  const mended = withAt(set, path, value)
  return !tooClose(mended, where, sampleRate) && longestMs(mended) <= MAX_DELAY_MS
}

function baseFor(set: ParameterSet, corners: readonly Corner[], limitMs: number): number {
  const { law, depthMs, depthOctaves } = set.sweep
  const needed = ({ offsetMs, sweep }: Corner) =>
    law === 'time' ? limitMs - offsetMs - depthMs * sweep : limitMs / 2 ** (depthOctaves * sweep) - offsetMs
  return corners.length === 0 ? limitMs : Math.max(...corners.map(needed))
}

function depthMend(set: ParameterSet, corners: readonly Corner[], limitMs: number): Mend | null {
  const falling = corners.filter((corner) => corner.sweep < 0)
  if (falling.length === 0) return null
  const { law } = set.sweep
  const room = ({ offsetMs, sweep }: Corner) => {
    const base = set.line.baseMs + offsetMs
    return (law === 'time' ? base - limitMs : base > 0 ? Math.log2(base / limitMs) : -1) / -sweep
  }
  const value = roundDown(Math.min(...falling.map(room)))
  return { path: law === 'time' ? 'sweep.depthMs' : 'sweep.depthOctaves', value }
}

/** Offsets scale with the spread, so the spread a corner can bear follows from the offset it can bear. */
function spreadMend(set: ParameterSet, limitMs: number, corners: readonly Corner[]): Mend | null {
  const early = corners.filter((corner) => corner.offsetMs < 0)
  if (early.length === 0 || set.voices.spreadMs === 0) return null
  const bearable = (corner: Corner) => {
    const atBase = delayMs(set, { ...corner, offsetMs: 0 })
    const perOffset = set.sweep.law === 'time' ? 1 : 2 ** (set.sweep.depthOctaves * corner.sweep)
    return ((atBase - limitMs) / perOffset / -corner.offsetMs) * set.voices.spreadMs
  }
  return { path: 'voices.spreadMs', value: roundDown(Math.min(...early.map(bearable))) }
}

/** Linear reads closest of those that interpolate. */
function interpolationMend(set: ParameterSet, where: 'voice' | 'loop'): Mend | null {
  const now: Interpolation = where === 'voice' ? set.line.interpolation : set.loop.interpolation
  if (smallestDelay(now, where) <= smallestDelay('linear', where)) return null
  return { path: where === 'voice' ? 'line.interpolation' : 'loop.interpolation', value: 'linear' }
}

const roundUp = (ms: number) => Math.ceil(ms * 1000 - 1e-9) / 1000
const roundDown = (ms: number) => Math.floor(ms * 1000 + 1e-9) / 1000

/** Four significant digits, without an exponent or trailing zeros. */
const figure = (value: number) => String(Number(value.toPrecision(4)))
