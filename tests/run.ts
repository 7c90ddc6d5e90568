// npm test: tools, types, lint, unit, outside references, the page in a browser. Runs every stage even when one
// fails and closes with the sum over all runners: "N passed, N failed". A missing tool skips what needs it with a
// message on a user's machine and fails when CI is set.
import { spawnSync } from 'node:child_process'
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs'
import os from 'node:os'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { TOOLS } from './tools.ts'

const top = path.dirname(path.dirname(fileURLToPath(import.meta.url)))
const bin = (name: string) => path.join(top, 'node_modules', '.bin', name)
const inCi = Boolean(process.env.CI)
const reports = mkdtempSync(path.join(os.tmpdir(), 'combwright-test-'))

let passed = 0
let failed = 0

function run(command: string, args: readonly string[], env: NodeJS.ProcessEnv = {}): boolean {
  return spawnSync(command, args, { cwd: top, stdio: 'inherit', env: { ...process.env, ...env } }).status === 0
}

function stage(title: string, good: boolean): void {
  process.stdout.write(`${good ? 'ok' : 'FAILED'}: ${title}\n`)
  if (good) passed += 1
  else failed += 1
}

/** Adds up a runner's own report; a runner that wrote none, or fails with every test passed, counts as one failure. */
function addReport(title: string, good: boolean, file: string, count: (report: unknown) => { passed: number; failed: number }): void {
  const sum = existsSync(file) ? count(JSON.parse(readFileSync(file, 'utf8'))) : { passed: 0, failed: 0 }
  passed += sum.passed
  failed += sum.failed
  if (!good && sum.failed === 0) failed += 1
  if (good && sum.passed === 0) failed += 1
  process.stdout.write(`${good ? 'ok' : 'FAILED'}: ${title}: ${sum.passed} passed, ${sum.failed} failed\n`)
}

function ensureTools(): void {
  const missing = TOOLS.filter((tool) => !tool.present())
  if (missing.length === 0) return
  const canInstall = process.getuid?.() === 0 && existsSync('/usr/bin/apt-get')
  if (canInstall) {
    const apt = ['-o', 'DPkg::Lock::Timeout=500']
    run('apt-get', [...apt, 'update', '-q'])
    run('apt-get', [...apt, 'install', '-y', '--no-install-recommends', ...missing.flatMap((tool) => tool.packages)], {
      DEBIAN_FRONTEND: 'noninteractive',
    })
  }
  for (const tool of TOOLS.filter((t) => !t.present())) {
    const how = `Debian: apt-get install ${tool.packages.join(' ')}; elsewhere: ${tool.otherwise}`
    process.stdout.write(`missing: ${tool.name} (${tool.what}). ${how}\n`)
    if (inCi) stage(`${tool.name} is there`, false)
  }
}

function vitest(title: string, args: readonly string[]): void {
  const file = path.join(reports, `${title.replaceAll(' ', '-')}.json`)
  const good = run(bin('vitest'), ['run', ...args, '--reporter=default', '--reporter=json', `--outputFile.json=${file}`])
  addReport(title, good, file, (report) => {
    const r = report as { numPassedTests: number; numFailedTests: number }
    return { passed: r.numPassedTests, failed: r.numFailedTests }
  })
}

function playwright(): void {
  const chromium = TOOLS.find((tool) => tool.name === 'Chromium')
  if (!chromium?.present()) {
    process.stdout.write('skipped: the page in a browser (no browser here)\n')
    return
  }
  const file = path.join(reports, 'e2e.json')
  const args = ['test', '--config', 'e2e/playwright.config.ts', '--reporter=list,json']
  const good = run(bin('playwright'), args, { PLAYWRIGHT_JSON_OUTPUT_NAME: file })
  addReport('the page in a browser', good, file, (report) => {
    const { stats } = report as { stats: { expected: number; unexpected: number; flaky: number } }
    return { passed: stats.expected, failed: stats.unexpected + stats.flaky }
  })
}

ensureTools()
for (const project of ['src', 'src/cli', 'app', 'tsconfig.json']) stage(`types of ${project}`, run(bin('tsc'), ['-p', project]))
stage('lint and format', run(bin('biome'), ['ci', '.']))
vitest('unit tests', ['--exclude', 'tests/outside/**'])
vitest('outside references', ['tests/outside'])
playwright()
rmSync(reports, { recursive: true, force: true })

process.stdout.write(`${passed} passed, ${failed} failed\n`)
process.exitCode = failed === 0 ? 0 : 1
