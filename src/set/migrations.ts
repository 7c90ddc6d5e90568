// Older set files, brought up to the present version one step at a time. Steps are numbered without gaps, which is checked at load.
import { bad, good, type Problem, type Result } from './result.ts'
import { valueText } from './valueProblem.ts'

type Json = Record<string, unknown>

export interface Migration {
  /** The version it makes: 2, 3, … without gaps. */
  readonly to: number
  /** The document one version on; `version` itself is set for it. It must not change its argument. */
  readonly up: (older: Json) => Json
}

const FIRST_VERSION = 1

/** Version 1 is the first there is. */
const MIGRATIONS: readonly Migration[] = checkedMigrations([])

export const CURRENT_VERSION = FIRST_VERSION + MIGRATIONS.length

/** The list itself. Throws RangeError when its numbers are not 2, 3, 4, … */
export function checkedMigrations(list: readonly Migration[]): readonly Migration[] {
  list.forEach(({ to }, i) => {
    if (to !== FIRST_VERSION + 1 + i) throw new RangeError(`migration ${i + 1} must make version ${FIRST_VERSION + 1 + i}, makes ${to}`)
  })
  return list
}

/** A document of any known version as one of the newest. Refuses a version that is none, and names one that is newer. */
export function migrate(json: Json, migrations: readonly Migration[] = MIGRATIONS): Result<Json> {
  const newest = FIRST_VERSION + checkedMigrations(migrations).length
  const version = json.version
  if (!Number.isInteger(version) || (version as number) < FIRST_VERSION) return bad(badVersion(version, newest))
  if ((version as number) > newest) return bad(newerVersion(version as number, newest))
  const steps = migrations.slice((version as number) - FIRST_VERSION)
  return good(steps.reduce((older, { to, up }) => ({ ...up(older), version: to }), json))
}

const versions = (newest: number, before = '') => (newest === FIRST_VERSION ? `${FIRST_VERSION}` : `${before}${FIRST_VERSION} to ${newest}`)

function badVersion(value: unknown, newest: number): Problem {
  const range = versions(newest, 'a whole number from ')
  return { path: 'version', message: `version must be ${range}, got ${valueText(value)}`, value, range, hint: `write "version": ${newest}` }
}

function newerVersion(value: number, newest: number): Problem {
  const range = versions(newest)
  const message = `version ${value} is newer than this reader, which knows ${range}`
  return { path: 'version', message, value, range, hint: 'read it with the release that wrote it, or a later one' }
}
