// Row 9: bytes that the engine allocates in the audio callback.
import { measureAllocation } from '../dsp/allocation.ts'
import type { Bench, Row } from './bench.ts'

/** Less than one boxed number, the smallest thing there is, in eight blocks. */
const NOTHING = 2

export const allocationBench: Bench = {
  id: 'allocation',
  title: 'Engine: allocation in the audio callback',
  async run(): Promise<Row[]> {
    const { steady, edited, sloppy } = measureAllocation()
    const most = Math.max(...steady)
    return [
      {
        what: 'row 9: playing, worst of four sets',
        value: most,
        unit: 'bytes a block',
        target: 'none',
        met: most < NOTHING,
        how: 'growth of the JavaScript heap over 6,400 blocks of 128 frames, least of up to sixty windows, no collection in between; what is left is the machine’s own compiling',
      },
      { what: 'row 9: playing under live changes of every kind', value: edited, unit: 'bytes a block', target: 'none', met: edited < 8 },
      {
        what: 'the same with one array of two numbers made a block, to show that the measure sees it',
        value: sloppy,
        unit: 'bytes a block',
      },
    ]
  },
}
