// The parameter table as text, for --help: path, range, default, what it does.
import { KNOB_NAME, KNOB_POSITION, KNOB_SMOOTH, KNOB_STEPS, MAX_KNOBS, MAX_MOVES, MOVE_TAPER } from '../set/parameters/panel.ts'
import type { Parameter } from '../set/parameters.ts'
import { MAX_POINTS, PARAMETERS } from '../set/parameters.ts'
import { rangeText } from '../set/valueProblem.ts'

/** Shapers are the same in all three places and listed once. */
export function parameterHelp(): string {
  const shaperRow = /^(input|loop|mix)\.shaper\./
  const rows = PARAMETERS.filter((p) => !shaperRow.test(p.path))
  const shaper = PARAMETERS.filter((p) => p.path.startsWith('input.shaper.')).map((p) => ({ ...p, path: p.path.replace('input.', '') }))
  const panel = [KNOB_NAME, KNOB_POSITION, KNOB_STEPS, KNOB_SMOOTH].map((p) => ({ ...p, path: `panel[].${p.path}` }))
  const taper = { ...MOVE_TAPER, path: `panel[].moves[].${MOVE_TAPER.path}` }
  return [
    '',
    'Parameters of a set file: path, accepted values, [default]',
    ...rows.map(parameterLine),
    '',
    'Shapers: input.shaper, loop.shaper and mix.shaper, each null or',
    ...shaper.map(parameterLine),
    '',
    `Panel: up to ${MAX_KNOBS} knobs of up to ${MAX_MOVES} moves, each from min to max of one parameter`,
    ...[...panel, taper].map(parameterLine),
    '',
    `Points of drawn curves: 2 to ${MAX_POINTS} pairs; sweep [phase, s], shaper [t, k], taper [position, part]`,
    'Limits: a number by the id of a check, as the check command lists them',
  ].join('\n')
}

function parameterLine(p: Parameter): string {
  const value = p.kind === 'text' ? JSON.stringify(p.default) : String(p.default)
  return `  ${p.path}\n      ${rangeText(p)} [${value}]\n      ${p.help}`
}
