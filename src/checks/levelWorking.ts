// How the levels were found: worst gain, what no place exceeds, worst sample held and moving, what shapers hold, what is judged.
import type { HeldNorm, LevelFigure, LevelFigures } from '../analysis/levels.ts'
import { levelDb } from '../analysis/levels.ts'
import type { PeakBounds } from '../analysis/lineNorm.ts'
import type { LevelPlace } from './levelStatus.ts'
import type { Limit } from './limits.ts'
import { counted, quantity } from './loopText.ts'
import type { CheckInput, WorkingStep } from './types.ts'

/** Found and bound closer than this are one figure, dB. */
const SAME_DB = 0.01

export function levelWorking(input: CheckInput, figures: LevelFigures, place: LevelPlace, limit: Limit): WorkingStep[] {
  const level = figures[place]
  const bounds = place === 'peak' ? figures.peakBounds : figures.lineBounds
  return [
    gainStep(input, level, place),
    ...boundStep(level, place),
    ...(level.l1 ? [sampleStep(input, level.l1, place)] : []),
    movementStep(input, level, bounds, place),
    ...shaperStep(input, level, bounds),
    judgedStep(level, limit),
  ]
}

const inDb = (gain: number): string => `${quantity(gain)} (${quantity(levelDb(gain), 'dB')})`

function gainStep({ set }: CheckInput, { worst }: LevelFigure, place: LevelPlace): WorkingStep {
  const formula = place === 'peak' ? 'max |Y/X| over 0 to fs/2 and every held position' : 'max |W/X| over 0 to fs/2 and every held position'
  const source = 'exact response of the held sweep, the same signal at every input; shapers by their largest gain sup|shaper(x)/x|'
  if (worst === null)
    return {
      formula,
      numbers: `feedback ${quantity(set.loop.feedback)}: a held position has a pole on or outside the unit circle`,
      result: 'no finite gain',
      source: 'poles of 1 − g A(z) F(z)',
    }
  const two = set.layout !== 'mono' && place === 'peak'
  return {
    formula,
    numbers: `${two ? `channel ${worst.channel + 1}, ` : ''}${quantity(worst.frequencyHz, 'Hz')}, sweep at ${quantity(worst.position)}${place === 'peak' ? `, voice 1 at ${quantity(worst.delayMs, 'ms')}` : ''}`,
    result: inDb(worst.gain),
    source,
  }
}

function boundStep({ worst }: LevelFigure, place: LevelPlace): WorkingStep[] {
  if (worst === null || !Number.isFinite(worst.bound)) return []
  const same = levelDb(worst.bound) - levelDb(worst.gain) < SAME_DB
  return [
    {
      formula:
        place === 'peak'
          ? '|H| ≤ |dry| + |wet| √V |F|/(1 − |g| σ |F_loop|), read and loop in phase where they are one'
          : '|W| ≤ 1/(1 − |g| σ |F_loop|)',
      numbers: `largest over frequency ${inDb(worst.bound)}`,
      result: same
        ? 'reached: the worst gain is exact'
        : `the worst gain lies between ${quantity(levelDb(worst.gain))} and ${quantity(levelDb(worst.bound), 'dB')}`,
      source: 'triangle inequality; reads are passive, |A| ≤ 1',
    },
  ]
}

function sampleStep({ sampleRate }: CheckInput, { sum, bound, position, samples }: HeldNorm, place: LevelPlace): WorkingStep {
  const tail = bound === null ? 'tail not bounded' : `tail at most ${quantity(Math.max(0, bound - sum))}`
  return {
    formula: '‖h‖₁ = Σ|h[n]|, both inputs added where there are two',
    numbers: `${place === 'peak' ? 'output' : 'line'}, sweep held at ${quantity(position)}; ${counted(samples, 'sample')} at ${quantity(sampleRate, 'Hz')}, ${tail}`,
    result: `computed: ${inDb(bound ?? sum)}`,
    source: 'worst sample of an input within ±1, reached by x[n − k] = sign h[k]; comb: |BL| + |FF − BL a|/(1 − |a|)',
  }
}

function movementStep({ set }: CheckInput, { anyMovement, l1 }: LevelFigure, b: PeakBounds, place: LevelPlace): WorkingStep {
  const source = 'l∞ small gain: |Σ h x| ≤ ‖h‖₁ max|x|, an input within ±1'
  if (anyMovement !== null && anyMovement === l1?.bound)
    return { formula: 'bound for any movement = ‖h‖₁', numbers: 'the delays never move', result: `as above, ${inDb(anyMovement)}`, source }
  const g = Math.abs(set.loop.feedback)
  const line = set.loop.shaper === null ? 'U/(1 − |g| ρ ‖f‖₁)' : 'the smallest W with U + |g| max|shaper(±‖f‖₁ ρ W)| ≤ W'
  const numbers = [`U = ${quantity(b.input)}`, `|g| = ${quantity(g)}`]
  if (g > 0) numbers.push(`ρ = ${quantity(b.loopPeak)} in the loop`, `‖f‖₁ = ${quantity(b.loopL1)}`)
  if (b.line !== null) numbers.push(`W = ${quantity(b.line)}`)
  if (place === 'peak') numbers.push(`ρ = ${quantity(b.voicePeak)} of the voices`, `‖f_wet‖₁ = ${quantity(b.wetL1)}`)
  const output = b.together ? '|dry| U + |wet + g dry| ρ W, voice and loop being one read' : '|dry| (U or W) + |wet| √V ρ ‖f_wet‖₁ W'
  return {
    formula: place === 'line' ? `|w| ≤ W = ${line}` : `|y| ≤ outputGain (${output}), W = ${line}`,
    numbers: numbers.join(', '),
    result:
      anyMovement === null ? 'no bound of this kind: the loop gain in l₁ is not below 1' : `bound, for any movement: ${inDb(anyMovement)}`,
    source,
  }
}

function shaperStep({ set }: CheckInput, { heldByShaper, anyMovement, worst }: LevelFigure, bounds: PeakBounds): WorkingStep[] {
  const shapers = [set.input.shaper, set.loop.shaper, set.mix.shaper].filter((shaper) => shaper !== null)
  if (shapers.length === 0 || anyMovement === null) return []
  return [
    {
      formula: 'level = min(worst gain, what the shapers let through)',
      numbers: `worst gain ${worst === null ? 'not finite' : inDb(worst.gain)}, ceilings ${inDb(bounds.output ?? anyMovement)}`,
      result: heldByShaper ? 'the ceilings hold the level' : 'the gain decides',
      source: 'range of each curve over the largest level that reaches it',
    },
  ]
}

function judgedStep({ db, sampleDb }: LevelFigure, { limit, margin, own, row }: Limit): WorkingStep {
  const top = limit ?? 0
  const verdict = (value: number | null) =>
    value === null ? 'none' : value > top ? 'over it' : value >= top - margin ? 'near it' : 'below it'
  return {
    formula: 'worst gain ≤ headroom, near within the margin or when the worst sample is over it',
    numbers: `headroom ${quantity(top, 'dB')}, margin ${quantity(margin, 'dB')}, worst sample ${sampleDb === null ? 'without bound' : quantity(sampleDb, 'dB')}`,
    result: `worst gain ${db === null ? 'not finite' : verdict(db)}; worst sample ${sampleDb === null ? 'over it' : sampleDb > top ? 'over it' : 'within it'}`,
    source: own ? 'the set’s own limit' : row.source,
  }
}
