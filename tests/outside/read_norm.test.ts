// Oracle: numpy.linalg.norm(R, 2) of the read written out as a dense matrix.
import { expect, it } from 'vitest'
import { addAllpassRows, createAllpassTest } from '../../src/analysis/movingReadAllpass.ts'
import { addRows, createGramTest, finishGramTest } from '../../src/analysis/movingReadGram.ts'
import type { Interpolation } from '../../src/set/types.ts'
import { itIsMadeAgain, reference } from './reference.ts'

const made = reference<{ kind: Interpolation; label: string; delays: number[]; norm: number }[]>('read_norm')

function below(kind: Interpolation, delays: Float64Array, t: number): boolean {
  if (kind === 'allpass1') return addAllpassRows(createAllpassTest(t), 0, delays)
  const test = createGramTest(kind, t, { shortest: Math.min(...delays), longest: Math.max(...delays) })
  return addRows(test, 0, delays) && finishGramTest(test, delays.length)
}

it.each(made.map((row) => [row.kind, row.label, row] as const))(
  'norm of a %s read over a %s is told apart from 1e-12 more and less',
  (_, __, row) => {
    const delays = Float64Array.from(row.delays)
    expect(below(row.kind, delays, row.norm * (1 + 1e-12))).toBe(true)
    expect(below(row.kind, delays, row.norm * (1 - 1e-12))).toBe(false)
  },
)

itIsMadeAgain('read_norm')
