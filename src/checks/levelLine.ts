// level.line: the worst gain over frequency and sweep of what is written into the line, which often overflows before the output does.
import { levelGain } from './levelGain.ts'
import { levelGainFigure } from './levelStatus.ts'
import type { CheckFunction, FigureFunction } from './types.ts'

export const levelLine: CheckFunction = (input) => levelGain(input, 'line')

export const levelLineFigure: FigureFunction = (input) => levelGainFigure(input, 'line')
