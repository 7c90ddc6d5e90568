import { spawnSync } from 'node:child_process'
import { describe, expect, it } from 'vitest'

// A nursery larger than the whole run could fill: no collection hides what was left behind.
const FLAGS = ['--expose-gc', '--max-semi-space-size=64', '--min-semi-space-size=64', '--import', 'tsx']

// Design 13, row 9: none. One number boxed in every quantum would be 12 bytes or more; a few bytes are what code that runs seldom leaves while
// it is still interpreted, and what the measuring itself takes (seen: 0.1 to 6).
const STEADY_BYTES = 12
// Edits and resets run code that is never hot: the engine interprets it, and its interpreter boxes every fraction it holds (seen: 35). An array or a
// closure made for each sample would be a thousand or more.
const EVENTFUL_BYTES = 64

describe('the audio callback', () => {
  const run = spawnSync(process.execPath, [...FLAGS, new URL('heapProbe.ts', import.meta.url).pathname], { encoding: 'utf8' })
  const left = JSON.parse(run.stdout || '{}') as Record<string, number>

  it('runs the probe', () => {
    expect(run.stderr).toBe('')
    expect(Object.keys(left).length).toBe(5)
  })

  it.each(Object.entries(left))('%s: %s bytes a quantum stay behind', (name, bytes) => {
    expect(bytes).toBeLessThan(/guard|edits/.test(name) ? EVENTFUL_BYTES : STEADY_BYTES)
  })
})
