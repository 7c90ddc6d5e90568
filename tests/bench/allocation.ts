import type { Bench } from './bench.ts'

export const allocationBench: Bench = { id: 'allocation', title: 'x', run: async () => [] }
