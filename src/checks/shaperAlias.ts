// shaper.alias: what a 5 kHz tone through each shaper folds back below half the rate. The worst shaper counts.
import { foldedEnergy } from '../analysis/folded.ts'
import type { ParameterSet } from '../set/types.ts'
import { judge, labelOf, limitOf } from './limits.ts'
import { quantity } from './loopText.ts'
import { softer } from './shaperAliasMends.ts'
import { curveText, FOURIER, noShaperText, type ShaperFold, shaperFolds, TONE_DBFS } from './shaperFigures.ts'
import { noneStep } from './shaperHarmonics.ts'
import type { Check, CheckFunction, WorkingStep } from './types.ts'

export const shaperAlias: CheckFunction = (input): Check => {
  const { set, sampleRate } = input
  const limit = limitOf(set, 'shaper.alias')
  const base = { id: 'shaper.alias', limit: limit.limit, unit: 'dB', label: labelOf('shaper.alias') } as const
  const folds = shaperFolds(input)
  const [worst] = folds
  if (!worst)
    return { ...base, status: 'holds', value: null, text: `${noShaperText(set)}: nothing folds.`, working: [noneStep(noShaperText(set))] }
  const value = worst.folded.db
  const status = judge(limit, value)
  const mend = status === 'holds' ? [] : softer(input, worst, status)
  return {
    ...base,
    status,
    value,
    text: `${textOf(worst, folds.length)}.`,
    working: [
      ...folds.flatMap((fold) => working(fold, sampleRate, set)),
      {
        formula: 'folded energy ≤ limit',
        numbers: `limit ${quantity(limit.limit ?? 0, 'dB')}, near within ${quantity(limit.margin, 'dB')} of it`,
        result: status === 'holds' ? 'inside' : status === 'near' ? 'inside, near the limit' : 'outside',
        source: limit.own ? 'the set’s own limit' : limit.row.source,
      },
    ],
    ...(mend.length > 0 && { mend }),
  }
}

function textOf({ present, folded }: ShaperFold, count: number): string {
  const tone = `${toneText(folded.toneHz)} tone of ${quantity(TONE_DBFS)} dBFS`
  const name = `the ${present.name}${present.shaper.antialias === 'adaa1' ? ', anti-aliased,' : ''}`
  if (folded.db === null) return `Of a ${tone} ${name} lets nothing through, so nothing folds`
  if (folded.db <= -400) return `Of a ${tone} ${name} folds nothing back: it makes no harmonic above half the rate`
  const again = present.path === 'loop.shaper' ? ' a pass' : ''
  const others = count > 1 ? `, the worst of ${count} shapers` : ''
  return `Of a ${tone} ${name} folds back ${quantity(folded.db, 'dB')}${again}${others}`
}

const toneText = (hz: number) => (hz >= 1000 ? quantity(hz / 1000, 'kHz') : quantity(hz, 'Hz'))

function working({ present, folded }: ShaperFold, sampleRate: number, set: ParameterSet): WorkingStep[] {
  const { shaper, amplitude, name } = present
  const means = shaper.antialias === 'adaa1'
  const result = folded.db === null ? 'no tone comes out' : folded.db <= -400 ? 'none' : quantity(folded.db, 'dB')
  const first: WorkingStep = {
    formula: `10 log₁₀(Σ c_n²/c_1²) over n f > fs/2, each counted wherever it folds to; ${means ? 'c_n of the means of neighbouring samples' : FOURIER}`,
    numbers: `${name}: ${curveText(shaper)}; A = ${quantity(amplitude)} at its input, f = ${quantity(folded.toneHz, 'Hz')}, fs = ${quantity(sampleRate, 'Hz')}: n > ${folded.kept}`,
    result,
    source: 'sampling theorem; Fourier series, the rest beyond the kept harmonics as one integral',
  }
  const steps = [first]
  if (means)
    steps.push({
      formula: 'y[n] = (F(x[n]) − F(x[n−1]))/(x[n] − x[n−1]), F′ = shaper',
      numbers: `without it ${quantity(foldedEnergy({ ...shaper, antialias: 'none' }, amplitude, sampleRate).db ?? -400, 'dB')}`,
      result: `${result}, half a sample later`,
      source: 'Parker, Zavalishin, Le Bivic, DAFx-16',
    })
  if (present.path === 'loop.shaper')
    steps.push({
      formula: 'what folds goes round again',
      numbers: `feedback ${quantity(set.loop.feedback)}${means ? '; the loop’s read is half a sample shorter, so that its pitch stays' : ''}`,
      result: 'the figure is that of one pass',
      source: 'the loop’s equation, DESIGN 3',
    })
  return steps
}
