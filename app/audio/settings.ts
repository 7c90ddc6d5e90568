// What the processor is told of session and view, as one state; and the set, at most one a frame.
import { flatten } from '../../src/set/flat.ts'
import { heardSet, subscribeHeard } from '../state/heard.ts'
import { LEVEL_MIN_DB, type SessionState, useSession } from '../state/session.ts'
import { useView } from '../state/view.ts'
import { currentGraph } from './currentGraph.ts'
import { post } from './graph.ts'
import type { Settings } from './worklet/messages.ts'

/** Linear gain of a level; the lowest one is silence. */
export const levelGain = (db: number): number => (db <= LEVEL_MIN_DB ? 0 : 10 ** (db / 20))

/** Equal loudness compares the effect with the bypassed sound: in hard bypass and while only tails ring there is nothing to compare. */
const isHeardThroughEffect = ({ bypass }: SessionState) => bypass === 'off' || bypass === 'wetOnly'

export function settingsNow(): Settings {
  const session = useSession.getState()
  const equal = session.equalLoudness && isHeardThroughEffect(session)
  const isLive = session.source.kind === 'live'
  return {
    playing: session.playing,
    muted: session.muted,
    level: levelGain(session.levelDb),
    bypass: session.bypass,
    delayChange: session.delayChange,
    held: useView.getState().held,
    toneHz: session.toneHz,
    equalDb: equal && !isLive ? (session.equalDb ?? 0) : 0,
    equalLive: equal && isLive,
    inputOpen: isLive && session.headphones,
  }
}

let sent = ''

/** Sends the settings if they differ from those sent last. Mute must not wait for a frame, so nothing does. */
export function sendSettings(): void {
  const graph = currentGraph()
  if (!graph) return
  const settings = settingsNow()
  const text = JSON.stringify(settings)
  if (text === sent) return
  sent = text
  post(graph, { type: 'settings', settings })
}

/** A new graph knows nothing yet. */
export function forgetSentSettings(): void {
  sent = ''
}

let setIsDue = false

function sendSetSoon(): void {
  if (setIsDue) return
  setIsDue = true
  const send = () => {
    setIsDue = false
    sendSet()
  }
  // Hidden pages get no animation frames.
  if (document.visibilityState === 'visible') requestAnimationFrame(send)
  else setTimeout(send, 16)
}

export function sendSet(): void {
  const graph = currentGraph()
  if (graph) post(graph, { type: 'set', flat: flatten(heardSet()) })
}

let following = false

/** From the first sound on, follows what the processor must know. */
export function followState(): void {
  if (following) return
  following = true
  subscribeHeard(sendSetSoon)
  useSession.subscribe(sendSettings)
  useView.subscribe((now, before) => {
    if (now.held !== before.held) sendSettings()
  })
}
