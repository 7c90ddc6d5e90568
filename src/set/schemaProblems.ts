// What the schema found, in our words: full path, value, range, hint; in the order of the document, each place once.
import type { core } from 'zod/mini'
import { defaultSet, defaultShaper } from './defaults.ts'
import { type PointRule, pointRangeText, SHAPER_POINTS, SWEEP_POINTS, TAPER_POINTS } from './drawnPoints.ts'
import { limitProblems } from './limitKeys.ts'
import { MAX_KNOBS, MAX_MOVES } from './parameters/panel.ts'
import { PARAMETERS } from './parameters.ts'
import type { Problem } from './result.ts'
import type { OwnParams } from './schema.ts'
import { nearestHint, valueText } from './valueProblem.ts'

type Keys = readonly PropertyKey[]

export function schemaProblems(json: unknown, issues: readonly core.$ZodIssue[]): Problem[] {
  const order = documentOrder(json)
  const rank = (path: string) => order.get(path) ?? order.get(path.replace(/\.[^.[]*$/, '')) ?? Number.POSITIVE_INFINITY
  const seen = new Set<string>()
  return issues
    .flatMap((issue) => toProblems(json, issue))
    .filter(({ path }) => !seen.has(path) && seen.add(path))
    .sort((a, b) => compare(rank(a.path), rank(b.path)))
}

// Infinity − Infinity is no number, so the ranks are compared, not subtracted.
const compare = (a: number, b: number) => (a === b ? 0 : a < b ? -1 : 1)

function toProblems(json: unknown, issue: core.$ZodIssue): Problem[] {
  const path = pathText(issue.path)
  if (issue.code === 'unrecognized_keys') return issue.keys.map((key) => unknownKey(json, issue.path, key))
  const own = issue.code === 'custom' ? (issue.params as OwnParams | undefined)?.problem : undefined
  if (own) return [{ ...own, path: path + own.path, message: path + own.message }]
  const point = pointIssue(json, issue.path)
  if (point) return [point]
  const found = valueAt(json, issue.path)
  if (issue.path[0] === 'limits' && issue.path.length === 2) return limitProblems({ [String(issue.path[1])]: found })
  const range = structureText(issue.path)
  const got = range.startsWith('a list') && Array.isArray(found) ? String(found.length) : valueText(found)
  return [{ path, message: `${path} must be ${range}, got ${got}`, value: found, range }]
}

/** What a place that is no parameter must hold. */
function structureText(path: Keys): string {
  const last = path.at(-1)
  if (last === 'panel') return `a list of at most ${MAX_KNOBS} knobs`
  if (last === 'moves') return `a list of 1 to ${MAX_MOVES} moves`
  if (last === 'points') return 'a list of points'
  if (last === 'parameter') return 'the path of a parameter'
  return last === 'shaper' ? 'an object, or null' : 'an object'
}

function pointIssue(json: unknown, path: Keys): Problem | null {
  const at = path.indexOf('points')
  if (at < 0 || path.length <= at + 1) return null
  const place = path.slice(0, at + 2)
  const text = pathText(place)
  const found = valueAt(json, place)
  const range = pointRangeText(ruleAt(path))
  return { path: text, message: `${text} must be ${range}, got ${valueText(found)}`, value: found, range }
}

function ruleAt(path: Keys): PointRule {
  if (path[0] === 'sweep') return SWEEP_POINTS
  return path[0] === 'panel' ? TAPER_POINTS : SHAPER_POINTS
}

function unknownKey(json: unknown, holder: Keys, key: string): Problem {
  const found = valueAt(json, [...holder, key])
  if (holder[0] === 'limits') return limitProblems({ [key]: found })[0] as Problem
  const path = pathText([...holder, key.length > 60 ? `${key.slice(0, 59)}…` : key])
  const known = knownKeys(holder)
  const elsewhere = PARAMETERS.find((p) => p.path.endsWith(`.${key}`))?.path
  const hint = nearestHint(key, known) ?? (elsewhere ? `did you mean "${elsewhere}"?` : `known keys here are ${known.join(', ')}`)
  return { path, message: `${path} is an unknown key`, value: found, range: known.join(', '), hint }
}

function knownKeys(holder: Keys): readonly string[] {
  if (holder.at(-1) === 'shaper') return Object.keys(defaultShaper('tanh'))
  if (holder[0] === 'panel') return holder.includes('moves') ? ['parameter', 'min', 'max', 'taper', 'points'] : KNOB_KEYS
  return Object.keys(holder.length === 0 ? defaultSet() : (valueAt(defaultSet(), holder) as object))
}

const KNOB_KEYS = ['knob', 'position', 'steps', 'smoothMs', 'moves']

function valueAt(json: unknown, path: Keys): unknown {
  return path.reduce<unknown>(
    (at, key) => (at !== null && typeof at === 'object' && Object.hasOwn(at, key) ? (at as Record<PropertyKey, unknown>)[key] : undefined),
    json,
  )
}

function pathText(path: Keys): string {
  return path.reduce<string>(
    (text, key) => (typeof key === 'number' ? `${text}[${key}]` : text === '' ? String(key) : `${text}.${String(key)}`),
    '',
  )
}

/** Every path of the document with its place in it. */
function documentOrder(json: unknown): ReadonlyMap<string, number> {
  const order = new Map<string, number>()
  const visit = (value: unknown, path: Keys) => {
    order.set(pathText(path), order.size)
    if (Array.isArray(value))
      value.forEach((element, i) => {
        visit(element, [...path, i])
      })
    else if (value !== null && typeof value === 'object')
      for (const key of Object.keys(value)) visit((value as Record<string, unknown>)[key], [...path, key])
  }
  visit(json, [])
  return order
}
