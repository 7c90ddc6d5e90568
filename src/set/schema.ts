// The shape of a set file, made from the parameter table. It fills in defaults and refuses unknown keys; what it finds
// wrong carries a Problem of ours, and schemaProblems.ts words the rest.
import * as z from 'zod/mini'
import { LIMITABLE_IDS } from './checkIds.ts'
import { defaultSet } from './defaults.ts'
import { type PointRule, pointProblems, SHAPER_POINTS, SWEEP_POINTS, TAPER_POINTS } from './drawnPoints.ts'
import { moveProblems } from './panelProblems.ts'
import type { Parameter } from './parameters/kinds.ts'
import { KNOB_NAME, KNOB_POSITION, KNOB_SMOOTH, KNOB_STEPS, MAX_KNOBS, MAX_MOVES, MOVE_TAPER } from './parameters/panel.ts'
import { PARAMETERS, parameter } from './parameters.ts'
import type { Problem } from './result.ts'
import type { Move, Point } from './types.ts'
import { valueProblem, valueText, withoutNull } from './valueProblem.ts'

/** What a check of ours hands on: the problem, its path (which starts its message) relative to where the check stands. */
export interface OwnParams {
  readonly problem: Problem
}

type Push = { issues: unknown[]; value: unknown }

function report({ issues, value }: Push, problems: readonly Problem[]): void {
  for (const problem of problems) issues.push({ code: 'custom', input: value, path: [], params: { problem } satisfies OwnParams })
}

/** One value judged by its row of the table. */
function value(p: Parameter) {
  return z.unknown().check((context: Push) => {
    const problem = valueProblem(p, context.value, '')
    if (problem) report(context, [problem])
  })
}

const field = (p: Parameter) => z._default(value(p), p.default)

function points(rule: PointRule) {
  const pair = z.tuple([z.number(), z.number()])
  const list = z.array(pair).check((context) => report(context as Push, pointProblems(context.value as Point[], rule, '', false)))
  return z._default(list, [])
}

/** The rows whose path is `prefix.field`, as a shape by field. */
function rows(prefix: string): Record<string, z.ZodMiniType> {
  const own = PARAMETERS.filter((p) => p.path.startsWith(prefix) && !p.path.slice(prefix.length).includes('.'))
  return Object.fromEntries(own.map((p) => [p.path.slice(prefix.length), field(p)]))
}

/** The shaper's fields in the file's order, `points` where DESIGN prints them. */
function shaper(path: string) {
  const { drive, ceiling, positive, negative, deadZone, ...table } = rows(`${path}.`)
  const curve = value(withoutNull(parameter(`${path}.curve`)))
  const { curve: _, ...rest } = table
  const shape = { curve, drive, ceiling, positive, negative, deadZone, points: points(SHAPER_POINTS), ...rest }
  return z._default(z.nullable(z.strictObject(shape as Record<string, z.ZodMiniType>)), null)
}

const group = (shape: Record<string, z.ZodMiniType>) => z.prefault(z.strictObject(shape), {})

const end = z.unknown().check((context: Push) => {
  if (!['number', 'string', 'boolean'].includes(typeof context.value)) report(context, [endProblem(context.value)])
})

function endProblem(found: unknown): Problem {
  const range = 'a value of the parameter it moves'
  return { path: '', message: ` must be ${range}, got ${valueText(found)}`, value: found, range }
}

const move = z
  .strictObject({ parameter: z.string(), min: end, max: end, taper: field(MOVE_TAPER), points: points(TAPER_POINTS) })
  .check((context) => report(context as Push, moveProblems(context.value as Move, '')))

const knob = z.strictObject({
  knob: value(KNOB_NAME),
  position: field(KNOB_POSITION),
  steps: field(KNOB_STEPS),
  smoothMs: field(KNOB_SMOOTH),
  moves: z.array(move).check(z.minLength(1), z.maxLength(MAX_MOVES)),
})

const limits = z.strictObject(Object.fromEntries(LIMITABLE_IDS.map((id) => [id, z.optional(z.number())])))

function sweep() {
  const { updateEvery, between, ...before } = rows('sweep.')
  return { ...before, points: points(SWEEP_POINTS), updateEvery, between } as Record<string, z.ZodMiniType>
}

export const SET_SCHEMA = z.strictObject({
  format: z.literal(defaultSet().format),
  version: z.number(),
  ...rows(''),
  input: group({ ...rows('input.'), shaper: shaper('input.shaper') }),
  line: group(rows('line.')),
  sweep: group(sweep()),
  voices: group(rows('voices.')),
  loop: group({ ...rows('loop.'), shaper: shaper('loop.shaper') }),
  mix: group({ ...rows('mix.'), shaper: shaper('mix.shaper') }),
  panel: z._default(z.array(knob).check(z.maxLength(MAX_KNOBS)), []),
  limits: z._default(limits, {}),
  target: group(rows('target.')),
})
