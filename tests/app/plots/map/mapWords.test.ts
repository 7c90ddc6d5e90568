import { describe, expect, it } from 'vitest'
import { axisColumns, frequencyAt } from '../../../../app/plots/columns.ts'
import {
  cellAt,
  firstNotchAt,
  mapLegend,
  mapNumbers,
  mapSummary,
  mapTable,
  placeWords,
  restWords,
} from '../../../../app/plots/map/mapWords.ts'
import { mapJob, type SweepMap } from '../../../../app/workers/analysisJobs/map.ts'
import type { ParameterSet } from '../../../../src/set/types.ts'
import { comb } from '../../workers/combs.ts'

const rows = axisColumns(48000, 120)

function mapOf(set: ParameterSet): SweepMap {
  const steps = mapJob({ set, rows, positions: 80 })
  for (;;) {
    const step = steps.next()
    if (step.done) return step.value
  }
}

/** First notch at ½/τ, τ = 1 + ½ sin 2πP ms: 333 to 1000 Hz. */
const flanger = comb({ baseMs: 1, depthMs: 0.5, wet: 0.4 })
const SET = { ...flanger, line: { ...flanger.line, interpolation: 'lagrange3' as const } }
const MAP = mapOf(SET)

describe('the words of the map', () => {
  it('read position, frequency, exact level and note under the cursor, and the mean where cells hold one', () => {
    // Oracle: at P = ¼ the delay is 1.5 ms: |H|² = 0.41 + 0.4 cos(2π · 440 · 0.0015), −3.6 dB lower than both summed.
    const db = 10 * Math.log10(0.41 + 0.4 * Math.cos(2 * Math.PI * 440 * 0.0015))
    expect(placeWords(SET, MAP, 0, { position: 0.25, hz: 440 })).toBe(`position 0.25 · 440 Hz · −${Math.abs(db).toFixed(1)} dB · A4 0 ct`)
    expect(placeWords(SET, MAP, 0, { position: 0.25, hz: 15000 })).toMatch(
      /^position 0\.25 · 15\u2009000 Hz · [−+]?[\d.]+ dB \(mean [−+]?[\d.]+ dB\) · /,
    )
  })

  it('at rest say the position and the first notch there', () => {
    expect(restWords(MAP, 0.25)).toBe('position 0.25 · first notch 333 Hz')
    expect(restWords(MAP, 0.75)).toBe('position 0.75 · first notch 1\u2009000 Hz')
    expect(restWords(null, 0.3)).toBe('position 0.30')
    expect(restWords(mapOf(comb({ dry: 0, wet: 1, depthMs: 0.3 })), 0.3)).toBe('position 0.30 · no notch')
  })

  it('find the first notch between the positions it was computed at', () => {
    expect(firstNotchAt(MAP, 0.1234)).toBeCloseTo(500 / (1 + 0.5 * Math.sin(2 * Math.PI * 0.1234)), -0.5)
    expect(firstNotchAt(MAP, 1)).toBeCloseTo(500, 0)
  })

  it('sum up in one sentence', () => {
    expect(mapSummary(MAP)).toMatch(
      /^Map: level over sweep position and frequency, 20\.0 Hz to 20\u2009000 Hz; −[\d.]+ dB to −0\.9 dB; first notch 333 to 1\u2009000 Hz; first peak 667 to 2\u2009000 Hz\.$/,
    )
  })

  it('say what is special: standing, drifting, shaped, averaged', () => {
    expect(mapLegend(MAP)).toMatch(/^solid: notches · dashed: peaks · above [\d.\u2009]+ Hz: mean power of each cell$/)
    expect(mapLegend(mapOf(comb()))).toMatch(/^the sweep stands still · /)
    expect(mapLegend(mapOf({ ...SET, sweep: { ...SET.sweep, shape: 'drift' } }))).toMatch(/^drift stands as a sine · /)
  })
})

describe('the table of the map', () => {
  it('lists each track from its lowest to its highest place', () => {
    const { head, rows: lines } = mapTable(MAP)
    expect(lines[0]).toEqual(['Notch 1', '333 Hz', '−20.0 dB', '0.25', '1\u2009000 Hz', '−20.0 dB', '0.75', 'always'])
    expect(lines.find(([name]) => name === 'Peak 1')?.[1]).toBe('667 Hz')
    expect(new Set(head).size).toBe(head.length)
    for (const line of lines) expect(line).toHaveLength(head.length)
  })
})

describe('the numbers of the map', () => {
  it('hold every cell as it is drawn, with its position and its row', () => {
    const { head, columns } = mapNumbers(MAP, 0)
    expect(head).toEqual(['position', 'low_hz', 'high_hz', 'level_db'])
    for (const column of columns) expect(column).toHaveLength(80 * 120)
    const k = 33 * 120 + 57
    expect(columns.map((column) => column[k])).toEqual([
      33.5 / 80,
      frequencyAt(rows, 57 / 120),
      frequencyAt(rows, 58 / 120),
      MAP.channels[0]?.[k],
    ])
    expect(cellAt(MAP, 0, { position: 33.5 / 80, hz: frequencyAt(rows, 57.5 / 120) })).toBe(MAP.channels[0]?.[k])
  })
})
