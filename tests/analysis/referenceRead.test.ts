// Oracle: closed form, a sine read at any time.
import { expect, it } from 'vitest'
import { addReferenceRead, REFERENCE_REACH } from '../../src/analysis/referenceRead.ts'

const LENGTH = 700
const AT = 200

/** Worst error against cos(ω t), of reads at moving delays, dB. */
function worstDb(cycles: number): number {
  const omega = 2 * Math.PI * cycles
  const line = Float64Array.from({ length: LENGTH }, (_, n) => Math.cos(omega * n))
  const delays = Float64Array.from({ length: 400 }, (_, j) => 20 + 15.3 * Math.sin(j / 37))
  const out = new Float64Array(400)
  addReferenceRead(line, AT, delays, out)
  let worst = 0
  for (let j = 0; j < 400; j++) worst = Math.max(worst, Math.abs((out[j] as number) - Math.cos(omega * (AT + j - (delays[j] as number)))))
  return 20 * Math.log10(worst)
}

it.each([0, 0.001, 0.05, 0.2, 0.3, 0.4, 0.44, 0.45])('a sine of %f fs is read to −130 dB', (cycles) => {
  expect(worstDb(cycles)).toBeLessThan(-130)
})

it('what lies at 0.55 fs and above would fold, and is read as its fold, no better than the sampling theorem allows', () => {
  expect(worstDb(0.55)).toBeGreaterThan(-20)
})

it('adds, scaled, to what is there', () => {
  const line = new Float64Array(200).fill(0.5)
  const out = new Float64Array(3).fill(1)
  addReferenceRead(line, 100, new Float64Array(3).fill(7.25), out, 2)
  for (const y of out) expect(y).toBeCloseTo(2, 6)
})

it('refuses a line that does not reach far enough', () => {
  const line = new Float64Array(200)
  expect(() => addReferenceRead(line, REFERENCE_REACH - 2, new Float64Array(1), new Float64Array(1))).toThrow(RangeError)
  expect(() => addReferenceRead(line, 190, new Float64Array(1), new Float64Array(1))).toThrow(RangeError)
})
