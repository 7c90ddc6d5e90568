// The figure and status of a closed check without its words: no text, no working, no mends. For whoever judges many sets at once and shows one.
import { levelLineFigure } from './levelLine.ts'
import { levelPeakFigure } from './levelPeak.ts'
import { loopMarginFigure } from './loopMargin.ts'
import { loopPolesFigure } from './loopPoles.ts'
import { loopRingFigure } from './loopRing.ts'
import { loopStabilityFigure } from './loopStability.ts'
import { shaperAliasFigure } from './shaperFigures.ts'
import type { CheckEntry, CheckFunction, CheckInput, Figure, FigureFunction } from './types.ts'

/** Checks whose words, working or mends cost more than their figure. The others are as cheap run whole. */
const FIGURES: { readonly [id: string]: FigureFunction | undefined } = {
  'loop.stability': loopStabilityFigure,
  'loop.margin': loopMarginFigure,
  'loop.poles': loopPolesFigure,
  'loop.ring': loopRingFigure,
  'level.peak': levelPeakFigure,
  'level.line': levelLineFigure,
  'shaper.alias': shaperAliasFigure,
}

/**
 * Status and value of one closed check for `input`, at a fraction of its whole cost where mends are dear (milliseconds against tens of them). Checks of one input
 * share their figures: pass the same object for all of them. Throws RangeError for a rendered check.
 */
export function closedFigure({ id, kind, run }: CheckEntry, input: CheckInput): Figure {
  if (kind !== 'closed') throw new RangeError(`${id} is a rendered check`)
  return (FIGURES[id] ?? (run as CheckFunction))(input)
}
