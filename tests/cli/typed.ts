// Commands as a user types them: a process of its own, in a folder of its own.
import { spawn } from 'node:child_process'
import { mkdtempSync, readdirSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { build } from 'vite'

const top = fileURLToPath(new URL('../../', import.meta.url))
const source = path.join(top, 'src', 'cli', 'main.ts')
// Through tsx itself and not the script that npm starts: that one may install packages, which a test must not.
const FROM_SOURCE = [path.join(top, 'node_modules', 'tsx', 'dist', 'cli.mjs'), source]

export const demoSet = (id: string): string => path.join(top, 'public', 'sets', `${id}.set.json`)

/**
 * The command in one file, its source compiled once: dozens of commands start in the time that three take from source. Returns the words to
 * start it with, for `typed`.
 */
export async function compiledCommand(folder: string): Promise<readonly string[]> {
  const outDir = path.join(folder, 'compiled')
  await build({
    configFile: false,
    logLevel: 'error',
    root: top,
    publicDir: false,
    ssr: { noExternal: true },
    build: { ssr: source, outDir, minify: false, target: 'node20', rollupOptions: { output: { entryFileNames: 'main.mjs' } } },
  })
  return [path.join(outDir, 'main.mjs')]
}

export interface Typed {
  readonly code: number | null
  readonly stdout: string
  readonly stderr: string
}

export interface TypedOptions {
  readonly env?: NodeJS.ProcessEnv
  /** From compiledCommand; from source when absent. */
  readonly command?: readonly string[]
  /** Called with the process once it runs, to interrupt it or close its pipe. */
  readonly meanwhile?: (child: ReturnType<typeof spawn>) => void
}

/** Runs `combwright words…` in `folder` to its end. */
export function typed(
  folder: string,
  words: readonly string[],
  { env, command = FROM_SOURCE, meanwhile }: TypedOptions = {},
): Promise<Typed> {
  // The test run's own npm must not leak into the command.
  const { INIT_CWD: _, npm_lifecycle_event: __, ...rest } = process.env
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, [...command, ...words], { cwd: folder, env: { ...rest, ...env } })
    let stdout = ''
    let stderr = ''
    child.stdout.on('data', (chunk) => {
      stdout += chunk
    })
    child.stderr.on('data', (chunk) => {
      stderr += chunk
    })
    child.on('error', reject)
    child.on('close', (code, signal) => resolve({ code: code ?? (signal === 'SIGINT' ? 130 : null), stdout, stderr }))
    meanwhile?.(child)
  })
}

/** A folder for one test file; `clear` removes it. */
export function workFolder(): { readonly folder: string; readonly files: () => string[]; readonly clear: () => void } {
  const folder = mkdtempSync(path.join(tmpdir(), 'combwright-cli-'))
  return { folder, files: () => readdirSync(folder).sort(), clear: () => rmSync(folder, { recursive: true, force: true }) }
}
