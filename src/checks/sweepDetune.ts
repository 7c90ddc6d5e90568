// sweep.detune: how far the sweep bends pitch, from the delay really read.
import { sweepDetune as detuneOf, type SweepDetune } from '../analysis/detune.ts'
import { bisect } from '../analysis/loopSearch.ts'
import { roundedDown } from '../analysis/stabilityRaise.ts'
import { withAt } from '../set/path.ts'
import type { ParameterSet } from '../set/types.ts'
import { judge, type Limit, labelOf, limitOf } from './limits.ts'
import { quantity } from './loopText.ts'
import { samplesText } from './sweepText.ts'
import type { Check, CheckFunction, Mend, Status, WorkingStep } from './types.ts'

export const sweepDetune: CheckFunction = ({ set, sampleRate }): Check => {
  const detune = detuneOf(set, sampleRate)
  const limit = limitOf(set, 'sweep.detune')
  const status = statusOf(set, detune, limit)
  const mend = status === 'holds' || limit.limit === null ? [] : gentler(set, sampleRate, limit.limit)
  return {
    id: 'sweep.detune',
    status,
    value: detune.motion === 'plays' ? detune.maxCents : detune.motion,
    limit: limit.limit,
    unit: 'cents',
    label: labelOf('sweep.detune'),
    text: textOf(set, detune),
    working: [
      slopeStep(set, detune, sampleRate),
      centsStep(detune),
      ...holdStep(set, detune),
      ...loopStep(set, detune),
      {
        formula: '|cents| ≤ limit',
        numbers: `limit ${quantity(limit.limit ?? 0, 'cents')}`,
        result: status === 'holds' ? 'inside' : 'outside',
        source: limit.own ? 'the set’s own limit' : limit.row.source,
      },
    ],
    ...(mend.length > 0 && { mend }),
  }
}

const hasEdges = ({ sweep }: ParameterSet) => ['square', 'rampUp', 'rampDown'].includes(sweep.shape)

/** With `hold` the read never runs backwards: it stands, then hops. */
const hops = ({ sweep }: ParameterSet) => sweep.between === 'hold' && sweep.updateEvery > 1

function statusOf(set: ParameterSet, detune: SweepDetune, limit: Limit): Status {
  if (detune.motion === 'plays') return judge(limit, detune.maxCents)
  return hops(set) ? 'near' : 'fails'
}

function textOf(set: ParameterSet, detune: SweepDetune): string {
  if (detune.maxSlope === 0 && detune.minSlope === 0) return 'The delay stands still and bends no pitch.'
  const speed = `${quantity(detune.maxSlope)} s a second`
  if (detune.motion !== 'plays' && hops(set))
    return `The delay grows by up to ${speed}: each hop goes back as far as the read came, or further.`
  if (detune.motion === 'stalls') return 'The delay grows as fast as time passes: the read stalls.'
  if (detune.motion === 'reversed') return `The delay grows faster than time passes, ${speed}: the read runs backwards.`
  const most = set.sweep.shape === 'drift' ? 'at most ' : ''
  const up = quantity(detune.upCents, 'cents')
  return `The sweep bends pitch by ${most}${up} up and ${quantity(-(detune.downCents ?? 0), 'cents')} down.`
}

function slopeStep(set: ParameterSet, detune: SweepDetune, sampleRate: number): WorkingStep {
  const { sweep } = set
  const depth = sweep.law === 'time' ? quantity(sweep.depthMs, 'ms') : quantity(sweep.depthOctaves, 'octaves')
  const edges = hasEdges(set) ? `, edge ${quantity(sweep.edgeMs, 'ms')}` : ''
  return {
    formula: 'dτ/dt = (τ(t + h) − τ(t))/h, h = K/fs, largest and smallest over any t',
    numbers: `${sweep.shape}, ${quantity(sweep.rateHz, 'Hz')}, ${sweep.law} law, depth ${depth}${edges}, K = ${sweep.updateEvery}, fs = ${quantity(sampleRate, 'Hz')}`,
    result: `${quantity(detune.maxSlope)} and ${quantity(detune.minSlope)} s a second`,
    source:
      sweep.shape === 'drift'
        ? 'bound: two neighbouring values at −1 and 1, a sine of half the rate'
        : 'the delay really read is a chord of the sweep from one update to the next',
  }
}

function centsStep({ upCents, downCents, motion }: SweepDetune): WorkingStep {
  return {
    formula: '1200 log₂(1 − dτ/dt)',
    numbers: 'both slopes above',
    result: `+${quantity(upCents)} and ${downCents === null ? `none: the read ${motion === 'stalls' ? 'stalls' : 'runs backwards'}` : quantity(downCents, 'cents')}`,
    source: 'J. O. Smith, PASP, "Time-Varying Delay-Line Reads"',
  }
}

function holdStep(set: ParameterSet, detune: SweepDetune): WorkingStep[] {
  if (!hops(set)) return []
  return [
    {
      formula: 'hop = largest |τ(t + h) − τ(t)| · fs',
      numbers: `the delay stands for ${quantity(detune.updateSeconds * 1000, 'ms')}, then hops`,
      result: `${samplesText(detune.hopSamples)} a hop`,
      source: 'between hops pitch is not bent; the cents are the mean over them, and the hops are heard as steps',
    },
  ]
}

function loopStep({ loop }: ParameterSet, detune: SweepDetune): WorkingStep[] {
  if (loop.feedback === 0 || loop.delay === 'fixed' || detune.maxSlope === 0) return []
  return [
    {
      formula: 'each pass through a moving loop bends once more',
      numbers: `feedback ${quantity(loop.feedback)}, loop delay moving`,
      result: 'cents above are those of one pass',
      source: 'Dattorro 1997, section 6 (qualitative)',
    },
  ]
}

/** Single changes, rounded to the gentler side, that bring the detune to the limit: each tried. */
function gentler(set: ParameterSet, sampleRate: number, limitCents: number): Mend[] {
  const inside = (path: string, value: number) => {
    const { maxCents } = detuneOf(withAt(set, path, value), sampleRate)
    return maxCents !== null && maxCents <= limitCents
  }
  const smaller = (path: string, now: number): number | null => {
    const value = roundedDown(bisect((v) => inside(path, v), 0, now, 20))
    return value > 0 && inside(path, value) ? value : null
  }
  const { law, rateHz, depthMs, depthOctaves } = set.sweep
  const [path, now, unit] =
    law === 'time' ? (['sweep.depthMs', depthMs, 'ms'] as const) : (['sweep.depthOctaves', depthOctaves, 'octaves'] as const)
  const changes = [
    { label: 'Rate', path: 'sweep.rateHz', unit: 'Hz', value: smaller('sweep.rateHz', rateHz) },
    { label: 'Depth', path, unit, value: smaller(path, now) },
    { label: 'Edge', path: 'sweep.edgeMs', unit: 'ms', value: hasEdges(set) ? longerEdge(set, inside) : null },
  ]
  return changes.flatMap(({ label, path: at, unit: of, value }) =>
    value === null ? [] : [{ label: `${label} ${quantity(value, of)}`, path: at, value }],
  )
}

/** An edge in whole ms that is gentle enough; past half a cycle it can grow no more. */
function longerEdge({ sweep }: ParameterSet, inside: (path: string, value: number) => boolean): number | null {
  const longest = Math.min(1000, 500 / sweep.rateHz)
  const value = Math.ceil(bisect((v) => inside('sweep.edgeMs', v), sweep.edgeMs, longest, 20))
  return value <= longest && inside('sweep.edgeMs', value) ? value : null
}
