// Any valid set, for property tests: every field drawn from its row of the table, then lifted clear of the write point.
import fc from 'fast-check'
import { defaultSet } from '../../src/set/defaults.ts'
import { delayRange, MAX_DELAY_MS } from '../../src/set/delayRange.ts'
import { isMovable } from '../../src/set/panelProblems.ts'
import { PARAMETERS, type Parameter } from '../../src/set/parameters.ts'
import { withAt } from '../../src/set/path.ts'
import type { Knob, Move, ParameterSet, Point } from '../../src/set/types.ts'
import { setProblems } from '../../src/set/validity.ts'

const number = (min: number, max: number) => fc.double({ min, max, noNaN: true }).map((x) => (x === 0 ? 0 : x))

export function anyValue(p: Parameter): fc.Arbitrary<unknown> {
  switch (p.kind) {
    case 'number': {
      const some = number(p.min, p.max)
      return p.nullable ? fc.option(some) : some
    }
    case 'integer':
      return p.values ? fc.constantFrom(...p.values) : fc.integer({ min: p.min, max: p.max })
    case 'choice':
      return fc.constantFrom(...p.options.map((option) => option.value))
    case 'boolean':
      return fc.boolean()
    case 'text':
      return fc.string({ unit: 'binary', maxLength: 20 })
  }
}

const ascending = (xs: fc.Arbitrary<number>, ys: fc.Arbitrary<number>, most = 64): fc.Arbitrary<Point[]> =>
  fc
    .uniqueArray(fc.tuple(xs, ys), { minLength: 2, maxLength: most, selector: ([x]) => x })
    .map((points) => points.sort((a, b) => a[0] - b[0]))

const shaperPoints = ascending(number(0.001, 1000), number(-100, 100), 63).map((points): Point[] => [[0, 0], ...points])

/** As a hand draws: steeper pieces than this would be all rounding. */
const thousandths = fc.integer({ min: 0, max: 1000 }).map((n) => n / 1000)

function anyShaper(path: string): fc.Arbitrary<unknown> {
  const rows = PARAMETERS.filter((p) => p.path.startsWith(`${path}.`))
  const fields = Object.fromEntries(rows.map((p) => [p.path.slice(path.length + 1), anyValue(p)]))
  return fc.option(fc.record({ ...fields, points: shaperPoints }))
}

function anyMove(p: Parameter): fc.Arbitrary<Move> {
  const end = anyValue('nullable' in p ? { ...p, nullable: false } : p) as fc.Arbitrary<Move['min']>
  const taper: fc.Arbitrary<Move['taper']> = fc.constantFrom('linear', 'log', 'drawn')
  return fc
    .record({ parameter: fc.constant(p.path), min: end, max: end, taper, points: ascending(thousandths, thousandths) })
    .map((move) => {
      const hasRatios = typeof move.min === 'number' && move.min * (move.max as number) > 0
      return move.taper === 'log' && !hasRatios ? { ...move, taper: 'linear' as const } : move
    })
}

const movable = PARAMETERS.filter((p) => isMovable(p) && !p.path.includes('.shaper.'))

const anyPanel: fc.Arbitrary<Knob[]> = fc.shuffledSubarray(movable, { maxLength: 6 }).chain((rows) =>
  fc.tuple(
    ...rows.map((p) =>
      fc.record({
        knob: fc.string({ maxLength: 40 }),
        position: number(0, 1),
        steps: fc.oneof(fc.constant(0), fc.integer({ min: 2, max: 1024 })),
        smoothMs: number(0, 5000),
        moves: anyMove(p).map((move) => [move]),
      }),
    ),
  ),
)

const rows = PARAMETERS.filter((p) => !p.path.includes('.shaper.'))

export const anySet: fc.Arbitrary<ParameterSet> = fc
  .record({
    values: fc.tuple(...rows.map(anyValue)),
    input: anyShaper('input.shaper'),
    loop: anyShaper('loop.shaper'),
    mix: anyShaper('mix.shaper'),
    points: ascending(number(0, 0.999), number(-1, 1)),
    panel: anyPanel,
    limits: fc.dictionary(fc.constantFrom('loop.ring', 'loop.margin', 'sweep.detune'), number(-1000, 1000)),
  })
  .map(({ values, input, loop, mix, points, panel, limits }) => {
    let set = rows.reduce<ParameterSet>((whole, p, i) => withAt(whole, p.path, values[i]), defaultSet())
    set = withAt(withAt(withAt(set, 'input.shaper', input), 'loop.shaper', loop), 'mix.shaper', mix)
    return tamed({ ...withAt(set, 'sweep.points', points), panel, limits: { ...limits } })
  })
  .filter((set) => setProblems(set).length === 0)

/** Delays brought into reach: spread and depth first, then base. */
function tamed(set: ParameterSet): ParameterSet {
  const calm: ParameterSet = {
    ...set,
    sweep: { ...set.sweep, depthOctaves: set.sweep.depthOctaves / 2 },
    voices: { ...set.voices, spreadMs: set.voices.spreadMs / 4 },
  }
  const { voices, loop, voiceLimitSamples, loopLimitSamples } = delayRange(calm)
  const lack = Math.max(voiceLimitSamples - voices.minSamples, loopLimitSamples - loop.minSamples, 0)
  const lifted = Math.min(500, calm.line.baseMs + (lack * 1000) / calm.sampleRate + 1 / 8)
  const moved = withAt(calm, 'line.baseMs', lifted)
  const { maxSamples } = delayRange(moved).voices
  return (maxSamples * 1000) / moved.sampleRate > MAX_DELAY_MS ? withAt(moved, 'sweep.depthOctaves', 1) : moved
}
