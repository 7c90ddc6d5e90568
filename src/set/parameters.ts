// The one table of parameters. Schema, messages, fields, command-line help, docs, the flat audio message
// and (later) the C header are made from it. A number that limits a parameter stands here only. Defaults are
// those a file gets for what it leaves out. One file a group of the signal path, in the path's order.
import { INPUT_AND_LINE_PARAMETERS } from './parameters/inputAndLine.ts'
import type { Parameter } from './parameters/kinds.ts'
import { LOOP_PARAMETERS } from './parameters/loop.ts'
import { MIX_PARAMETERS } from './parameters/mix.ts'
import { SWEEP_AND_VOICES_PARAMETERS } from './parameters/sweepAndVoices.ts'
import { TARGET_PARAMETERS } from './parameters/target.ts'
import { WHOLE_PARAMETERS } from './parameters/whole.ts'

export type { BooleanParameter, ChoiceParameter, NumberParameter, Parameter, TextParameter } from './parameters/kinds.ts'

export const PARAMETERS: readonly Parameter[] = [
  ...WHOLE_PARAMETERS,
  ...INPUT_AND_LINE_PARAMETERS,
  ...SWEEP_AND_VOICES_PARAMETERS,
  ...LOOP_PARAMETERS,
  ...MIX_PARAMETERS,
  ...TARGET_PARAMETERS,
]

const byPath = new Map(PARAMETERS.map((p) => [p.path, p]))

/** The table's entry for a path. Throws RangeError for a path that is not in the table (a mistake of ours). */
export function parameter(path: string): Parameter {
  const found = byPath.get(path)
  if (!found) throw new RangeError(`no parameter has the path ${path}`)
  return found
}

export const isParameterPath = (path: string): boolean => byPath.has(path)

/** A drawn curve has 2 to 64 points; one that is not drawn may keep its points or have none. */
export const MAX_POINTS = 64
