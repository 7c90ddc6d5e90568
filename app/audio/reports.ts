// Reports of the audio thread into live.ts; states that need words into the session.
import { onFrame } from '../state/frames.ts'
import { live } from '../state/live.ts'
import { type GuardState, useSession } from '../state/session.ts'
import { positionAt, type Stamp } from './clock.ts'
import { type Graph, post } from './graph.ts'
import { FALL_DB_PER_S, HOLD_S, OVERLOAD_S } from './meterBallistics.ts'
import { outputLatencyS, outputTimeS } from './nativeContext.ts'
import { GUARD_LIMIT_DB, GUARD_OPEN, TRIPPED_BY_NON_FINITE } from './worklet/guard.ts'
import { type FromProcessor, REPORT, REPORT_LENGTH, SCOPE_FRAMES } from './worklet/messages.ts'
import { openSharedReport, readSharedReport } from './worklet/report.ts'

const FLOOR_DB = -400
const stamp: { -readonly [K in keyof Stamp]: Stamp[K] } = { frame: 0, position: 0, step: 0 }
const holdUntilS = { in: [0, 0], out: [0, 0] }
let overs = 0
let overUntilS = 0
let heldUntilS = 0
let report: Float64Array = new Float64Array(REPORT_LENGTH)
let stopReading = () => {}

/** Follows a graph's reports; those of an earlier one are dropped. */
export function followReports(graph: Graph): void {
  stopReading()
  overs = 0
  overUntilS = 0
  heldUntilS = 0
  stamp.frame = 0
  live.heldDelays = 0
  live.position = () => positionAt(stamp, heardTimeS(graph), graph.rate)
  const stopShared = graph.shared ? followShared(graph, graph.shared) : () => {}
  const onMessage = ({ data }: MessageEvent<FromProcessor>) => {
    if (data instanceof Float64Array) {
      report = data
      take(graph)
      post(graph, { type: 'read' })
    }
  }
  const onVisibility = () => post(graph, { type: 'hidden', hidden: document.visibilityState === 'hidden' })
  graph.node.port.onmessage = onMessage
  document.addEventListener('visibilitychange', onVisibility)
  onVisibility()
  stopReading = () => {
    stopShared()
    graph.node.port.onmessage = null
    document.removeEventListener('visibilitychange', onVisibility)
    rest()
  }
}

export function stopReports(): void {
  stopReading()
  stopReading = () => {}
}

function followShared(graph: Graph, memory: SharedArrayBuffer): () => void {
  const shared = openSharedReport(memory)
  let sequence = 0
  let stopFrames: (() => void) | null = null
  const read = () => {
    const seen = readSharedReport(shared, report, sequence)
    if (seen === sequence) return
    sequence = seen
    take(graph)
    // Paused: the last report has been read, so the frame loop may sleep.
    if (report[REPORT.running] === 0 && !useSession.getState().playing) pause()
  }
  const run = () => {
    stopFrames ??= onFrame(read)
  }
  const pause = () => {
    stopFrames?.()
    stopFrames = null
  }
  const stopSession = useSession.subscribe((now) => {
    if (now.playing) run()
  })
  run()
  return () => {
    stopSession()
    pause()
  }
}

/** Context time being heard: the device's own stamp, else the context's clock less the latency. */
function heardTimeS(graph: Graph): number {
  return outputTimeS(graph.context, performance.now()) ?? graph.context.currentTime - outputLatencyS(graph.context)
}

function take(graph: Graph): void {
  const at = (slot: number) => report[slot] as number
  const elapsedS = Math.min(1, Math.max(0, (at(REPORT.frame) - stamp.frame) / graph.rate))
  stamp.frame = at(REPORT.frame)
  stamp.position = at(REPORT.position)
  stamp.step = at(REPORT.positionStep)
  live.running = at(REPORT.running) === 1
  live.heard ||= live.running
  const nowS = stamp.frame / graph.rate
  for (let c = 0; c < 2; c++) {
    meter(live.inPeakDb, live.inHoldDb, holdUntilS.in, c, at(REPORT.peaks + c), elapsedS, nowS)
    meter(live.outPeakDb, live.outHoldDb, holdUntilS.out, c, at(REPORT.peaks + 2 + c), elapsedS, nowS)
  }
  if (at(REPORT.overs) > overs) overUntilS = nowS + OVERLOAD_S
  overs = at(REPORT.overs)
  live.overload = nowS < overUntilS
  sayHeld(at(REPORT.heldDelays), nowS)
  live.sourceSeconds = at(REPORT.playFrame) < 0 ? null : at(REPORT.playFrame) / graph.rate
  for (let i = 0; i < SCOPE_FRAMES; i++) {
    live.scopeIn[i] = at(REPORT.scope + i)
    live.scopeOut[i] = at(REPORT.scope + SCOPE_FRAMES + i)
  }
  live.scopeCount += 1
  if (!live.running) silence()
  sayGuard(at(REPORT.guardState), at(REPORT.guardReason), at(REPORT.guardLatched) === 1)
}

function meter(peaks: number[], holds: number[], until: number[], c: number, linear: number, elapsedS: number, nowS: number): void {
  const db = linear > 0 ? 20 * Math.log10(linear) : FLOOR_DB
  const fallen = (peaks[c] as number) - FALL_DB_PER_S * elapsedS
  peaks[c] = Math.max(db, fallen, FLOOR_DB)
  if (db >= (holds[c] as number) || nowS > (until[c] as number)) {
    holds[c] = peaks[c] as number
    until[c] = nowS + HOLD_S
  }
}

/** Held this recently counts as now, so that the notice does not flicker once a cycle of a fast sweep. */
const HELD_S = 1

/** The count starts again when the engine is reset. */
function sayHeld(count: number, nowS: number): void {
  if (count > live.heldDelays) heldUntilS = nowS + HELD_S
  live.heldDelays = count
  const delaysHeld = nowS < heldUntilS
  if (delaysHeld !== useSession.getState().delaysHeld) useSession.setState({ delaysHeld })
}

const limit = `+${GUARD_LIMIT_DB} dBFS`

function sayGuard(state: number, reason: number, latched: boolean): void {
  const next: GuardState | null = state === GUARD_OPEN ? null : latched ? 'latched' : 'recovers'
  if (next === useSession.getState().guardState) return
  useSession.setState({ guardState: next, guard: next && guardText(next, reason) })
}

export function guardText(state: GuardState, reason: number): string {
  const what = reason === TRIPPED_BY_NON_FINITE ? 'the output was no longer a number' : `the output passed ${limit}`
  if (state === 'latched') return `The guard muted the sound again: ${what}. Change the set (less feedback or gain), or resume.`
  return `The guard muted the sound: ${what}. It sounds again once the output has stayed 6 dB below that for a second.`
}

/** What live shows when nothing sounds. */
function rest(): void {
  live.running = false
  live.sourceSeconds = null
  silence()
}

function silence(): void {
  live.overload = false
  for (const levels of [live.inPeakDb, live.outPeakDb, live.inHoldDb, live.outHoldDb]) levels.fill(FLOOR_DB)
}
