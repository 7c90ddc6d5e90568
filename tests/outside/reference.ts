// References made by somebody else's code: tests/outside/NAME.py prints JSON, NAME.json is that JSON as committed. Reading it needs no
// Python; making it again needs Debian's python3 with numpy and scipy, and a difference fails.
import { spawnSync } from 'node:child_process'
import { readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { expect, it } from 'vitest'
import { hasScipy, PYTHON } from '../tools.ts'

const at = (file: string) => fileURLToPath(new URL(file, import.meta.url))

/** The committed reference. */
export function reference<T>(name: string): T {
  return JSON.parse(readFileSync(at(`${name}.json`), 'utf8')) as T
}

/** A test that the committed reference is what its script makes: same shape, numbers within `relative` of each other (other machines round the last place of sin and exp differently). */
export function itIsMadeAgain(name: string, relative = 1e-11): void {
  it(`${name}.json is what ${name}.py makes`, { timeout: 300000 }, (context) => {
    if (!hasScipy()) {
      const reason = `${PYTHON} with numpy and scipy is not there, so ${name}.py was not run`
      if (process.env.CI) throw new Error(reason)
      console.log(reason)
      context.skip()
    }
    const run = spawnSync(PYTHON, [at(`${name}.py`)], { encoding: 'utf8', maxBuffer: 1 << 28 })
    expect(run.status, run.stderr).toBe(0)
    expectAlike(JSON.parse(run.stdout), reference(name), relative, name)
  })
}

function expectAlike(made: unknown, kept: unknown, relative: number, path: string): void {
  if (typeof made === 'number' && typeof kept === 'number') {
    const scale = Math.max(Math.abs(made), Math.abs(kept), 1e-3)
    if (Math.abs(made - kept) > relative * scale) throw new Error(`${path}: made ${made}, committed ${kept}`)
  } else if (made !== null && kept !== null && typeof made === 'object' && typeof kept === 'object') {
    expect(Object.keys(made), path).toEqual(Object.keys(kept))
    for (const key of Object.keys(kept)) {
      expectAlike((made as Record<string, unknown>)[key], (kept as Record<string, unknown>)[key], relative, `${path}.${key}`)
    }
  } else {
    expect(made, path).toBe(kept)
  }
}
