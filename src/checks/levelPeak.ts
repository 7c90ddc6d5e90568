// level.peak: the worst gain over frequency and sweep at the output against the headroom.
import { levelGain } from './levelGain.ts'
import { levelGainFigure } from './levelStatus.ts'
import type { CheckFunction, FigureFunction } from './types.ts'

export const levelPeak: CheckFunction = (input) => levelGain(input, 'peak')

export const levelPeakFigure: FigureFunction = (input) => levelGainFigure(input, 'peak')
