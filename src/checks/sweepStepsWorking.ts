// How sweep.steps explains itself.
import { type ArtefactBench, type ReadSetting, settingCost, settingOf } from '../analysis/artefactBench.ts'
import { noiseTopHz } from '../analysis/artefactNoise.ts'
import { sweepMovement } from '../analysis/artefactPlaces.ts'
import type { Artefacts } from '../analysis/artefacts.ts'
import type { ParameterSet } from '../set/types.ts'
import type { Limit } from './limits.ts'
import { quantity } from './loopText.ts'
import type { Cheapest } from './sweepSteps.ts'
import type { WorkingStep } from './types.ts'

/** Why there is nothing to measure; null when there is. */
export function nothingText(set: ParameterSet): { readonly text: string; readonly step: WorkingStep } | null {
  const step = (formula: string, numbers: string, result: string): WorkingStep => ({
    formula,
    numbers,
    result,
    source: 'definition of the check',
  })
  if (set.mix.wet === 0)
    return { text: 'There is no wet signal, so nothing of its reads is heard.', step: step('wet · m', 'wet 0', 'no wet signal') }
  const movement = sweepMovement(set)
  const { sweep } = set
  if (movement === 'stands')
    return {
      text: 'The delay stands still, so nothing steps; what its interpolator loses is under interpolation loss.',
      step: step('D[n] the same for all n', `rate ${quantity(sweep.rateHz, 'Hz')}, ${depthText(set)}`, 'a fixed filter: no artefact'),
    }
  if (movement === 'jumps')
    return {
      text: 'The sweep stands, and jumps without an edge as it is asked to: between the jumps nothing steps.',
      step: step('D[n] stands between jumps', `square, edge ${quantity(sweep.edgeMs, 'ms')}`, 'the jumps are the sweep’s own, no artefact'),
    }
  return null
}

const depthText = ({ sweep }: ParameterSet) =>
  `depth ${sweep.law === 'time' ? quantity(sweep.depthMs, 'ms') : quantity(sweep.depthOctaves, 'octaves')}`

/** "lagrange3 read, updated every 16 samples, ramped". */
export function settingText({ line, loop, updateEvery, between }: ReadSetting, loops: boolean): string {
  const updates =
    updateEvery === 1 ? 'updated every sample' : `updated every ${updateEvery} samples, ${between === 'ramp' ? 'ramped' : 'held'} between`
  return `${line} read${loops ? `, loop ${loop}` : ''}, ${updates}`
}

/** Who leaves most: "the linear read of the voices". */
export function blameText(set: ParameterSet, { blame }: Artefacts): string {
  const { line, loop, updateEvery, between } = settingOf(set)
  if (blame === 'updates')
    return updateEvery === 1 ? 'no one' : `${between === 'hold' ? 'holding' : 'ramping'} the delay for ${updateEvery} samples`
  return blame === 'loop' ? `the loop’s ${loop} read` : `the voices’ ${line} read`
}

interface Explained {
  readonly set: ParameterSet
  readonly sampleRate: number
  readonly limit: Limit
  readonly bench: ArtefactBench
  readonly found: Artefacts
  readonly cheapest: Cheapest
}

export function stepsWorking(all: Explained): WorkingStep[] {
  return [referenceStep(all), levelStep(all), ...loopStep(all), octavesStep(all), ...blameSteps(all), cheapestStep(all), limitStep(all)]
}

function referenceStep({ sampleRate, bench: { stage }, found: { own } }: Explained): WorkingStep {
  const each = stage.stretches.length / 2
  return {
    formula: 'e = read − reference; the reference reads D(t), evaluated every sample, by a Kaiser-windowed sinc of 96 taps',
    numbers: `in the line noise of the plucked chords’ spectrum, 1/(1 + (f/600 Hz)²)², up to ${quantity(noiseTopHz(sampleRate) / 1000, 'kHz')}; ${each} stretches of ${quantity((stage.length * 1000) / sampleRate, 'ms')} over the cycle, ${each} where it moves fastest; channel 0`,
    result: `of e ${quantity(own?.standingDb ?? 0, 'dB')} stands still: a filter, judged under interpolation loss`,
    source: 'J. F. Kaiser 1974 (from memory); the reference is right to −140 dB up to 0.45 fs (computed)',
  }
}

function levelStep({ found: { own } }: Explained): WorkingStep {
  return {
    formula: '10 log₁₀(Σ|E − H X|²/Σ|X|²), H = Σ X*E/Σ|X|² in each bin, the larger of both groups',
    numbers: `over the cycle ${quantity(own?.cycleDb ?? 0, 'dB')}, where it moves fastest ${quantity(own?.steepestDb ?? 0, 'dB')}`,
    result: quantity(own?.db ?? 0, 'dB'),
    source: 'coherent output power, Bendat and Piersol, "Random Data" (from memory); for a tone it is THD+N',
  }
}

function loopStep({ set, found: { own } }: Explained): WorkingStep[] {
  if (own?.loopDb == null) return []
  return [
    {
      formula: 'error of one pass · a²/(1 − a²), a = g F(f): what all passes leave in the line, added in power',
      numbers: `g = ${quantity(set.loop.feedback)}, loop ${set.loop.interpolation} read, moving`,
      result: `voices ${quantity(own.voicesDb, 'dB')}, loop ${quantity(own.loopDb, 'dB')}`,
      source: 'geometric series; that the passes are unrelated while the delay moves is this project’s assumption',
    },
  ]
}

function octavesStep({ found: { own } }: Explained): WorkingStep {
  const bands = own?.bands ?? []
  const octave = (hz: number) => (hz >= 1000 ? quantity(hz / 1000, 'kHz') : quantity(hz, 'Hz'))
  return {
    formula: 'per octave: artefacts in it against the wet signal in it',
    numbers: bands
      .map(({ centreHz, wetDb }) => `${octave(centreHz)} holds ${quantity(Math.round(wetDb), 'dB')} of the wet signal`)
      .join(', '),
    result: bands.map(({ centreHz, db }) => `${octave(centreHz)} ${quantity(Math.round(db), 'dB')}`).join(', '),
    source: 'the same sums over an octave’s bins',
  }
}

function blameSteps({ set, found: { interpolators, updates, blame } }: Explained): WorkingStep[] {
  const { updateEvery, between, line } = settingOf(set)
  const reads = `${quantity(interpolators?.db ?? 0, 'dB')}`
  if (updateEvery === 1)
    return [
      {
        formula: 'interpolator alone: updated every sample',
        numbers: `${line} read, updated every sample as it is`,
        result: `${reads}: all of it`,
        source: 'the same measurement',
      },
    ]
  return [
    {
      formula: 'interpolator alone: updated every sample',
      numbers: `${line} read, an update every sample`,
      result: reads,
      source: 'the same measurement',
    },
    {
      formula: 'updates alone: read by the reference',
      numbers: `K = ${updateEvery}, ${between === 'ramp' ? 'straight lines between' : `held between; its mean lateness of ${quantity((updateEvery - 1) / 2)} samples left out`}`,
      result: `${quantity(updates?.db ?? 0, 'dB')}: ${blame === 'updates' ? 'the updates dominate' : 'the interpolator dominates'}`,
      source: 'the same measurement',
    },
  ]
}

function cheapestStep({ set, bench, cheapest: { targetDb, found } }: Explained): WorkingStep {
  const own = settingOf(set)
  const { loops } = bench.stage
  const numbers = `to stay at ${quantity(targetDb, 'dB')} or below; as it is ${quantity(settingCost(set, own))} operations a sample and line`
  const formula = 'cheapest: V (read + move) + loop, move = 30/K and 1 for a ramp; nearest 1, linear 4, cubics 15, allpass1 20'
  const source = 'additions and multiplications counted, a division as 14: an order of cost, not cycles of a part'
  if (!found) return { formula, numbers, result: 'no interpolator and update interval gets there', source }
  const { setting, cost, db } = found
  const changed = changedFields(own, setting)
  const needs = changed === 0 ? 'as it is' : changed === 1 ? 'one field' : `${changed} fields together`
  return {
    formula,
    numbers,
    result: `${settingText(setting, loops)}: ${quantity(db, 'dB')} for ${quantity(cost)} operations (${needs})`,
    source,
  }
}

function changedFields(a: ReadSetting, b: ReadSetting): number {
  // Updates at every sample have nothing between them.
  const between = b.updateEvery > 1 && a.between !== b.between
  return [a.line !== b.line, a.loop !== b.loop, a.updateEvery !== b.updateEvery, between].filter(Boolean).length
}

function limitStep({ limit, found: { own } }: Explained): WorkingStep {
  const [most, value] = [limit.limit ?? 0, own?.db ?? 0]
  return {
    formula: 'artefacts ≤ limit',
    numbers: `limit ${quantity(most, 'dB')}, near from ${quantity(most - limit.margin, 'dB')} on`,
    result: value > most ? 'outside' : value >= most - limit.margin ? 'inside, near the limit' : 'inside',
    source: limit.own ? 'the set’s own limit' : limit.row.source,
  }
}
