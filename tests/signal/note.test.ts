import { describe, expect, it } from 'vitest'
import { nearestNote } from '../../src/signal/note.ts'

describe('nearestNote', () => {
  // Oracle: published table of equal-tempered pitches at A4 = 440 Hz (from memory, to the printed hundredth).
  it.each([
    [440, 'A', 4],
    [261.63, 'C', 4],
    [27.5, 'A', 0],
    [16.35, 'C', 0],
    [4186.01, 'C', 8],
    [466.16, 'A♯', 4],
    [493.88, 'B', 4],
    [523.25, 'C', 5],
    [82.41, 'E', 2],
  ])('%d Hz is %s%i', (hz, name, octave) => {
    const note = nearestNote(hz)
    expect([note.name, note.octave]).toEqual([name, octave])
    expect(Math.abs(note.cents)).toBeLessThan(0.6)
    expect(note.noteHz).toBeCloseTo(hz, 1)
  })

  it('cents are signed and lie in [−50, 50): half a step belongs to the upper note', () => {
    expect(nearestNote(440 * 2 ** (30 / 1200)).cents).toBeCloseTo(30, 9)
    expect(nearestNote(440 * 2 ** (-30 / 1200)).cents).toBeCloseTo(-30, 9)
    expect(nearestNote(440 * 2 ** (50.001 / 1200)).name).toBe('A♯')
    expect(nearestNote(440 * 2 ** (49.999 / 1200)).name).toBe('A')
  })

  it.each([0, -1, Number.NaN, Number.POSITIVE_INFINITY])('refuses %d Hz', (hz) => {
    expect(() => nearestNote(hz)).toThrow(RangeError)
  })
})
