// Problems of a panel: moves of what no knob can move, ends outside the parameter's range, tapers that do not fit their ends.
import { pointProblems, TAPER_POINTS } from './drawnPoints.ts'
import { isParameterPath, PARAMETERS, type Parameter, parameter } from './parameters.ts'
import { getAt } from './path.ts'
import type { Problem } from './result.ts'
import type { Knob, Move, ParameterSet } from './types.ts'
import { nearestHint, valueProblem, withoutNull } from './valueProblem.ts'

/** Can a knob move it? Everything audible, except what is fixed when the firmware is built. */
export function isMovable(p: Parameter): boolean {
  if (p.kind === 'text' || p.path.startsWith('target.')) return false
  return !/^(intent|sampleRate|layout)$|\.shaper\.(tableSize|tableRange|tableInterpolation|antialias)$/.test(p.path)
}

const MOVABLE_PATHS = PARAMETERS.filter(isMovable).map((p) => p.path)

export function panelProblems(set: ParameterSet): Problem[] {
  const movedBy = new Map<string, string>()
  return set.panel.flatMap((knob, k) =>
    knob.moves.flatMap((move, m) => {
      const path = `panel[${k}].moves[${m}]`
      const problems = moveProblems(move, path)
      if (problems.length > 0) return problems
      return [...clash(movedBy, knob, move, path), ...absentShaper(set, move, path)]
    }),
  )
}

/** Problems of one move by itself. `path` is where it stands. */
export function moveProblems(move: Move, path: string): Problem[] {
  const at = `${path}.parameter`
  const known = isParameterPath(move.parameter)
  if (!known || !isMovable(parameter(move.parameter))) {
    const hint = known ? 'a knob moves what is heard, not how the unit is built' : nearestHint(move.parameter, MOVABLE_PATHS)
    const what = known ? 'is fixed when the unit is built and cannot be moved by a knob' : 'is no parameter'
    return [
      {
        path: at,
        message: `${at} "${move.parameter}" ${what}`,
        value: move.parameter,
        range: MOVABLE_PATHS.join(', '),
        ...(hint && { hint }),
      },
    ]
  }
  const row = withoutNull(parameter(move.parameter))
  const ends = [valueProblem(row, move.min, `${path}.min`), valueProblem(row, move.max, `${path}.max`)].filter((p) => p !== null)
  return ends.length > 0 ? ends : taperProblems(move, row, path)
}

function taperProblems(move: Move, row: Parameter, path: string): Problem[] {
  const at = `${path}.taper`
  if (move.taper === 'drawn') return pointProblems(move.points, TAPER_POINTS, `${path}.points`, true)
  if (move.taper === 'linear') return pointProblems(move.points, TAPER_POINTS, `${path}.points`, false)
  if (row.kind !== 'number' && row.kind !== 'integer') {
    const message = `${at} must be linear or drawn for ${row.path}, which has no ratios, got "log"`
    return [{ path: at, message, value: 'log', range: 'linear, drawn' }]
  }
  if ((move.min as number) * (move.max as number) > 0) return []
  const range = 'min and max both above or both below zero'
  const message = `${at} "log" needs ${range}, got ${move.min} and ${move.max}`
  return [{ path: at, message, value: 'log', range, hint: 'use taper linear or drawn, or move min or max off zero' }]
}

function clash(movedBy: Map<string, string>, knob: Knob, move: Move, path: string): Problem[] {
  const other = movedBy.get(move.parameter)
  movedBy.set(move.parameter, knob.knob)
  if (other === undefined) return []
  const message = `${path}.parameter "${move.parameter}" is already moved by the knob "${other}"`
  return [{ path: `${path}.parameter`, message, value: move.parameter, hint: 'let one knob move it' }]
}

function absentShaper(set: ParameterSet, move: Move, path: string): Problem[] {
  const owner = /^(.*\.shaper)\./.exec(move.parameter)?.[1]
  if (owner === undefined || getAt(set, owner)) return []
  const message = `${path}.parameter "${move.parameter}" has no shaper to move: ${owner} is null`
  return [{ path: `${path}.parameter`, message, value: move.parameter, hint: `give ${owner} a curve` }]
}
