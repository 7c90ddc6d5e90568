// The life of the sound: made in the first press, replaced when the set's rate changes, paused, interrupted, restarted. Outside React, once.
import type { AudioContext } from 'standardized-audio-context'
import { currentSet, useCurrent } from '../state/current.ts'
import { useSession } from '../state/session.ts'
import { createStallWatch } from './clock.ts'
import { currentGraph, setCurrentGraph } from './currentGraph.ts'
import { followEqualLoudness } from './equalLoudness.ts'
import { closeGraph, type Graph, makeContext, makeContextAtDeviceRate, openGraph, SoundRefused } from './graph.ts'
import { connectInput, watchDevices } from './input.ts'
import { reloadMaterial } from './material.ts'
import { chooseOutputDevice, isInterrupted, onContextState } from './nativeContext.ts'
import { followReports, stopReports } from './reports.ts'
import { followState, forgetSentSettings, sendSet, sendSettings, settingsNow } from './settings.ts'
import { loadWrapper, wrapper } from './wrapper.ts'

/** Counts openings: one that was overtaken closes itself. */
let opening = 0
let stopWatching = () => {}
let watchesRate = false

/** Starts or goes on sounding. Call inside the press. */
export function startSound(): void {
  useSession.setState({ playing: true, error: null })
  const graph = currentGraph()
  if (graph) {
    void graph.context.resume()
    sendSettings()
  } else if (useSession.getState().status !== 'starting') open()
}

/** Long enough for the processor's fade. */
const SUSPEND_MS = 300

export function pauseSound(): void {
  useSession.setState({ playing: false })
  sendSettings()
  setTimeout(() => {
    const graph = currentGraph()
    if (graph && !useSession.getState().playing && graph.context.state === 'running') void graph.context.suspend()
  }, SUSPEND_MS)
}

/** A fresh graph in place of one that stopped, stood still or was interrupted. Call inside the press. */
export function restartSound(): void {
  useSession.setState({ playing: true, error: null })
  open()
}

/** Makes the context at once, so that it counts as made in the press; the rest follows. `atDevice`: the set's rate was refused. */
function open(atDevice = false): void {
  const mine = ++opening
  useSession.setState({ status: 'starting' })
  if (wrapper() !== null) make(mine, atDevice)
  else
    loadWrapper().then(
      () => mine === opening && make(mine, atDevice),
      () => mine === opening && fail(new SoundRefused('The audio part of the page could not be fetched: try again.')),
    )
}

function make(mine: number, atDevice: boolean): void {
  const askedRate = currentSet().sampleRate
  let context: AudioContext
  try {
    context = atDevice ? makeContextAtDeviceRate() : makeContext(askedRate)
  } catch (error) {
    fail(error)
    return
  }
  void context.resume().catch(() => {})
  void finish(context, askedRate, mine)
}

async function finish(context: AudioContext, askedRate: number, mine: number): Promise<void> {
  let graph: Graph
  try {
    graph = await openGraph(context, { askedRate, set: currentSet(), settings: { ...settingsNow(), playing: false } })
  } catch (error) {
    if (context.state !== 'closed') void context.close()
    if (mine === opening) fail(error)
    return
  }
  if (mine !== opening) return void closeGraph(graph)
  const old = currentGraph()
  setCurrentGraph(graph)
  forgetSentSettings()
  follow()
  followReports(graph)
  watch(graph)
  useSession.setState({ status: 'running', contextRate: graph.rate, remark: rateRemark(graph), guard: null, guardState: null })
  if (old) void closeGraph(old)
  sendSet()
  if (!connectInput() && graph.rate === askedRate) return open(true)
  await reloadMaterial()
  if (mine !== opening) return
  sendSettings()
  await restoreOutput(graph)
  if (!useSession.getState().playing) pauseSound()
}

function fail(error: unknown): void {
  const text =
    error instanceof SoundRefused ? error.message : `No sound could be started: ${error instanceof Error ? error.message : String(error)}`
  useSession.setState({ status: 'failed', playing: false, error: text })
}

function follow(): void {
  followState()
  followEqualLoudness()
  if (watchesRate) return
  watchesRate = true
  watchDevices()
  // Within the press that changed the rate; while it is being dragged the old rate goes on.
  useCurrent.subscribe((now) => {
    const graph = currentGraph()
    if (graph && !now.inGesture && now.set.sampleRate !== graph.askedRate) open()
  })
}

/** Live input may not join this context's rate: reopen at the device's. */
export function reopenAtDeviceRate(): void {
  open(true)
}

const kHz = (hz: number) => Number((hz / 1000).toFixed(3))

export function rateRemark({ rate, askedRate }: Pick<Graph, 'rate' | 'askedRate'>): string | null {
  return rate === askedRate ? null : `heard at ${kHz(rate)} kHz, set at ${kHz(askedRate)}`
}

async function restoreOutput(graph: Graph): Promise<void> {
  const { outputId } = useSession.getState()
  if (outputId === '') return
  await chooseOutputDevice(graph.context, outputId).catch(() => useSession.setState({ outputId: '' }))
}

const STALL_MS = 1000

const INTERRUPTED = 'The system interrupted the sound.'

/** States, the clock and the processor's own end. */
function watch(graph: Graph): void {
  stopWatching()
  let isStalled = createStallWatch(STALL_MS)
  const onState = () => {
    if (isInterrupted(graph.context)) useSession.setState({ status: 'interrupted', error: INTERRUPTED })
    else if (graph.context.state === 'running' && useSession.getState().status === 'interrupted')
      useSession.setState({ status: 'running', error: null })
  }
  const stopState = onContextState(graph.context, onState)
  const timer = setInterval(() => {
    const { playing, status } = useSession.getState()
    // While paused the clock may stand: watching starts afresh with Play.
    if (!playing || status !== 'running') isStalled = createStallWatch(STALL_MS)
    else if (isStalled(graph.context.currentTime, performance.now()))
      useSession.setState({ status: 'failed', error: 'The sound has stopped: the audio clock stands still.' })
  }, 250)
  graph.node.onprocessorerror = () =>
    useSession.setState({ status: 'failed', error: 'The sound has stopped: the audio part of the page failed.' })
  stopWatching = () => {
    stopState()
    clearInterval(timer)
    graph.node.onprocessorerror = null
  }
}

/** Ends everything; for tests and hot reload. */
export async function closeSound(): Promise<void> {
  opening += 1
  stopWatching()
  stopReports()
  const graph = currentGraph()
  setCurrentGraph(null)
  useSession.setState({ status: 'idle', playing: false })
  if (graph) await closeGraph(graph)
}
