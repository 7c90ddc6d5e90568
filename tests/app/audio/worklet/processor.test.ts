import { beforeAll, describe, expect, it } from 'vitest'
import { BUILD_ID } from '../../../../app/audio/buildId.ts'
import { type ProcessorOptions, REPORT, REPORT_LENGTH, type ToProcessor } from '../../../../app/audio/worklet/messages.ts'
import { openSharedReport, SHARED_BYTES } from '../../../../app/audio/worklet/report.ts'
import { defaultSet } from '../../../../src/set/defaults.ts'
import { LISTENER } from './listener.ts'

// A worklet's scope, as far as the processor uses it (W3C Web Audio, AudioWorkletGlobalScope).
class FakePort {
  readonly sent: unknown[] = []
  onmessage: ((event: { readonly data: ToProcessor }) => void) | null = null
  postMessage(message: unknown): void {
    this.sent.push(message instanceof Float64Array ? message.slice() : message)
  }
}

interface Processor {
  readonly port: FakePort
  process(inputs: readonly (readonly Float32Array[])[], outputs: readonly (readonly Float32Array[])[]): boolean
}

const scope = globalThis as unknown as Record<string, unknown>
let Made: new (options: { readonly processorOptions: ProcessorOptions }) => Processor

beforeAll(async () => {
  scope.sampleRate = 48_000
  scope.currentFrame = 0
  scope.AudioWorkletProcessor = class {
    readonly port = new FakePort()
  }
  scope.registerProcessor = (_name: string, processor: typeof Made) => {
    Made = processor
  }
  await import('../../../../app/audio/worklet/processor.ts')
})

const make = (options: Partial<ProcessorOptions> = {}) =>
  new Made({ processorOptions: { buildId: BUILD_ID, set: defaultSet(), settings: LISTENER, shared: null, ...options } })

const say = (processor: Processor, message: ToProcessor) => processor.port.onmessage?.({ data: message })

function run(processor: Processor, quanta: number): boolean {
  let goesOn = true
  for (let q = 0; q < quanta; q++) goesOn = processor.process([[]], [[new Float32Array(128), new Float32Array(128)]])
  return goesOn
}

const reports = ({ port }: Processor) => port.sent.filter((message): message is Float64Array => message instanceof Float64Array)

describe('the processor', () => {
  it('answers with its build, and refuses a page of another: silent, and done', () => {
    expect(make().port.sent).toEqual([{ type: 'ready', buildId: BUILD_ID }])
    const other = make({ buildId: 'another' })
    expect(other.port.sent).toEqual([{ type: 'refused', buildId: BUILD_ID }])
    expect(run(other, 1)).toBe(false)
  })

  it('sends one report, and the next only after it was read', () => {
    const processor = make()
    run(processor, 100)
    expect(reports(processor).length).toBe(1)
    say(processor, { type: 'read' })
    expect(reports(processor).length).toBe(2)
    say(processor, { type: 'read' })
    run(processor, 20)
    expect(reports(processor).length).toBe(3)
  })

  it('loses no report that says “paused”, even when the one before was not yet read', () => {
    const processor = make()
    run(processor, 100)
    say(processor, { type: 'settings', settings: { ...LISTENER, playing: false } })
    run(processor, 100)
    say(processor, { type: 'read' })
    expect(reports(processor).at(-1)?.[REPORT.running]).toBe(0)
  })

  it('reports nothing while the page is hidden', () => {
    const processor = make()
    say(processor, { type: 'hidden', hidden: true })
    run(processor, 100)
    expect(reports(processor).length).toBe(0)
  })

  it('uses shared memory where it is given, without a message', () => {
    const memory = new SharedArrayBuffer(SHARED_BYTES)
    const processor = make({ shared: memory })
    run(processor, 100)
    expect(reports(processor).length).toBe(0)
    expect(openSharedReport(memory).report[REPORT.running]).toBe(1)
    expect(openSharedReport(memory).report.length).toBe(REPORT_LENGTH)
  })

  it('sends sample memory home once another has taken its place', () => {
    const processor = make()
    const channels = [new Float32Array(1000)]
    const sample = (id: number) =>
      ({ type: 'source', source: { type: 'sample', id, channels, circular: true, start: 0, end: 1000 } }) as const
    say(processor, sample(1))
    run(processor, 20)
    say(processor, sample(2))
    run(processor, 20)
    say(processor, { type: 'read' })
    expect(processor.port.sent.filter((message) => (message as { type?: string }).type === 'freed')).toEqual([
      { type: 'freed', id: 1, channels },
    ])
  })

  it('takes any quantum, mono or no output, and ends when closed', () => {
    const processor = make()
    for (const frames of [1, 64, 128, 300, 2048]) expect(processor.process([[]], [[new Float32Array(frames)]])).toBe(true)
    expect(processor.process([], [[]])).toBe(true)
    say(processor, { type: 'close' })
    expect(run(processor, 1)).toBe(false)
  })
})
