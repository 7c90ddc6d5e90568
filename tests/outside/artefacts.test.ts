// Oracle: artefacts.py, moving reads of exact exponentials in numpy. Ours: a cosine in the line, the engine's reads, the windowed-sinc reference.
import { expect, it } from 'vitest'
import type { Between, Interpolation } from '../../src/set/types.ts'
import { benchOf, levels, oneVoice, tone } from '../analysis/artefactTools.ts'
import { itIsMadeAgain, reference } from './reference.ts'

const made = reference<{ kind: Interpolation; every: number; between: Between; bin: number; db: number }[]>('artefacts')
const bins = [...new Set(made.map(({ bin }) => bin))]

/** Averages over stretches instead of a whole cycle scatter by this much, dB. */
const SCATTER_DB = 0.7
/** The reference read is exact to −140 dB, and a stretch's window blurs what moves slowly. */
const FLOOR_DB = -125

it.each(bins)('artefacts of every read and update on the tone of bin %i are numpy’s', (bin) => {
  const bench = benchOf(oneVoice(), tone(bin))
  for (const { kind, every, between, db } of made.filter((row) => row.bin === bin)) {
    const { cycleDb } = levels(bench, { voices: kind, loop: kind, updates: { every, between } })
    const label = `${kind}, ${between} ${every}`
    if (db < FLOOR_DB) expect(cycleDb, label).toBeLessThan(FLOOR_DB)
    else expect(Math.abs(cycleDb - db), `${label}: ${cycleDb} for ${db}`).toBeLessThan(SCATTER_DB)
  }
})

itIsMadeAgain('artefacts', 1e-6)
