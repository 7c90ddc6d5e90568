// The checks that follow from formulas. Apart from the rendered ones, so that whoever follows a gesture need not carry those.
import { levelLine } from './levelLine.ts'
import { levelMono } from './levelMono.ts'
import { levelPeak } from './levelPeak.ts'
import { loopMargin } from './loopMargin.ts'
import { loopPoles } from './loopPoles.ts'
import { loopRing } from './loopRing.ts'
import { loopStability } from './loopStability.ts'
import { responseExtremes } from './responseExtremes.ts'
import { shaperAlias } from './shaperAlias.ts'
import { shaperHarmonics } from './shaperHarmonics.ts'
import { sweepDetune } from './sweepDetune.ts'
import { sweepFusion } from './sweepFusion.ts'
import { sweepRange } from './sweepRange.ts'
import { toneDroop } from './toneDroop.ts'
import type { CheckEntry, CheckFunction } from './types.ts'

export interface ClosedEntry extends CheckEntry {
  readonly kind: 'closed'
  readonly run: CheckFunction
}

export const CLOSED_CHECKS: readonly ClosedEntry[] = [
  { id: 'loop.stability', kind: 'closed', run: loopStability },
  { id: 'loop.margin', kind: 'closed', run: loopMargin },
  { id: 'loop.poles', kind: 'closed', run: loopPoles },
  { id: 'loop.ring', kind: 'closed', run: loopRing },
  { id: 'response.extremes', kind: 'closed', run: responseExtremes },
  { id: 'sweep.range', kind: 'closed', run: sweepRange },
  { id: 'sweep.detune', kind: 'closed', run: sweepDetune },
  { id: 'sweep.fusion', kind: 'closed', run: sweepFusion },
  { id: 'tone.droop', kind: 'closed', run: toneDroop },
  { id: 'level.peak', kind: 'closed', run: levelPeak },
  { id: 'level.line', kind: 'closed', run: levelLine },
  { id: 'level.mono', kind: 'closed', run: levelMono },
  { id: 'shaper.harmonics', kind: 'closed', run: shaperHarmonics },
  { id: 'shaper.alias', kind: 'closed', run: shaperAlias },
]
