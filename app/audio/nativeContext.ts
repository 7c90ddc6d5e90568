// The one place that reaches past the wrapper, for what it lacks: latencies, output timestamps, the choice of output device and the
// state 'interrupted'. Everything is feature-tested; a browser (or a later wrapper) without it gives null.
import type { AudioContext } from 'standardized-audio-context'

type Native = globalThis.AudioContext & {
  setSinkId?: (id: string) => Promise<void>
  readonly playbackStats?: { readonly underrunEvents?: number; readonly underrunDuration?: number }
}

function nativeOf(context: AudioContext): Native | null {
  const held = (context as unknown as { readonly _nativeAudioContext?: unknown })._nativeAudioContext
  return typeof held === 'object' && held !== null && 'currentTime' in held ? (held as Native) : null
}

/** Seconds from the processor to the ear as far as the browser knows: outputLatency, else baseLatency, else 0. */
export function outputLatencyS(context: AudioContext): number {
  const native = nativeOf(context)
  const latency = native?.outputLatency || native?.baseLatency || 0
  return Number.isFinite(latency) && latency >= 0 ? latency : 0
}

/** Context time whose frame leaves the output device at performance time `nowMs`, s; null where the browser does not say. */
export function outputTimeS(context: AudioContext, nowMs: number): number | null {
  const native = nativeOf(context)
  if (!native || typeof native.getOutputTimestamp !== 'function') return null
  const { contextTime, performanceTime } = native.getOutputTimestamp()
  if (!contextTime || !performanceTime) return null
  const time = contextTime + (nowMs - performanceTime) / 1000
  // A stamp that is far from the context's clock is no stamp (seen right after a resume).
  return Math.abs(time - native.currentTime) < 1 ? time : null
}

/** True while the system holds the sound (a call, another app); the wrapper knows no such state. */
export function isInterrupted(context: AudioContext): boolean {
  return (nativeOf(context)?.state as string | undefined) === 'interrupted'
}

/** Calls back at each change of state, the wrapper's own and 'interrupted'; returns the way to stop. */
export function onContextState(context: AudioContext, listener: () => void): () => void {
  const target: EventTarget = nativeOf(context) ?? (context as unknown as EventTarget)
  target.addEventListener('statechange', listener)
  return () => target.removeEventListener('statechange', listener)
}

export const canChooseOutput = (): boolean =>
  typeof globalThis.AudioContext === 'function' && 'setSinkId' in globalThis.AudioContext.prototype

/** Sends the sound to an output device; '' is the system's choice. Rejects when the browser refuses. */
export async function chooseOutputDevice(context: AudioContext, deviceId: string): Promise<void> {
  const native = nativeOf(context)
  if (!native?.setSinkId) throw new Error('this browser does not let a page choose the output device')
  await native.setSinkId(deviceId)
}
