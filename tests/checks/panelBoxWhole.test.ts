// The largest panels there can be: judged in bounded time, and nothing claimed that was not shown.
import { describe, expect, it } from 'vitest'
import { defaultSet, defaultShaper } from '../../src/set/defaults.ts'
import { isMovable } from '../../src/set/panelProblems.ts'
import type { NumberParameter } from '../../src/set/parameters/kinds.ts'
import { PARAMETERS, type Parameter } from '../../src/set/parameters.ts'
import { withAt } from '../../src/set/path.ts'
import type { Move, ParameterSet } from '../../src/set/types.ts'
import { knob, move, panelBox, withPanel, worstOf } from './panelSets.ts'

/** Over all a parameter can be, but delays, which would only be too long. */
function widest(row: Parameter): Move {
  if (row.kind === 'choice')
    return move(
      row.path,
      row.options[0]!.value,
      row.options.at(-1)!.value === 'drawn' ? row.options.at(-2)!.value : row.options.at(-1)!.value,
    )
  if (row.kind === 'boolean') return move(row.path, false, true)
  const { min, max } = row as NumberParameter
  return move(row.path, min, /Ms$/.test(row.path) ? Math.min(max, 20) : max)
}

const MOVES = PARAMETERS.filter(isMovable).map(widest)
const bent = (['input.shaper', 'loop.shaper', 'mix.shaper'] as const).reduce<ParameterSet>(
  (set, path) => withAt(set, path, defaultShaper('tanh')),
  defaultSet(),
)

describe('every parameter on a knob', () => {
  it('one knob each: too many choices to combine, and said to be only tried', () => {
    const knobs = Array.from({ length: 32 }, (_, k) =>
      knob(
        `K${k}`,
        MOVES.filter((_, m) => m % 32 === k),
      ),
    )
    const set = { ...withPanel(bent, knobs), limits: {} }
    const check = panelBox(set)
    expect(check.status).toBe('fails')
    expect(worstOf(check, 'sweep.range').status).toBe('fails')
    // 7 shapes · 2 laws · 5 · 5 reads · 6 curves · … : more than are combined.
    expect(worstOf(check, 'loop.poles').by).toBe('samples')
    // That one place diverges is all there is to show.
    expect(worstOf(check, 'loop.stability').value).toBe('diverges')
    expect(check.working.reduce((sum, { numbers }) => sum + Number(/(\d+) sets looked at/.exec(numbers)?.[1] ?? 0), 0)).toBeLessThan(30000)
    expect(JSON.parse(JSON.stringify(check))).toEqual(check)
  }, 180_000)

  it('all on few knobs, sixteen each: judged along the turns', () => {
    const knobs = [0, 1, 2].map((k) => knob(`K${k}`, MOVES.slice(16 * k, 16 * k + 16)))
    const check = panelBox(withPanel(bent, knobs))
    expect(check.worst?.length).toBeGreaterThan(8)
    expect(JSON.parse(JSON.stringify(check))).toEqual(check)
  }, 180_000)
})
