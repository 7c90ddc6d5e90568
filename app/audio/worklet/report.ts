// The one report, and how it leaves the audio thread: through shared memory, else as one message that waits for its answer.
//
// layout of the shared memory: [ sequence: int32, padded to 8 bytes | report: REPORT_LENGTH doubles ]. The sequence is odd while the
// report is being written; a reader that sees it odd or changed reads again.
import { REPORT_LENGTH } from './messages.ts'

const HEADER_BYTES = 8
export const SHARED_BYTES = HEADER_BYTES + 8 * REPORT_LENGTH

export interface SharedReport {
  readonly sequence: Int32Array
  readonly report: Float64Array
}

export function openSharedReport(memory: SharedArrayBuffer): SharedReport {
  if (memory.byteLength !== SHARED_BYTES) throw new RangeError(`a shared report has ${SHARED_BYTES} bytes, got ${memory.byteLength}`)
  return { sequence: new Int32Array(memory, 0, 1), report: new Float64Array(memory, HEADER_BYTES, REPORT_LENGTH) }
}

/** Audio thread: publishes `report`. */
export function publishReport(shared: SharedReport, report: Float64Array): void {
  Atomics.add(shared.sequence, 0, 1)
  shared.report.set(report)
  Atomics.add(shared.sequence, 0, 1)
}

/** Page: copies the newest whole report into `out`. False when nothing new is there or it is just being written. */
export function readSharedReport(shared: SharedReport, out: Float64Array, lastSequence: number): number {
  const before = Atomics.load(shared.sequence, 0)
  if (before === lastSequence || before % 2 !== 0) return lastSequence
  out.set(shared.report)
  return Atomics.load(shared.sequence, 0) === before ? before : lastSequence
}
