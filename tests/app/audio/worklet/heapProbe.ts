// Run by heap.test.ts in a process of its own: node --expose-gc --import tsx heapProbe.ts
// Prints, for each way of playing, the bytes of JavaScript heap that one quantum of `render` leaves behind, over many quanta after warming up.
import { type Audition, createAudition, receive, render } from '../../../../app/audio/worklet/audition.ts'
import type { Settings } from '../../../../app/audio/worklet/messages.ts'
import { defaultSet } from '../../../../src/set/defaults.ts'
import { flatten } from '../../../../src/set/flat.ts'
import { withAt } from '../../../../src/set/path.ts'
import type { ParameterSet } from '../../../../src/set/types.ts'
import { LISTENER } from './listener.ts'

const FS = 48_000
const QUANTUM = 128
const fields = (list: Readonly<Record<string, unknown>>): ParameterSet =>
  Object.entries(list).reduce((set, [path, value]) => withAt(set, path, value), defaultSet())

const full = fields({
  layout: 'stereo',
  'voices.count': 8,
  'line.interpolation': 'lagrange3',
  'loop.feedback': 0.4,
  'loop.dampingHz': 5000,
  'loop.lowCutHz': 80,
  'mix.wetHighCutHz': 8000,
})

function made(set: ParameterSet, settings: Partial<Settings> = {}): Audition {
  const audition = createAudition(set, FS, { ...LISTENER, equalDb: 3, inputOpen: true, ...settings })
  const noise = Float32Array.from({ length: FS }, (_, n) => 0.2 * Math.sin(n * n))
  receive(audition, { type: 'source', source: { type: 'sample', id: 1, channels: [noise, noise], circular: true, start: 0, end: 20_000 } })
  return audition
}

interface Case {
  readonly name: string
  readonly audition: Audition
  /** What the page sends every `every` quanta; made beforehand, since its garbage is the browser's. */
  readonly flats?: readonly Float64Array[]
}

const live = made(full, { equalLive: true })
receive(live, { type: 'source', source: { type: 'input' } })
const tone = made(full, { bypass: 'hard' })
receive(tone, { type: 'source', source: { type: 'tone' } })

const cases: readonly Case[] = [
  { name: 'eight voices, stereo, sample', audition: made(full) },
  { name: 'live input with equal loudness', audition: live },
  { name: 'tone, hard bypass', audition: tone },
  { name: 'guard tripping again and again', audition: made(fields({ 'loop.feedback': 1.5, 'line.baseMs': 5, 'sweep.depthMs': 1 })) },
  {
    name: 'live edits with cross-fades',
    audition: made(full),
    flats: [full, withAt(full, 'line.baseMs', 14.5), withAt(full, 'voices.count', 3), withAt(full, 'loop.feedback', -0.3)].map((set) =>
      flatten(set),
    ),
  },
]

const input = [new Float32Array(QUANTUM).fill(0.1), new Float32Array(QUANTUM).fill(-0.1)]
const output = [new Float32Array(QUANTUM), new Float32Array(QUANTUM)]

function run({ audition, flats }: Case, quanta: number): void {
  for (let q = 0; q < quanta; q++) {
    if (flats && q % 25 === 0) {
      audition.flat.set(flats[(q / 25) % flats.length] as Float64Array)
      audition.hasNewFlat = true
    }
    render(audition, input, output, q * QUANTUM)
  }
}

const WARM_UP = 20_000
const MEASURED = 20_000
const collect = globalThis.gc as () => void
const results: Record<string, number> = {}
for (const one of cases) {
  run(one, WARM_UP)
  collect()
  const before = process.memoryUsage().heapUsed
  run(one, MEASURED)
  const after = process.memoryUsage().heapUsed
  results[one.name] = (after - before) / MEASURED
}
process.stdout.write(JSON.stringify(results))
