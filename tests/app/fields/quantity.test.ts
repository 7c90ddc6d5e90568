import { describe, expect, it } from 'vitest'
import { showNumber, showQuantity, speakQuantity } from '../../../app/fields/quantity.ts'
import { PARAMETERS } from '../../../src/set/parameters.ts'
import { parseQuantity } from '../../../src/set/units.ts'

describe('a shown number', () => {
  it.each([
    [3.5, 'ms', '3.50'],
    [0.7291, 'ms', '0.7291'],
    [120, 'ms', '120'],
    [0.23, 'Hz', '0.23'],
    [6500, 'Hz', '6\u2009500'],
    [12000, 'Hz', '12\u2009000'],
    [-6, 'dB', '−6.00'],
    [0.7071, '', '0.7071'],
    [0.5, '', '0.50'],
    [6.3, 'cents', '6.3'],
    [12, 'cents', '12.0'],
  ] as const)('%d %s reads %s', (value, unit, text) => {
    expect(showNumber(value, { kind: 'number', unit })).toBe(text)
  })

  it('a whole number gets no decimals', () => {
    expect(showNumber(3, { kind: 'integer', unit: '' })).toBe('3')
  })

  it.each(PARAMETERS.flatMap((p) => ('unit' in p && p.default !== null ? [[p.path, p] as const] : [])))(
    'of %s is read back by the parser',
    (_, p) => {
      const read = parseQuantity(showNumber(p.default as number, p), p.unit)
      expect(read).toEqual({ ok: true, value: p.default })
    },
  )
})

describe('with its unit', () => {
  it('a unit stands off by a space that does not break, degrees stand close', () => {
    expect(showQuantity(3.5, { kind: 'number', unit: 'ms' })).toBe('3.50\u00a0ms')
    expect(showQuantity(90, { kind: 'number', unit: '°' })).toBe('90°')
    expect(showQuantity(0.5, { kind: 'number', unit: '' })).toBe('0.50')
  })

  it('is spoken in words', () => {
    expect(speakQuantity(3.5, { unit: 'ms' })).toBe('3.5 milliseconds')
    expect(speakQuantity(null, { unit: 'Hz' })).toBe('off')
  })
})
