// The files of the project that the wall stands between: src and app as they lie on the disk.
import { readdirSync, readFileSync } from 'node:fs'
import path from 'node:path'
import type { Tree } from './wall.ts'

const SOURCE = /\.(ts|tsx|mts|cts|js|jsx|mjs|cjs)$/
const TOP_FILES = ['package.json']

/** Reads `src` and `app` under `top`. */
export function readTree(top: string): Tree {
  const names = ['src', 'app'].flatMap((folder) =>
    readdirSync(path.join(top, folder), { recursive: true, withFileTypes: true })
      .filter((entry) => entry.isFile())
      .map((entry) => path.relative(top, path.join(entry.parentPath, entry.name)).split(path.sep).join('/')),
  )
  return {
    sources: new Map(names.filter((name) => SOURCE.test(name)).map((name) => [name, readFileSync(path.join(top, name), 'utf8')])),
    others: new Set([...names.filter((name) => !SOURCE.test(name)), ...TOP_FILES]),
  }
}
