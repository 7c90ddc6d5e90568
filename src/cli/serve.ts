// npm start: builds the page and serves it with its policy headers on this machine only, until stopped.
//   npm start -- [--port N] [--no-build]
import { existsSync } from 'node:fs'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { parseArgs } from 'node:util'
import { build, type PreviewServer, preview } from 'vite'
import { readNumberOption } from './arguments.ts'
import { EXIT_BAD_USE, fail, lowerFirst, printFailure } from './failure.ts'
import { talk } from './output.ts'

const DEFAULT_PORT = 4810
const PORT = { name: '--port', unit: '', min: 1, max: 65535, whole: true, hint: `leave it out for ${DEFAULT_PORT}` }
const USAGE = `Usage: npm start -- [options]

Builds the page and serves it to this machine until stopped.

  --port N     at this port (${DEFAULT_PORT}, or the next free one, when not given)
  --no-build   serve what was built before
  --help       print this help
`

const top = path.dirname(path.dirname(path.dirname(fileURLToPath(import.meta.url))))
const configFile = path.join(top, 'vite.config.ts')

function readWords() {
  try {
    return parseArgs({ options: { port: { type: 'string' }, 'no-build': { type: 'boolean' }, help: { type: 'boolean' } } }).values
  } catch (error) {
    const [said = ''] = (error as Error).message.split('. ')
    return fail(lowerFirst(said), "'npm start -- --help' shows how it is used")
  }
}

async function buildPage(): Promise<void> {
  talk('Building the page …')
  try {
    await build({ configFile, logLevel: 'warn' })
  } catch (error) {
    fail(`the page could not be built: ${(error as Error).message}`, 'npm test says what is wrong with the source')
  }
}

async function servePage(typedPort: number | undefined): Promise<PreviewServer> {
  const port = typedPort ?? DEFAULT_PORT
  try {
    return await preview({ configFile, logLevel: 'warn', preview: { port, host: 'localhost', strictPort: typedPort !== undefined } })
  } catch (error) {
    return fail(lowerFirst((error as Error).message), 'give another --port, or leave it out')
  }
}

async function start(): Promise<void> {
  const words = readWords()
  if (words.help) return void process.stdout.write(USAGE)
  const port = words.port === undefined ? undefined : readNumberOption(words.port, PORT)
  if (!words['no-build'] || !existsSync(path.join(top, 'dist', 'index.html'))) await buildPage()
  const server = await servePage(port)
  const address = server.resolvedUrls?.local[0] ?? `http://localhost:${port ?? DEFAULT_PORT}/`
  process.stdout.write(`Combwright is at ${address}\n`)
  talk('Stop it with Ctrl+C.')
}

try {
  await start()
} catch (error) {
  printFailure(error)
  process.exitCode = EXIT_BAD_USE
}
