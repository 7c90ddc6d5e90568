// The AudioWorklet processor: browser on one side, audition.ts on the other. One node, one input (live), one output of two channels.
import { BUILD_ID } from '../buildId.ts'
import { type Audition, createAudition, receive, render, takeUnused } from './audition.ts'
import { type FromProcessor, PROCESSOR_NAME, type ProcessorOptions, type ToProcessor } from './messages.ts'
import { openSharedReport, publishReport, type SharedReport } from './report.ts'

// The scope of an audio worklet, which lib.dom does not describe.
declare const sampleRate: number
declare const currentFrame: number
declare class AudioWorkletProcessor {
  readonly port: MessagePort
}
declare function registerProcessor(
  name: string,
  make: new (options: { readonly processorOptions: ProcessorOptions }) => AudioWorkletProcessor,
): void

class AuditionProcessor extends AudioWorkletProcessor {
  private readonly audition: Audition | null
  private readonly shared: SharedReport | null
  private closed = false
  /** The page has read the last report and can be seen. */
  private mayReport = true
  private hidden = false
  /** A report came while the last was still unread: it goes with the answer, so that the one saying "paused" is never lost. */
  private waiting = false

  constructor({ processorOptions }: { readonly processorOptions: ProcessorOptions }) {
    super()
    const matches = processorOptions.buildId === BUILD_ID
    this.audition = matches ? createAudition(processorOptions.set, sampleRate, processorOptions.settings) : null
    this.shared = processorOptions.shared ? openSharedReport(processorOptions.shared) : null
    this.port.onmessage = (event: MessageEvent<ToProcessor>) => this.take(event.data)
    this.say({ type: matches ? 'ready' : 'refused', buildId: BUILD_ID })
  }

  process(inputs: readonly (readonly Float32Array[])[], outputs: readonly (readonly Float32Array[])[]): boolean {
    const { audition } = this
    const output = outputs[0]
    if (audition === null || output === undefined || this.closed) return false
    const due = render(audition, inputs[0] ?? NO_INPUT, output, currentFrame)
    if (due) this.publish(audition.report)
    return true
  }

  private publish(report: Float64Array): void {
    if (this.hidden) return
    if (this.shared !== null) publishReport(this.shared, report)
    else if (this.mayReport) {
      this.mayReport = false
      this.port.postMessage(report)
    } else this.waiting = true
  }

  private take(message: ToProcessor): void {
    if (message.type === 'close') this.closed = true
    else if (message.type === 'read') this.read()
    else if (message.type === 'hidden') this.hidden = message.hidden
    else if (this.audition !== null) receive(this.audition, message)
    this.returnUnused()
  }

  private read(): void {
    this.mayReport = true
    if (!this.waiting || this.audition === null) return
    this.waiting = false
    this.publish(this.audition.report)
  }

  /** Between quanta, with whatever message comes next: memory that is no longer read goes home. */
  private returnUnused(): void {
    if (this.audition === null) return
    for (let memory = takeUnused(this.audition); memory !== null; memory = takeUnused(this.audition)) {
      const own = memory.channels.map((samples) => samples.buffer).filter((buffer): buffer is ArrayBuffer => buffer instanceof ArrayBuffer)
      this.port.postMessage({ type: 'freed', id: memory.id, channels: memory.channels } satisfies FromProcessor, own)
    }
  }

  private say(message: FromProcessor): void {
    this.port.postMessage(message)
  }
}

const NO_INPUT: readonly Float32Array[] = []

registerProcessor(PROCESSOR_NAME, AuditionProcessor)
