// From the input into the line, and how the voices read it.
import type { Parameter } from './kinds.ts'
import { interpolations } from './options.ts'
import { shaperParameters } from './shaper.ts'

export const INPUT_AND_LINE_PARAMETERS: readonly Parameter[] = [
  {
    kind: 'number',
    path: 'input.gainDb',
    label: 'Input gain',
    help: 'Gain before the input shaper and the line.',
    cName: 'input_gain',
    unit: 'dB',
    min: -60,
    max: 60,
    default: 0,
    taper: 'linear',
    trackMin: -24,
    trackMax: 24,
  },
  ...shaperParameters('input.shaper', 'Input shaper', 'input_shaper'),
  {
    kind: 'number',
    path: 'line.baseMs',
    label: 'Base delay',
    help: 'Delay at the middle of the sweep.',
    cName: 'base',
    unit: 'ms',
    min: 0,
    max: 500,
    default: 12,
    taper: 'log',
    trackMin: 0.05,
    trackMax: 100,
  },
  {
    kind: 'choice',
    path: 'line.interpolation',
    label: 'Voice interpolation',
    help: 'How the voices read between samples: cheaper ones dull or step, dearer ones keep the highs.',
    cName: 'interpolation',
    options: interpolations,
    default: 'lagrange3',
  },
]
