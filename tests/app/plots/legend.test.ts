import { describe, expect, it } from 'vitest'
import { wrapped } from '../../../app/plots/host/legend.ts'

describe('a legend beneath a narrow plot', () => {
  const fits = (line: string) => line.length <= 20

  it('stays on one line where it fits', () => {
    expect(wrapped('dashed · shaded', fits)).toEqual(['dashed · shaded'])
  })

  it('breaks between its parts only, and loses none', () => {
    const text = 'for small signals · dashed: second · shaded'
    expect(wrapped(text, fits)).toEqual(['for small signals', 'dashed: second', 'shaded'])
    expect(wrapped(text, () => false).join(' · ')).toBe(text)
  })
})
