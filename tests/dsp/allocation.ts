// Runs allocationProbe.ts in a process of its own, with a new space so large that nothing is collected while it counts.
import { execFileSync } from 'node:child_process'
import { fileURLToPath } from 'node:url'

export interface Allocation {
  /** Bytes a block of 128 frames that stay on the heap until collected: four unlike sets, unchanged. */
  readonly steady: readonly number[]
  /** The same under every kind of live change. */
  readonly edited: number
  /** The same engine with one array of two numbers made a block. */
  readonly sloppy: number
}

export function measureAllocation(): Allocation {
  const probe = fileURLToPath(new URL('allocationProbe.ts', import.meta.url))
  const flags = ['--expose-gc', '--min-semi-space-size=64', '--max-semi-space-size=128', '--import', 'tsx']
  return JSON.parse(execFileSync(process.execPath, [...flags, probe], { encoding: 'utf8' })) as Allocation
}
