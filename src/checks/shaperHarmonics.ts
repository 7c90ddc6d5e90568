// shaper.harmonics: what each shaper adds to a sine of −6 dBFS, before anything is sampled. Values, not judged.
import { type DrivenSine, drivenSine, harmonicDb, totalDistortion } from '../analysis/harmonics.ts'
import { labelOf } from './limits.ts'
import { quantity } from './loopText.ts'
import { curveText, FOURIER, heardShapers, noShaperText, type PresentShaper, TONE_DBFS } from './shaperFigures.ts'
import type { Check, CheckFunction, WorkingStep } from './types.ts'

/** Harmonics listed, 2 to this; the distortion counts all there are. */
export const HIGHEST_HARMONIC = 10

export const shaperHarmonics: CheckFunction = ({ set }): Check => {
  const base = { id: 'shaper.harmonics', limit: null, unit: 'dB', label: labelOf('shaper.harmonics') } as const
  const driven = heardShapers(set).map((present) => ({ present, sine: drivenSine(present.shaper, present.amplitude, HIGHEST_HARMONIC) }))
  if (driven.length === 0)
    return { ...base, status: 'holds', value: null, text: `${noShaperText(set)}.`, working: [noneStep(noShaperText(set))] }
  return {
    ...base,
    status: 'note',
    value: Object.fromEntries(driven.map(({ present, sine }) => [present.path, figures(sine)])),
    text: `${sentence(driven.map(({ present, sine }) => textOf(present, sine)))}.`,
    working: driven.flatMap(({ present, sine }) => working(present, sine)),
  }
}

/** The working of a check that has nothing to look at. */
export const noneStep = (why: string): WorkingStep => ({
  formula: 'a curve between the path’s blocks makes harmonics; delays, filters and gains make none',
  numbers: why.charAt(0).toLowerCase() + why.slice(1),
  result: 'none',
  source: 'linearity',
})

const numbers = Array.from({ length: HIGHEST_HARMONIC - 1 }, (_, i) => i + 2)

/** Levels of harmonics 2 to 10 against the first, dB, null where there is none; distortion of all in % and the mean, of full scale. */
function figures(sine: DrivenSine) {
  const ratio = totalDistortion(sine)
  return {
    harmonicsDb: numbers.map((n) => harmonicDb(sine, n)),
    thdPercent: ratio === null ? null : 100 * ratio,
    dc: sine.amplitudes[0] as number,
  }
}

const sentence = (parts: readonly string[]) => {
  const all = parts.join('; ')
  return all.charAt(0).toUpperCase() + all.slice(1)
}

function textOf({ name }: PresentShaper, sine: DrivenSine): string {
  const ratio = totalDistortion(sine)
  if (ratio === null) return `the ${name} lets nothing of a ${quantity(TONE_DBFS)} dBFS sine through`
  const levels = numbers.map((n) => ({ n, db: harmonicDb(sine, n) })).filter(({ db }) => db !== null)
  if (levels.length === 0) return `the ${name} adds nothing to a ${quantity(TONE_DBFS)} dBFS sine`
  const most = levels.reduce((a, b) => ((b.db as number) > (a.db as number) ? b : a))
  return `the ${name} adds a ${ordinal(most.n)} harmonic of ${quantity(most.db as number, 'dB')} to a ${quantity(TONE_DBFS)} dBFS sine, ${quantity(100 * ratio, '%')} distortion in all`
}

function working(present: PresentShaper, sine: DrivenSine): WorkingStep[] {
  const { shaper, amplitude, name } = present
  const clip = shaper.curve === 'hardClip' && shaper.positive === shaper.negative
  const ratio = totalDistortion(sine)
  const dc = sine.amplitudes[0] as number
  return [
    {
      formula: FOURIER,
      numbers: `${name}: ${curveText(shaper)}; A = ${quantity(amplitude)} at its input`,
      result: numbers.map((n) => `${n}: ${levelText(harmonicDb(sine, n))}`).join(', '),
      source: clip ? 'clipped-sine series, a standard integral (FACTS 7)' : 'Fourier series; integrated to the last places between corners',
    },
    {
      formula: 'THD = √(Σ_{n≥2} c_n²)/|c_1|, of all harmonics',
      numbers: `c_1 = ${quantity(Math.abs(sine.amplitudes[1] as number))}`,
      result: ratio === null ? 'none: nothing passes' : quantity(100 * ratio, '%'),
      source: 'definition',
    },
    ...(dc === 0
      ? []
      : [
          {
            formula: 'DC = c_0/2',
            numbers: 'halves unlike',
            result: quantity(dc),
            source: 'mean over a cycle; judged, as the path leaves it, by level.dc',
          },
        ]),
  ]
}

const levelText = (db: number | null) => (db === null ? 'none' : quantity(db, 'dB'))

function ordinal(n: number): string {
  return `${n}${n === 2 ? 'nd' : n === 3 ? 'rd' : 'th'}`
}
