// level.loudness: how much louder the effect is than its bypass, on plucked chords or the material given.
import { type LoudnessFigures, loudnessSteps } from '../analysis/levelsLoudness.ts'
import { partOf } from '../analysis/levelsSteps.ts'
import { pluckedChordsPhraseSteps } from '../material/phrases.ts'
import { resampleTo } from '../signal/resample.ts'
import { labelOf } from './limits.ts'
import { quantity } from './loopText.ts'
import type { CheckInput, CheckSteps, Status } from './types.ts'

/** A difference past this is noted: the bypass switch is heard as a change of level. Common practice, no source. */
const NOTED_LU = 3

export function* levelLoudness(input: CheckInput): CheckSteps {
  const { set, sampleRate } = input
  const base = { id: 'level.loudness', limit: null, unit: 'LU', label: labelOf('level.loudness') } as const
  const { name, channels, resampled } = yield* materialOf(input)
  if ((channels[0]?.length ?? 0) < 0.4 * sampleRate) {
    const text = `${name} is shorter than the 0.4 s that loudness is measured over.`
    const numbers = `${quantity(channels[0]?.length ?? 0)} samples at ${quantity(sampleRate, 'Hz')}`
    const step = { formula: 'at least one block of 0.4 s', numbers, result: 'not measured', source: 'ITU-R BS.1770-5, gating blocks' }
    return { ...base, status: 'note', value: null, text, working: [step] }
  }
  const figures = yield* partOf(loudnessSteps(set, channels, sampleRate), MATERIAL_PART, 1 - MATERIAL_PART)
  const { effect, bypass, differenceLu, diverged } = figures
  const seconds = quantity((channels[0] as Float64Array).length / sampleRate, 's')
  const material = `${name}, ${seconds}${resampled}, routed as the layout asks`
  const source = 'ITU-R BS.1770-5: K-weighting, blocks of 400 ms, gates at −70 LUFS and −10 LU'
  return {
    ...base,
    status: statusOf(differenceLu),
    value: differenceLu,
    text: textOf(name, figures),
    working: [
      { formula: '−0.691 + 10 log₁₀ Σ z of the bypass', numbers: material, result: lufs(bypass), source },
      {
        formula: '−0.691 + 10 log₁₀ Σ z of the effect',
        numbers: `the same, rendered by the double engine at ${quantity(sampleRate, 'Hz')}`,
        result: diverged ? 'grows without end' : lufs(effect),
        source,
      },
      {
        formula: 'effect − bypass',
        numbers: `${lufs(effect)} − (${lufs(bypass)})`,
        result: differenceLu === null ? 'none' : quantity(tenths(differenceLu), 'LU'),
        source: `noted past ±${NOTED_LU} LU: common practice, no source`,
      },
    ],
  }
}

/** Part of the whole that making the material takes. */
const MATERIAL_PART = 0.3

interface Material {
  readonly name: string
  readonly channels: readonly Float64Array[]
  readonly resampled: string
}

/** The last chords made: they are the same for every set at a rate, and take longer than all else. */
let chords: { readonly sampleRate: number; readonly samples: Float64Array } | null = null

function* materialOf({ material, sampleRate }: CheckInput): Generator<number, Material> {
  if (material) {
    const same = material.sampleRate === sampleRate
    return {
      name: material.name,
      channels: same ? material.channels : resampleTo(material.channels, material.sampleRate, sampleRate),
      resampled: same ? '' : ` (resampled from ${quantity(material.sampleRate, 'Hz')})`,
    }
  }
  if (chords?.sampleRate !== sampleRate) {
    chords = { sampleRate, samples: yield* partOf(pluckedChordsPhraseSteps(sampleRate), 0, MATERIAL_PART) }
  }
  return { name: 'The built-in plucked chords', channels: [chords.samples], resampled: '' }
}

/** Loudness is told to a tenth. */
const tenths = (value: number): number => Math.round(10 * value) / 10

const lufs = (value: number | null): string => (value === null ? 'below −70 LUFS' : quantity(tenths(value), 'LUFS'))

const statusOf = (differenceLu: number | null): Status => (differenceLu !== null && Math.abs(differenceLu) <= NOTED_LU ? 'holds' : 'note')

function textOf(name: string, { bypass, differenceLu, diverged }: LoudnessFigures): string {
  const on = name.startsWith('The ') ? `t${name.slice(1)}` : name
  if (diverged) return `On ${on} the output grows without end.`
  if (bypass === null) return `${name} is too quiet to be measured: below −70 LUFS.`
  if (differenceLu === null) return `On ${on} the effect is too quiet to be measured: below −70 LUFS.`
  if (Math.abs(differenceLu) < 0.05) return `On ${on} the effect is as loud as its bypass.`
  return `On ${on} the effect is ${quantity(tenths(Math.abs(differenceLu)), 'LU')} ${differenceLu > 0 ? 'louder' : 'quieter'} than its bypass.`
}
