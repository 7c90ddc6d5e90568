// npm run bench: runs the bench modules one after another and prints their figures beside the targets of the design's speed table.
// `-- ID …` runs only those named; `-- --write` renews RESULTS.md, which needs all of them. What counts is ratios taken inside one run.
import { execFileSync } from 'node:child_process'
import { writeFileSync } from 'node:fs'
import os from 'node:os'
import { fileURLToPath } from 'node:url'
import type { Bench, Row } from './bench.ts'

/** Loaded only when they run: what a bench needs, a browser or a bundler, would slow the one beside it. */
const BENCHES: Readonly<Record<string, () => Promise<Bench>>> = {
  engine: async () => (await import('./engine.ts')).engineBench,
  allocation: async () => (await import('./allocation.ts')).allocationBench,
  checks: async () => (await import('./checks.ts')).checksBench,
  'page-worklet': async () => (await import('./page-worklet.ts')).pageWorklet,
  'page-worklet-live': async () => (await import('./page-worklet-live.ts')).pageWorkletLive,
  'page-frame': async () => (await import('./page-frame.ts')).pageFrame,
  'page-size': async () => (await import('./page-size.ts')).pageSize,
}

interface Outcome {
  readonly title: string
  readonly rows: readonly Row[]
  /** Why nothing was measured. */
  readonly reason?: string
}

async function outcomeOf(bench: Bench): Promise<Outcome> {
  const { title } = bench
  try {
    return { title, rows: await bench.run() }
  } catch (error) {
    return { title, rows: [], reason: error instanceof Error ? (error.message.split('\n')[0] ?? '') : String(error) }
  }
}

function table(rows: readonly Row[]): string {
  const cells = [['what', 'figure', 'target', 'met'], ...rows.map(cellsOf)]
  const widths = cells[0]!.map((_, i) => Math.max(...cells.map((row) => row[i]!.length)))
  const line = (row: readonly string[]) => `| ${row.map((cell, i) => cell.padEnd(widths[i]!)).join(' | ')} |`
  return [line(cells[0]!), `|${widths.map((w) => '-'.repeat(w + 2)).join('|')}|`, ...cells.slice(1).map(line)].join('\n')
}

function cellsOf({ what, value, unit, target = '', met }: Row): string[] {
  const digits = Math.abs(value) < 100 ? 3 : 4
  return [what, `${Number(value.toPrecision(digits))} ${unit}`.trim(), target, met === undefined ? '' : met ? 'yes' : 'no']
}

function section({ title, rows, reason }: Outcome): string {
  if (reason !== undefined) return `## ${title}\n\nNot measured: ${reason}\n`
  const hows = rows.filter((row) => row.how).map((row) => `- ${row.what}: ${row.how}`)
  return `## ${title}\n\n${table(rows)}\n${hows.length > 0 ? `\n${hows.join('\n')}\n` : ''}`
}

function machine(): string {
  const compiler = (() => {
    try {
      return execFileSync('gcc', ['--version'], { encoding: 'utf8' }).split('\n')[0]
    } catch {
      return 'no gcc'
    }
  })()
  return `${os.cpus()[0]?.model ?? 'unknown processor'}, ${os.cpus().length} cores, Node ${process.version}, ${compiler}`
}

function results(outcomes: readonly Outcome[]): string {
  return `# Speed and memory

Written by \`npm run bench -- --write\`; rows and targets are those of the design's speed table. Ratios taken in one run travel from
machine to machine, times do not.

Machine: ${machine()}.

${outcomes.map(section).join('\n')}`
}

function fail(message: string, hint: string): never {
  process.stderr.write(`error: ${message}\nhint: ${hint}\n`)
  process.exit(2)
}

const names = process.argv.slice(2).filter((word) => word !== '--write')
const write = process.argv.includes('--write')
const ids = Object.keys(BENCHES)
const unknown = names.find((name) => !ids.includes(name))
if (unknown !== undefined) fail(`no bench is called ${unknown}`, `there are ${ids.join(', ')}`)
if (write && names.length > 0) fail('--write needs all benches', 'leave the names out')

const outcomes: Outcome[] = []
for (const [id, load] of Object.entries(BENCHES)) {
  if (names.length > 0 && !names.includes(id)) continue
  process.stderr.write(`running ${id} …\n`)
  const outcome = await outcomeOf(await load())
  outcomes.push(outcome)
  process.stdout.write(`${section(outcome)}\n`)
}
if (write) writeFileSync(fileURLToPath(new URL('RESULTS.md', import.meta.url)), results(outcomes))
