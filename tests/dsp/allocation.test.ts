// The engine allocates nothing in the audio callback. Bytes a block of 128 frames, measured on the JavaScript heap.
import { beforeAll, expect, it } from 'vitest'
import { type Allocation, measureAllocation } from './allocation.ts'

let measured: Allocation

beforeAll(() => {
  measured = measureAllocation()
}, 300000)

/** The smallest thing V8 can allocate is a boxed number, 16 bytes: less than one in eight blocks is what its own compiling leaves. */
const NOTHING = 2

it('playing a set', () => {
  for (const bytes of measured.steady) expect(bytes).toBeLessThan(NOTHING)
})

it('playing while sets, bypass, held positions and the way of changing delays are switched', () => {
  // Code that runs once a change is not always compiled yet, and then boxes numbers; a block without a change makes none.
  expect(measured.edited).toBeLessThan(8)
})

it('the measure sees one small array a block', () => {
  expect(measured.sloppy).toBeGreaterThan(100)
})
