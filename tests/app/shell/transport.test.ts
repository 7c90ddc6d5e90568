import { describe, expect, it } from 'vitest'
import { dropKind } from '../../../app/shell/drop.ts'
import { draggedRegion } from '../../../app/shell/transport/useRegionDrag.ts'
import { outline } from '../../../app/shell/transport/Waveform.tsx'
import { levelText, meterText, signed, timeText } from '../../../app/shell/transport/words.ts'

describe('a dropped file', () => {
  it.each([
    ['three.set.json', '', 'set'],
    ['THREE.JSON', 'application/json', 'set'],
    ['take.wav', 'audio/x-wav', 'audio'],
    ['take.WAV', '', 'audio'],
    ['take.flac', '', 'audio'],
    ['voice', 'audio/mpeg', 'audio'],
    ['notes.txt', 'text/plain', 'unknown'],
    ['folder', '', 'unknown'],
  ])('%s (%s) is taken for %s', (name, type, kind) => {
    expect(dropKind({ name, type })).toBe(kind)
  })
})

describe('dragging the repeat region', () => {
  const region = { startS: 1, endS: 3 }
  it.each([
    ['start', 1, 2.5, { startS: 2.5, endS: 3 }],
    ['start', 1, 4, { startS: 2.95, endS: 3 }],
    ['end', 3, 0.5, { startS: 1, endS: 1.05 }],
    ['move', 2, 2.5, { startS: 1.5, endS: 3.5 }],
    ['move', 2, 9, { startS: 2, endS: 4 }],
    ['move', 2, -9, { startS: 0, endS: 2 }],
    ['new', 3.5, 3.2, { startS: 3.2, endS: 3.5 }],
  ] as const)('%s from %s s to %s s', (act, fromS, atS, wanted) => {
    const dragged = draggedRegion({ act, fromS, region }, atS, 4)
    expect(dragged.startS).toBeCloseTo(wanted.startS, 9)
    expect(dragged.endS).toBeCloseTo(wanted.endS, 9)
  })
})

describe('words and pictures', () => {
  it('levels have a real minus sign; silence is −∞, the lowest level off', () => {
    expect([signed(-20, 0), signed(3.14, 1), signed(-0.01, 1)]).toEqual(['−20', '+3.1', '0.0'])
    expect([meterText(-14.23), meterText(-400)]).toEqual(['−14.2', '−∞'])
    expect([levelText(-20, -60), levelText(-60, -60)]).toEqual(['−20 dB', 'off'])
    expect([timeText(1.254), timeText(125.3)]).toEqual(['1.25 s', '2:05.3'])
  })

  it('the outline goes along the largest samples and back along the smallest, held at full scale', () => {
    const path = outline({ min: Float32Array.of(-1, -3), max: Float32Array.of(0, 0.5), seconds: 1 })
    expect(path).toBe('M0 49.50L1 24.50L1 100.50L0 100.50Z')
  })
})
