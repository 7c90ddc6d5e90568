// When equal loudness is measured: after a gesture has ended, over the repeat region, in the material worker. Live input measures itself in
// the processor.
import { currentSet, useCurrent } from '../state/current.ts'
import { useSession } from '../state/session.ts'
import { askMaterial } from '../workers/materialClient.ts'
import { currentGraph } from './currentGraph.ts'
import { loadedMaterial, TONE_ID } from './material.ts'

/** Steps of the arrow keys come as commits of their own. */
const SETTLE_MS = 250

let timer: ReturnType<typeof setTimeout> | undefined
let measured = ''
let following = false

function measureSoon(): void {
  clearTimeout(timer)
  timer = setTimeout(() => void measure(), SETTLE_MS)
}

async function measure(): Promise<void> {
  const session = useSession.getState()
  const { source, bypass, equalLoudness, repeat, toneHz } = session
  if (!equalLoudness || source.kind === 'live' || bypass === 'hard' || bypass === 'tails' || useCurrent.getState().inGesture) return
  const set = currentSet()
  const rate = currentGraph()?.rate ?? set.sampleRate
  const isTone = source.kind === 'phrase' && source.id === TONE_ID
  const material = loadedMaterial()
  if (!isTone && (material === null || material.rate !== rate)) return
  const of = isTone ? { toneHz } : { memory: material?.memory ?? 0 }
  const { startS, endS } = repeat ?? { startS: 0, endS: material?.seconds ?? 0 }
  const { panel: _panel, limits: _limits, target: _target, notes: _notes, name: _name, ...heard } = set
  const key = JSON.stringify([heard, bypass, of, rate, startS, endS])
  if (key === measured && session.equalDb !== null) return
  const reply = await askMaterial({ kind: 'measure', set, bypass, of, rate, startS, endS })
  if (!reply.ok || !('gainDb' in reply)) return
  measured = key
  useSession.setState({ equalDb: reply.gainDb })
}

/** From the first use on, measures whenever what it depends on has settled. */
export function followEqualLoudness(): void {
  if (following) return
  following = true
  useCurrent.subscribe((now, before) => {
    if (now.set !== before.set || now.inGesture !== before.inGesture) measureSoon()
  })
  useSession.subscribe((now, before) => {
    const changed =
      now.equalLoudness !== before.equalLoudness ||
      now.bypass !== before.bypass ||
      now.source !== before.source ||
      now.repeat !== before.repeat ||
      now.overview !== before.overview ||
      now.toneHz !== before.toneHz ||
      now.contextRate !== before.contextRate
    if (changed) measureSoon()
  })
  measureSoon()
}
