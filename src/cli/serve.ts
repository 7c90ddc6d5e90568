// npm start: builds the page and serves it with its policy headers on this machine only, until stopped.
//   --port N (default 4810, the next free one if taken)   --no-build serves what was built before
import { existsSync } from 'node:fs'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { parseArgs } from 'node:util'
import { build, preview } from 'vite'

const DEFAULT_PORT = 4810

const top = path.dirname(path.dirname(path.dirname(fileURLToPath(import.meta.url))))
const configFile = path.join(top, 'vite.config.ts')

function readPort(text: string): number {
  const port = Number(text)
  if (Number.isInteger(port) && port >= 1 && port <= 65535) return port
  process.stderr.write(`error: --port must be 1 to 65535, got ${text}\nhint: leave it out for ${DEFAULT_PORT}\n`)
  process.exit(2)
}

const { values } = parseArgs({ options: { port: { type: 'string' }, 'no-build': { type: 'boolean', default: false } } })
const port = values.port === undefined ? DEFAULT_PORT : readPort(values.port)

if (!values['no-build'] || !existsSync(path.join(top, 'dist', 'index.html'))) {
  process.stderr.write('Building the page …\n')
  await build({ configFile, logLevel: 'warn' })
}
const server = await preview({ configFile, logLevel: 'warn', preview: { port, host: 'localhost', strictPort: values.port !== undefined } })
const address = server.resolvedUrls?.local[0] ?? `http://localhost:${port}/`
process.stdout.write(`Combwright is at ${address}\n`)
process.stderr.write('Stop it with Ctrl+C.\n')
