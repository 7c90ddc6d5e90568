// The fields of a knob and of its moves, as rows like those of the signal path. Paths are relative: a panel is a list.

import type { ChoiceParameter, NumberParameter, TextParameter } from './kinds.ts'
import { options } from './options.ts'

export const MAX_KNOBS = 32
export const MAX_MOVES = 16

export const KNOB_NAME: TextParameter = {
  kind: 'text',
  path: 'knob',
  label: 'Knob',
  help: 'Name printed at the knob.',
  cName: 'knob',
  maxLength: 40,
  default: 'Knob',
}

export const KNOB_POSITION: NumberParameter = {
  kind: 'number',
  path: 'position',
  label: 'Position',
  help: 'Where the knob stands: 0 at its left end, 1 at its right.',
  cName: 'position',
  unit: '',
  min: 0,
  max: 1,
  default: 0.5,
  taper: 'linear',
}

export const KNOB_STEPS: NumberParameter = {
  kind: 'integer',
  path: 'steps',
  label: 'Steps',
  help: 'Positions the unit tells apart; 0 is continuous, 1 would not turn.',
  cName: 'steps',
  unit: '',
  min: 0,
  max: 1024,
  except: [1],
  default: 128,
  taper: 'linear',
}

export const KNOB_SMOOTH: NumberParameter = {
  kind: 'number',
  path: 'smoothMs',
  label: 'Smoothing',
  help: 'Time over which a turn reaches its value.',
  cName: 'smooth',
  unit: 'ms',
  min: 0,
  max: 5000,
  default: 30,
  taper: 'log',
  trackMin: 1,
}

export const MOVE_TAPER: ChoiceParameter = {
  kind: 'choice',
  path: 'taper',
  label: 'Taper',
  help: 'How the value follows the knob: equal differences, equal ratios, or a drawn curve.',
  cName: 'taper',
  options: options(['linear', 'linear'], ['log', 'log'], ['drawn', 'drawn']),
  default: 'linear',
}
