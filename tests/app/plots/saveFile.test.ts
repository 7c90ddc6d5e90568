import { describe, expect, it } from 'vitest'
import { csvText, plotFileName } from '../../../app/plots/saveFile.ts'

describe('a plot’s numbers as CSV', () => {
  it('have one head line, points as decimal mark, CRLF, and nothing where there is no number', () => {
    const text = csvText({ head: ['frequency_hz', 'level_db'], columns: [Float64Array.of(20, 1000.5), [-3.25, Number.NaN]] })
    expect(text).toBe('frequency_hz,level_db\r\n20,-3.25\r\n1000.5,\r\n')
  })
})

describe('the name of a plot’s file', () => {
  it('is made of the set’s name and the plot’s', () => {
    expect(plotFileName('Narrow resonant sweep', 'response', 'csv')).toBe('narrow-resonant-sweep-response.csv')
    expect(plotFileName('../Übung: 1', 'sweep', 'png')).toBe('übung-1-sweep.png')
    expect(plotFileName('', 'loop', 'csv')).toBe('set-loop.csv')
  })
})
