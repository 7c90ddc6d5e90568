// The other way round: base and depth that put the first notch (or peak) where the brief wants it at both ends of the sweep.
// Newton on the logarithms of the two end delays, measured from the dry delay, against the exact response: an ideal comb has
// f = c/|τ − dry delay| and is solved in one step; filters, interpolators, further voices and a fixed loop take a few.
import { delayRange } from '../set/delayRange.ts'
import { parameter } from '../set/parameters.ts'
import { bad, good, type Problem, type Result } from '../set/result.ts'
import type { ParameterSet } from '../set/types.ts'
import { setProblems } from '../set/validity.ts'
import type { ExtremeKind } from './extremes.ts'
import { firstExtreme, type SweepEnds, sweepEnds } from './firstExtreme.ts'

export interface SolvedSweep {
  readonly baseMs: number
  /** depthMs with law `time`, depthOctaves with law `ratio`. */
  readonly depth: number
}

/** Largest error of a solution, Hz, and where the search stops trying to do better. */
const ACCEPTED_HZ = 0.05
const CLOSE_HZ = 1e-4
const STEPS = 16
/** Steps without progress before a start is given up. */
const IDLE = 5
/** Largest step, in the logarithm of a delay. */
const STRIDE = 0.7
const DIFFERENCE = 1e-5

interface Question {
  readonly set: ParameterSet
  readonly kind: ExtremeKind
  readonly targets: readonly [number, number]
  readonly sampleRate: number
  readonly ends: SweepEnds
  /** Sweep stands: one delay, one target. */
  readonly stands: boolean
  readonly dryDelayMs: number
  /** Which side of the dry delay each end stands on: through-zero sweeps have one on each. */
  readonly sides: readonly [number, number]
}

/** ln |τ − dry delay| of the longest and shortest delay, ms. */
type Point = readonly [number, number]

/**
 * Base and depth (ms, or octaves with law `ratio`) with which the first `kind` stands at lowHz where the delay is largest and at
 * highHz where it is smallest, both within 0.05 Hz, everything else as in `set`; or why there is none, with what can be reached. Each end stays
 * on the side of the dry delay where it is. At rate 0 the delay stands: both frequencies must be equal, and depth stays.
 */
export function solveFirstExtremes(
  set: ParameterSet,
  kind: ExtremeKind,
  lowHz: number,
  highHz: number,
  sampleRate = set.sampleRate,
): Result<SolvedSweep> {
  const question = ask(set, kind, [lowHz, highHz], sampleRate)
  for (const hz of [lowHz, highHz])
    if (!(hz > 0 && hz < sampleRate / 2))
      return no(question, `a first ${kind} must stand above 0 and below ${sampleRate / 2} Hz, got ${hz}`)
  if (question.stands && lowHz !== highHz)
    return no(question, `the sweep stands still, so its first ${kind} cannot stand at both ${figure(lowHz)} and ${figure(highHz)} Hz`)
  if (lowHz > highHz && question.sides[0] === question.sides[1])
    return no(question, `the first ${kind} is lowest where the delay is largest: ${figure(lowHz)} Hz cannot be above ${figure(highHz)} Hz`)
  const best = search(question)
  if (best === null)
    return no(question, `there is no first ${kind} with these gains and filters`, 'a notch or peak needs dry with wet, or feedback')
  if (Math.max(...best.errors) > ACCEPTED_HZ) return no(question, missed(question, best))
  return judged(question, best)
}

function ask(set: ParameterSet, kind: ExtremeKind, targets: readonly [number, number], sampleRate: number): Question {
  const ends = sweepEnds(set)
  const dryDelayMs = set.mix.dry === 0 ? 0 : (Math.floor((set.mix.dryDelayMs * sampleRate) / 1000 + 0.5) / sampleRate) * 1000
  const side = (s: number) => (delayAt(set, s) < dryDelayMs ? -1 : 1)
  const stands = ends.longest.s - ends.shortest.s < 1e-9
  return { set, kind, targets, sampleRate, ends, stands, dryDelayMs, sides: [side(ends.longest.s), side(ends.shortest.s)] }
}

const delayAt = ({ sweep, line }: ParameterSet, s: number) =>
  sweep.law === 'time' ? line.baseMs + sweep.depthMs * s : line.baseMs * 2 ** (sweep.depthOctaves * s)

interface Attempt {
  readonly point: Point
  readonly foundHz: readonly [number, number]
  readonly errors: readonly [number, number]
}

function search(question: Question): Attempt | null {
  let best: Attempt | null = null
  // What a tooth is worth depends on gains and signs: the first guess that has both extremes will do.
  for (const teeth of [0.5, 1, 2, 0.25]) {
    const [low, high] = question.targets
    const found = improve(question, [Math.log((1000 * teeth) / low), Math.log((1000 * teeth) / high)])
    if (found && (best === null || worst(found) < worst(best))) best = found
    if (best && worst(best) <= CLOSE_HZ) break
  }
  return best
}

const worst = (attempt: Attempt) => Math.max(...attempt.errors)

function improve(question: Question, start: Point): Attempt | null {
  let at = attempt(question, start)
  let best = at
  let idle = 0
  for (let step = 0; at && step < STEPS && idle < IDLE; step++) {
    if (best === null || worst(at) < 0.7 * worst(best)) idle = 0
    else idle++
    if (best === null || worst(at) < worst(best)) best = at
    if (worst(best) <= CLOSE_HZ) break
    const move = step < 2 ? ratios(question, at) : newton(question, at)
    let next: Attempt | null = null
    for (let part = 1; next === null && part > 0.01; part /= 2)
      next = attempt(question, [at.point[0] + part * limited(move[0]), at.point[1] + part * limited(move[1])])
    at = next
  }
  return best
}

const limited = (step: number) => (Number.isFinite(step) ? Math.max(-STRIDE, Math.min(STRIDE, step)) : 0)

/** ln(found/target) at both ends: the step of an ideal comb. */
function ratios({ targets, stands }: Question, { foundHz }: Attempt): Point {
  return [Math.log(foundHz[0] / targets[0]), stands ? 0 : Math.log(foundHz[1] / targets[1])]
}

function newton(question: Question, at: Attempt): Point {
  const residual = ratios(question, at)
  const first = attempt(question, [at.point[0] + DIFFERENCE, at.point[1]])
  const second = question.stands ? null : attempt(question, [at.point[0], at.point[1] + DIFFERENCE])
  if (!first || (!second && !question.stands)) return residual
  const slope = (other: Attempt, end: 0 | 1) => Math.log(other.foundHz[end] / at.foundHz[end]) / DIFFERENCE
  if (!second) return [-residual[0] / slope(first, 0), 0]
  const [a, b, c, d] = [slope(first, 0), slope(second, 0), slope(first, 1), slope(second, 1)]
  const determinant = a * d - b * c
  if (!(Math.abs(determinant) > 1e-6)) return residual
  return [-(d * residual[0] - b * residual[1]) / determinant, -(a * residual[1] - c * residual[0]) / determinant]
}

function attempt(question: Question, point: Point): Attempt | null {
  const set = setAt(question, point)
  const { kind, sampleRate, ends, targets, stands } = question
  const low = firstExtreme(set, kind, ends.longest.position, sampleRate)?.frequencyHz
  const high = stands ? low : firstExtreme(set, kind, ends.shortest.position, sampleRate)?.frequencyHz
  if (low === undefined || high === undefined) return null
  return { point, foundHz: [low, high], errors: [Math.abs(low - targets[0]), Math.abs(high - targets[1])] }
}

function sweepAt({ set, ends, stands, dryDelayMs, sides }: Question, point: Point): SolvedSweep {
  const longest = dryDelayMs + sides[0] * Math.exp(point[0])
  const shortest = dryDelayMs + sides[1] * Math.exp(point[1])
  const span = ends.longest.s - ends.shortest.s
  if (set.sweep.law === 'time') {
    const depth = stands ? set.sweep.depthMs : (longest - shortest) / span
    return { baseMs: longest - depth * ends.longest.s, depth }
  }
  const depth = stands ? set.sweep.depthOctaves : Math.log2(longest / shortest) / span
  return { baseMs: longest / 2 ** (depth * ends.longest.s), depth }
}

function setAt(question: Question, point: Point): ParameterSet {
  return withSweep(question.set, sweepAt(question, point))
}

function withSweep(set: ParameterSet, { baseMs, depth }: SolvedSweep): ParameterSet {
  const key = set.sweep.law === 'time' ? 'depthMs' : 'depthOctaves'
  return { ...set, line: { ...set.line, baseMs }, sweep: { ...set.sweep, [key]: depth } }
}

/** A solution of the equations is one of the workbench only inside the parameters' ranges and the interpolators' limits. */
function judged(question: Question, best: Attempt): Result<SolvedSweep> {
  const { set, sampleRate } = question
  const solved = sweepAt(question, best.point)
  const path = set.sweep.law === 'time' ? 'sweep.depthMs' : 'sweep.depthOctaves'
  const out = [outOfRange('line.baseMs', solved.baseMs), outOfRange(path, solved.depth)].filter((problem) => problem !== null)
  if (out.length > 0) return bad(...out.map((message) => problemOf(question, `${asked(question)} needs ${message}`)))
  const close = setProblems(withSweep(set, solved), sampleRate).filter((problem) => problem.path === 'line.baseMs')
  if (close.length === 0) return good(solved)
  const most = highestHz(question, best)
  const range = most === null ? undefined : `at most ${figure(most)} Hz where the delay is smallest`
  const reason = range ? `; it reaches ${range}` : ''
  return bad({
    ...problemOf(question, `${asked(question)} is out of reach: ${close.map((problem) => problem.message).join('; ')}${reason}`),
    ...(range && { range }),
  })
}

/** The first extreme where the delay is the smallest the interpolators read; null behind a dry delay or with several voices, where that is not the highest. */
function highestHz(question: Question, best: Attempt): number | null {
  const { set, sampleRate, dryDelayMs, sides, stands } = question
  const { voiceLimitSamples, loopLimitSamples } = delayRange(set, sampleRate)
  const limitMs = (1000 * Math.max(voiceLimitSamples, set.loop.feedback === 0 ? 0 : loopLimitSamples)) / sampleRate
  if (stands || sides[1] < 0 || set.voices.count > 1 || limitMs <= dryDelayMs) return null
  return attempt(question, [best.point[0], Math.log(limitMs - dryDelayMs)])?.foundHz[1] ?? null
}

function outOfRange(path: string, value: number): string | null {
  const row = parameter(path)
  if (row.kind !== 'number' || (value >= row.min && value <= row.max)) return null
  return `${path} ${figure(value)} ${row.unit}, outside ${row.min} to ${row.max} ${row.unit}`
}

const asked = ({ kind, targets: [low, high], stands }: Question) =>
  stands ? `a first ${kind} at ${figure(low)} Hz` : `a first ${kind} from ${figure(low)} to ${figure(high)} Hz`

function missed(question: Question, { foundHz }: Attempt): string {
  const reached = question.stands ? `${figure(foundHz[0])} Hz` : `${figure(foundHz[0])} to ${figure(foundHz[1])} Hz`
  return `no base and depth give ${asked(question)}: the closest found is ${reached}`
}

function problemOf({ targets }: Question, message: string, hint?: string): Problem {
  return { path: 'line.baseMs', message, value: targets, ...(hint && { hint }) }
}

const no = (question: Question, message: string, hint?: string): Result<SolvedSweep> => bad(problemOf(question, message, hint))

const figure = (value: number) => String(Number(value.toPrecision(6)))
