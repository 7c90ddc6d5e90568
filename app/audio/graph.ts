// One audio graph: context, processor node, and the messages between them. Made inside a press, replaced as a whole when the rate changes.
import type { AudioContext, IAudioWorkletNode } from 'standardized-audio-context'
import type { ParameterSet } from '../../src/set/types.ts'
import { BUILD_ID } from './buildId.ts'
import { type FromProcessor, PROCESSOR_NAME, type ProcessorOptions, type Settings, type ToProcessor } from './worklet/messages.ts'
import processorUrl from './worklet/processor.ts?worker&url'
import { SHARED_BYTES } from './worklet/report.ts'
import { loadWrapper, wrapper } from './wrapper.ts'

export interface Graph {
  readonly context: AudioContext
  readonly node: IAudioWorkletNode<AudioContext>
  /** Rate the context really runs at, Hz, and the set's rate it was asked for. */
  readonly rate: number
  readonly askedRate: number
  /** Reports come through here where the page is isolated. */
  readonly shared: SharedArrayBuffer | null
}

/** Why no sound can be made, in words for the user. */
export class SoundRefused extends Error {}

const NO_WORKLET = 'Browsers let a page make sound this way only over https or from localhost.'

/** Makes a context at `rate` Hz, or at the device's own rate where that is refused. Call it inside the press, once the wrapper is there. */
export function makeContext(rate: number): AudioContext {
  const parts = wrapper()
  if (!parts) throw new RangeError('the audio wrapper has not been loaded')
  if (!globalThis.isSecureContext || parts.addAudioWorkletModule === undefined) throw new SoundRefused(NO_WORKLET)
  try {
    return new parts.AudioContext({ sampleRate: rate, latencyHint: 'interactive' })
  } catch {
    return makeContextAtDeviceRate()
  }
}

export function makeContextAtDeviceRate(): AudioContext {
  const parts = wrapper()
  if (!parts) throw new RangeError('the audio wrapper has not been loaded')
  return new parts.AudioContext({ latencyHint: 'interactive' })
}

export interface GraphOptions {
  readonly askedRate: number
  readonly set: ParameterSet
  readonly settings: Settings
}

/** Loads the processor into the context and waits until it has answered with the same build. */
export async function openGraph(context: AudioContext, { askedRate, set, settings }: GraphOptions): Promise<Graph> {
  const { addAudioWorkletModule, AudioWorkletNode } = await loadWrapper()
  if (addAudioWorkletModule === undefined || AudioWorkletNode === undefined) throw new SoundRefused(NO_WORKLET)
  await addAudioWorkletModule(context, processorUrl)
  const shared = globalThis.crossOriginIsolated ? new SharedArrayBuffer(SHARED_BYTES) : null
  const processorOptions: ProcessorOptions = { buildId: BUILD_ID, set, settings, shared }
  const node = new AudioWorkletNode(context, PROCESSOR_NAME, {
    numberOfInputs: 1,
    numberOfOutputs: 1,
    outputChannelCount: [2],
    processorOptions,
  })
  const answered = answerOf(node)
  node.connect(context.destination)
  await answered
  return { context, node, rate: context.sampleRate, askedRate, shared }
}

export function post(graph: Graph, message: ToProcessor, transfer: readonly Transferable[] = []): void {
  graph.node.port.postMessage(message, [...transfer])
}

export async function closeGraph(graph: Graph): Promise<void> {
  post(graph, { type: 'close' })
  graph.node.disconnect()
  if (graph.context.state !== 'closed') await graph.context.close()
}

const ANSWER_MS = 8000

function answerOf(node: IAudioWorkletNode<AudioContext>): Promise<void> {
  return new Promise((resolve, reject) => {
    const timer = setTimeout(() => reject(new SoundRefused('The audio part of the page did not answer.')), ANSWER_MS)
    const settle = (act: () => void) => {
      clearTimeout(timer)
      node.port.onmessage = null
      node.onprocessorerror = null
      act()
    }
    node.onprocessorerror = () => settle(() => reject(new SoundRefused('The audio part of the page stopped while starting.')))
    node.port.onmessage = ({ data }: MessageEvent<FromProcessor>) => {
      if (data instanceof Float64Array) return
      if (data.type === 'ready' && data.buildId === BUILD_ID) settle(resolve)
      else if (data.type === 'ready' || data.type === 'refused')
        settle(() => reject(new SoundRefused('This page and its audio part are from different builds: reload the page.')))
    }
  })
}
