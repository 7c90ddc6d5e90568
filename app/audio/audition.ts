// What the page can do with the sound: the functions behind the transport, the keys and the drop. All state is in state/session.ts.
import { announce } from '../shell/announce.ts'
import { chooseFile } from '../shell/fileAccess.ts'
import {
  type Bypass,
  type DelayChange,
  LEVEL_MAX_DB,
  LEVEL_MIN_DB,
  type SessionState,
  type Source,
  TONE_MAX_HZ,
  TONE_MIN_HZ,
  useSession,
} from '../state/session.ts'
import { keepState } from '../state/storage.ts'
import { currentGraph } from './currentGraph.ts'
import { followEqualLoudness } from './equalLoudness.ts'
import { post } from './graph.ts'
import { closeInput, connectInput, openInput } from './input.ts'
import { pauseSound, reopenAtDeviceRate, restartSound, startSound } from './lifeCycle.ts'
import { leaveMaterial, loadFile, loadPhrase, sendRegion, TONE_ID } from './material.ts'
import { chooseOutputDevice } from './nativeContext.ts'

const session = () => useSession.getState()
const put = (change: Partial<SessionState>) => useSession.setState(change)

/** Sounds, or shows the caution if it was never confirmed in this browser. Call inside the press. */
export function play(): void {
  if (session().cautionRead) startSound()
  else put({ cautionOpen: true })
}

export function pause(): void {
  pauseSound()
}

export function togglePlay(): void {
  const { playing, status } = session()
  if (playing && status !== 'failed') pause()
  else if (status === 'failed') restart()
  else play()
}

/** The caution's "Start quietly": a press, so sound may start. */
export function confirmCaution(): void {
  put({ cautionRead: true, cautionOpen: false })
  keepState()
  startSound()
}

export function declineCaution(): void {
  put({ cautionOpen: false })
}

/** A fresh start after the sound stopped. Call inside the press. */
export function restart(): void {
  if (session().cautionRead) restartSound()
  else put({ cautionOpen: true })
}

/** Takes a phrase, the tone or a live device ('' is the system's choice) as source. Files come through {@link openAudioFile}. */
export async function chooseSource(source: Source): Promise<void> {
  if (source.kind === 'live') return chooseInput(source.deviceId)
  if (source.kind === 'file') return
  if (source.id === TONE_ID) {
    leaveMaterial({ type: 'tone' })
    put({ source })
  } else if (!(await loadPhrase(source.id))) return
  dropInput()
}

async function chooseInput(deviceId: string): Promise<void> {
  // The gate closes before anything of the device can pass.
  put({ headphones: false })
  const device = await openInput(deviceId)
  if (device === null) return
  leaveMaterial({ type: 'input' })
  put({ source: { kind: 'live', ...device } })
  if (!connectInput()) reopenAtDeviceRate()
}

function dropInput(): void {
  put({ headphones: false })
  closeInput()
}

/** Opens the user's recording; a refusal is said and what was open stays. */
export async function openAudioFile(file: File): Promise<void> {
  if (await loadFile(file)) {
    dropInput()
    announce(`${file.name} is open`)
  }
}

/** Lets the user choose a recording. */
export async function chooseAudioFile(): Promise<void> {
  const file = await chooseFile('audio/*,.wav,.flac,.mp3,.m4a,.ogg,.opus')
  if (file) await openAudioFile(file)
}

/** "I wear headphones": live input may be heard. */
export function confirmHeadphones(on: boolean): void {
  put({ headphones: on })
}

/** Shortest region that still repeats as sound and not as a buzz. */
export const SHORTEST_REPEAT_S = 0.05

/** Repeat region in seconds of the recording; null repeats everything. */
export function setRepeat(repeat: { readonly startS: number; readonly endS: number } | null): void {
  const seconds = session().overview?.seconds
  if (seconds === undefined) return
  put({ repeat: repeat && bounded(repeat.startS, repeat.endS, seconds) })
  sendRegion()
}

function bounded(startS: number, endS: number, seconds: number) {
  const shortest = Math.min(SHORTEST_REPEAT_S, seconds)
  const start = Math.min(Math.max(0, startS), seconds - shortest)
  const end = Math.min(Math.max(endS, start + shortest), seconds)
  return start === 0 && end === seconds ? null : { startS: start, endS: end }
}

export function setToneHz(hz: number): void {
  put({ toneHz: Math.min(TONE_MAX_HZ, Math.max(TONE_MIN_HZ, hz)) })
}

export function setLevel(db: number): void {
  put({ levelDb: Math.min(LEVEL_MAX_DB, Math.max(LEVEL_MIN_DB, db)) })
}

export function toggleMute(): void {
  const muted = !session().muted
  put({ muted })
  announce(muted ? 'Muted' : 'Sound on')
}

/** Escape: always mutes, never unmutes. */
export function mute(): void {
  if (session().muted) return
  put({ muted: true })
  announce('Muted')
}

export function setBypass(mode: Bypass): void {
  put(mode === 'off' ? { bypass: mode } : { bypass: mode, bypassMode: mode })
}

export function toggleBypass(): void {
  const { bypass, bypassMode } = session()
  setBypass(bypass === 'off' ? bypassMode : 'off')
  announce(bypass === 'off' ? 'Bypass on' : 'Bypass off')
}

/** What Bypass means; takes effect at once where it is on. */
export function setBypassMode(mode: Exclude<Bypass, 'off'>): void {
  put(session().bypass === 'off' ? { bypassMode: mode } : { bypassMode: mode, bypass: mode })
}

export function toggleEqualLoudness(): void {
  put({ equalLoudness: !session().equalLoudness })
  followEqualLoudness()
}

export function setDelayChange(delayChange: DelayChange): void {
  put({ delayChange })
}

/** Gives the sound back after the guard muted it. */
export function resumeFromGuard(): void {
  const graph = currentGraph()
  if (graph) post(graph, { type: 'resume' })
}

/** Output device by id, '' for the system's choice. */
export async function chooseOutput(outputId: string): Promise<void> {
  const graph = currentGraph()
  if (graph) {
    try {
      await chooseOutputDevice(graph.context, outputId)
    } catch (error) {
      return put({ error: `That output was refused: ${error instanceof Error ? error.message : String(error)}` })
    }
  }
  put({ outputId })
}
