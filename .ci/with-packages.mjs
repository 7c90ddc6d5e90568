// Runs one of the project's TypeScript entries on a fresh checkout: installs the packages of the lock file when
// they are missing or older than it, then imports the entry through tsx in this process. Plain JavaScript with
// nothing but Node, because nothing else is there yet. Standard output stays the entry's own.
//
//   node .ci/with-packages.mjs ENTRY.ts [arguments…]
import { spawnSync } from 'node:child_process'
import { existsSync, statSync } from 'node:fs'
import path from 'node:path'
import { fileURLToPath, pathToFileURL } from 'node:url'

const top = path.dirname(path.dirname(fileURLToPath(import.meta.url)))
const lock = path.join(top, 'package-lock.json')
const installed = path.join(top, 'node_modules', '.package-lock.json')

const [major = 0, minor = 0] = process.versions.node.split('.').map(Number)
if (major < 20 || (major === 20 && minor < 19)) {
  process.stderr.write(
    `error: Combwright needs Node 20.19 or later, this is ${process.versions.node}\nhint: install a current Node and run the command again\n`,
  )
  process.exit(2)
}

if (!existsSync(installed) || statSync(installed).mtimeMs < statSync(lock).mtimeMs) {
  process.stderr.write('Installing packages (once per checkout) …\n')
  const npm = spawnSync('npm', ['ci', '--no-audit', '--no-fund'], {
    cwd: top,
    stdio: ['ignore', 2, 2],
    shell: process.platform === 'win32',
  })
  if (npm.status !== 0) {
    process.stderr.write(
      'error: the packages could not be installed\nhint: see what npm says above; npm ci in the checkout does the same step\n',
    )
    process.exit(2)
  }
}

const [entry, ...rest] = process.argv.slice(2)
if (!entry) {
  process.stderr.write('error: no entry given\nhint: node .ci/with-packages.mjs ENTRY.ts\n')
  process.exit(2)
}
const file = path.resolve(top, entry)
process.argv = [process.argv[0], file, ...rest]
const { register } = await import('tsx/esm/api')
register()
await import(pathToFileURL(file).href)
