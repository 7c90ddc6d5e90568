import { describe, expect, it } from 'vitest'
import { REPORT_LENGTH } from '../../../../app/audio/worklet/messages.ts'
import { openSharedReport, publishReport, readSharedReport, SHARED_BYTES } from '../../../../app/audio/worklet/report.ts'

describe('a shared report', () => {
  it('is read once, whole, and again only when a new one was published', () => {
    const shared = openSharedReport(new SharedArrayBuffer(SHARED_BYTES))
    const out = new Float64Array(REPORT_LENGTH)
    expect(readSharedReport(shared, out, 0)).toBe(0)
    publishReport(shared, new Float64Array(REPORT_LENGTH).fill(7))
    const seen = readSharedReport(shared, out, 0)
    expect(seen).not.toBe(0)
    expect(out.every((x) => x === 7)).toBe(true)
    expect(readSharedReport(shared, out, seen)).toBe(seen)
  })

  it('is not taken while it is being written', () => {
    const shared = openSharedReport(new SharedArrayBuffer(SHARED_BYTES))
    publishReport(shared, new Float64Array(REPORT_LENGTH).fill(7))
    Atomics.add(shared.sequence, 0, 1)
    expect(readSharedReport(shared, new Float64Array(REPORT_LENGTH), 0)).toBe(0)
  })

  it('refuses memory of another layout', () => {
    expect(() => openSharedReport(new SharedArrayBuffer(64))).toThrow(RangeError)
  })
})
