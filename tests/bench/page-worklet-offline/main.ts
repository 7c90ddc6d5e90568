// Runs in the browser: renders the same effect offline by the page's own processor and by native nodes, and gives the seconds each took.
import { BUILD_ID } from '../../../app/audio/buildId.ts'
import { PROCESSOR_NAME, type ProcessorOptions, type ToProcessor } from '../../../app/audio/worklet/messages.ts'
import processorUrl from '../../../app/audio/worklet/processor.ts?worker&url'
import type { ParameterSet } from '../../../src/set/types.ts'
import { LISTENER } from '../../app/audio/worklet/listener.ts'

const FS = 48_000

export interface Rendered {
  readonly seconds: number
  /** Root mean square of the last second of channel 0: proof that both made sound, and alike. */
  readonly rms: number
}

/** The same two channels of noise for both, −20 dBFS, repeating every 4 s. */
function noise(): [Float32Array<ArrayBuffer>, Float32Array<ArrayBuffer>] {
  let seed = 1
  const channel = () =>
    Float32Array.from({ length: 4 * FS }, () => {
      seed = (Math.imul(seed, 1664525) + 1013904223) | 0
      return (0.1732 * seed) / 2 ** 31
    })
  return [channel(), channel()]
}

async function timed(context: OfflineAudioContext): Promise<Rendered> {
  const start = performance.now()
  const buffer = await context.startRendering()
  const seconds = (performance.now() - start) / 1000
  const last = buffer.getChannelData(0).subarray(-FS)
  return { seconds, rms: Math.sqrt(last.reduce((sum, x) => sum + x * x, 0) / last.length) }
}

async function byWorklet(set: ParameterSet, length: number): Promise<Rendered> {
  const context = new OfflineAudioContext(2, length, FS)
  await context.audioWorklet.addModule(processorUrl)
  const processorOptions: ProcessorOptions = { buildId: BUILD_ID, set, settings: LISTENER, shared: null }
  const node = new AudioWorkletNode(context, PROCESSOR_NAME, { numberOfInputs: 1, outputChannelCount: [2], processorOptions })
  const ready = new Promise((resolve) => {
    node.port.onmessage = resolve
  })
  node.connect(context.destination)
  await ready
  const source = { type: 'sample', id: 1, channels: noise(), circular: true, start: 0, end: 4 * FS } as const
  node.port.postMessage({ type: 'source', source } satisfies ToProcessor)
  // Nothing answers; the message is through long before this.
  await new Promise((resolve) => setTimeout(resolve, 200))
  return timed(context)
}

/**
 * The nearest native graph for a set without loop: for each channel and voice a DelayNode (which interpolates linearly) whose delayTime is
 * moved at audio rate by an oscillator with the voice's phase; sum, wet, and a dry path. A loop cannot be compared: a native cycle delays by
 * a whole quantum at least.
 */
function byNative(set: ParameterSet, length: number): Promise<Rendered> {
  const context = new OfflineAudioContext(2, length, FS)
  const buffer = context.createBuffer(2, 4 * FS, FS)
  noise().forEach((samples, c) => {
    buffer.copyToChannel(samples, c)
  })
  const source = new AudioBufferSourceNode(context, { buffer, loop: true })
  source.start()
  const splitter = new ChannelSplitterNode(context, { numberOfOutputs: 2 })
  const merger = new ChannelMergerNode(context, { numberOfInputs: 2 })
  source.connect(splitter)
  const { count, phaseSpread, spreadMs } = set.voices
  for (let c = 0; c < 2; c++) {
    splitter.connect(new GainNode(context, { gain: set.mix.dry }), c).connect(merger, 0, c)
    const wet = new GainNode(context, { gain: set.mix.wet / Math.sqrt(count) })
    wet.connect(merger, 0, c)
    for (let v = 0; v < count; v++) {
      const offsetMs = count === 1 ? 0 : spreadMs * (v / (count - 1) - 0.5)
      const cycles = set.sweep.startPhase + (v * phaseSpread) / (360 * count) + (c * set.sweep.stereoPhase) / 360
      const delay = new DelayNode(context, { maxDelayTime: 0.1, delayTime: (set.line.baseMs + offsetMs) / 1000 })
      sweepOf(context, set.sweep.rateHz, cycles)
        .connect(new GainNode(context, { gain: set.sweep.depthMs / 1000 }))
        .connect(delay.delayTime)
      splitter.connect(delay, c).connect(wet)
    }
  }
  merger.connect(context.destination)
  return timed(context)
}

/** sin 2π(ft + cycles) as an oscillator: cos and sin parts of the first harmonic. */
function sweepOf(context: OfflineAudioContext, hz: number, cycles: number): OscillatorNode {
  const real = Float32Array.of(0, Math.sin(2 * Math.PI * cycles))
  const imag = Float32Array.of(0, Math.cos(2 * Math.PI * cycles))
  const periodicWave = new PeriodicWave(context, { real, imag, disableNormalization: true })
  const oscillator = new OscillatorNode(context, { frequency: hz, periodicWave })
  oscillator.start()
  return oscillator
}

export interface Comparison {
  readonly worklet: Rendered
  readonly native: Rendered
}

/** Called from the benchmark. */
async function compare(set: ParameterSet, seconds: number): Promise<Comparison> {
  const length = seconds * FS
  // In turn, so that a change of the machine's load meets both alike; the first of each warms up.
  return { worklet: await byWorklet(set, length), native: await byNative(set, length) }
}

Object.assign(globalThis, { compare })
