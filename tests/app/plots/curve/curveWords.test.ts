// What the Curve plot says. Oracle: the numbers put in.
import { expect, it } from 'vitest'
import { chosenShaper } from '../../../../app/plots/curve/chosenShaper.ts'
import { beyondWords, boundWords, driveWords, levelOf, scientific, transferCursorWords } from '../../../../app/plots/curve/curveWords.ts'
import { curveJob } from '../../../../app/workers/curveJob.ts'
import { defaultSet, defaultShaper } from '../../../../src/set/defaults.ts'
import { withAt } from '../../../../src/set/path.ts'

const reply = (change: object) =>
  curveJob({ shaper: { ...defaultShaper('tanh'), ...change }, amplitude: 10 ** (-6 / 20), sampleRate: 48000, highest: 9 })

it('numbers small and large are written short', () => {
  expect([0, 0.024, 2.573e-6, 1e-5, 12, 0.5].map((value) => scientific(value, 3))).toEqual([
    '0',
    '0.024',
    '2.57 × 10⁻⁶',
    '10⁻⁵',
    '12',
    '0.5',
  ])
  expect([levelOf(1e-5), levelOf(0)]).toEqual(['−100.0 dB', 'none'])
})

it('the cursor reads in, out and what the table misses, or that its end is held', () => {
  const words = (part: number) => transferCursorWords(reply({ tableRange: 0.5 }), part)
  expect(words(0)).toBe('−1.120 → −0.808 · beyond the table, its end held')
  expect(words(0.5)).toMatch(/^0\.000 → 0\.000 · table off by −\d+\.\d dB$|table exact$/)
})

it('the bound says its formula with the numbers in it', () => {
  // 4/(3√3) for tanh × 1; h = 2/64.
  expect(boundWords(reply({ tableSize: 64 }).transfer)).toBe('h²/8 · max|f″|: h 0.0313, |f″| 0.77 give 9.4 × 10⁻⁵')
  expect(boundWords(reply({ curve: 'hardClip', drive: 2, tableSize: 64 }).transfer)).toContain('change of slope at a corner 2 give')
})

it('held ends are named where they lose something', () => {
  expect(beyondWords(reply({ drive: 8 }).transfer, 1)).toBe('')
  expect(beyondWords(reply({ drive: 1 }).transfer, 1)).toBe('past ±1.00 held, off by up to 0.238')
  expect(beyondWords(reply({ curve: 'diode' }).transfer, 1)).toBe('past ±1.00 held')
})

it('a drive reads its strongest harmonic, distortion, DC and what folds', () => {
  expect(driveWords(reply({ drive: 4, negative: 0.6 }).own, 0)).toBe('drive 4.00 · 3: −13.9 dB · THD 23 % · DC −18.4 dBFS · folds −23.8 dB')
  expect(driveWords(reply({ curve: 'deadZone', deadZone: 1 }).own, 0)).toBe('drive 1.00 · nothing passes')
  expect(driveWords(reply({ curve: 'hardClip' }).own, 0)).toBe('drive 1.00 · no harmonics · nothing folds')
})

it('the shaper shown is that of the open block, else the first in the path, else none', () => {
  const set = withAt(withAt(defaultSet(), 'mix.shaper', defaultShaper('tanh')), 'loop.shaper', defaultShaper('cubic'))
  expect(chosenShaper(set, 'outputShaper')?.name).toBe('output shaper')
  expect(chosenShaper(set, 'line')?.name).toBe('loop shaper')
  expect(chosenShaper(set, 'inputShaper')?.name).toBe('loop shaper')
  expect(chosenShaper(defaultSet(), 'inputShaper')).toBeNull()
})
