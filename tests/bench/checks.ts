// Row 7: what judging a set takes: its closed-form checks, its rendered ones, and its whole panel.
import { readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { panelBoxSteps } from '../../src/checks/panelBox.ts'
import { checkSteps } from '../../src/checks/registry.ts'
import { DEMO_SETS } from '../../src/set/demoSets.ts'
import { readSet } from '../../src/set/read.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import type { Bench, Row } from './bench.ts'

const PUBLIC = new URL('../../public/', import.meta.url)

function demoSets(): ParameterSet[] {
  return DEMO_SETS.map(({ file }) => {
    const read = readSet(readFileSync(fileURLToPath(new URL(file.replace(/^\//, ''), PUBLIC)), 'utf8'))
    if (!read.ok) throw new Error(`${file}: ${read.problems[0]?.message}`)
    return read.value
  })
}

interface Taken {
  readonly ms: number
  /** Longest time between two steps: how long a message waits. */
  readonly slice: number
}

function taken(steps: Generator<unknown, unknown>): Taken {
  const spent = process.cpuUsage()
  const began = performance.now()
  let last = began
  let slice = 0
  for (let done = false; !done; ) {
    done = steps.next().done === true
    const now = performance.now()
    slice = Math.max(slice, now - last)
    last = now
  }
  const { user, system } = process.cpuUsage(spent)
  // One thread works: where neighbours take the processor, its own time says more than the clock's.
  return { ms: Math.min(last - began, (user + system) / 1000), slice }
}

const middle = (values: readonly number[]): number => [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)] as number

/** Median of several runs, after one to warm up. */
function median(runs: number, make: () => Generator<unknown, unknown>): Taken {
  taken(make())
  const all = Array.from({ length: runs }, () => taken(make()))
  return { ms: middle(all.map(({ ms }) => ms)), slice: middle(all.map(({ slice }) => slice)) }
}

interface Measured {
  readonly name: string
  readonly closed: Taken
  readonly rendered: Taken
  readonly box: Taken
  readonly closedBox: Taken
}

const measured = (set: ParameterSet): Measured => ({
  name: set.name,
  closed: median(9, () => checkSteps(set, { kinds: ['closed'] })),
  rendered: median(3, () => checkSteps(set, { kinds: ['rendered'] })),
  box: median(3, () => panelBoxSteps(set)),
  closedBox: median(5, () => panelBoxSteps(set, { kinds: ['closed'] })),
})

type Part = 'closed' | 'rendered' | 'box' | 'closedBox'
const worst = (all: readonly Measured[], part: Part): Measured => all.reduce((a, b) => (b[part].ms > a[part].ms ? b : a))

function row(all: readonly Measured[], part: Part, what: string, most: number | null): Row {
  const slowest = worst(all, part)
  const each = all.map((set) => `${set.name} ${set[part].ms.toPrecision(3)}`).join(', ')
  return {
    what: `row 7: ${what}, slowest of the demo sets`,
    value: slowest[part].ms,
    unit: 'ms',
    ...(most !== null && { target: `≤ ${most < 1000 ? `${most} ms` : `${most / 1000} s`}`, met: slowest[part].ms <= most }),
    how: `median of several runs, processor or clock time, whichever is less, ms: ${each}; the longest step, ${Math.max(...all.map((set) => set[part].slice)).toPrecision(2)} ms, is how long a message waits in its worker`,
  }
}

export const checksBench: Bench = {
  id: 'checks',
  title: 'Checks: closed-form, rendered, over the whole panel',
  async run(): Promise<Row[]> {
    const all = demoSets().map(measured)
    return [
      row(all, 'closed', 'closed-form checks', 50),
      row(all, 'rendered', 'rendered checks', 1500),
      row(all, 'box', 'panel box, rendered checks at its worst corners included', 1500),
      row(all, 'closedBox', 'panel box, closed-form checks alone', null),
      {
        what: 'panel box, closed-form, against the same checks once: median of the demo sets',
        value: middle(all.map(({ closed, closedBox }) => closedBox.ms / closed.ms)),
        unit: '×',
        how: 'how many runs of the checks the search over all positions is worth',
      },
    ]
  },
}
