// Row 5 of design 13: how busy the audio thread is while the built page plays eight stereo voices at 48 kHz, quantum by quantum, and whether sound
// dropped out. COMBWRIGHT_LIVE_SECONDS=600 makes it the ten minutes of the design.
import { dropSet, start } from '../../e2e/audioPage.ts'
import type { Bench, Row } from './bench.ts'
import { quantile, type TraceEvent } from './mainThreadWork.ts'
import { servePage } from './servedPage.ts'

const TARGET = 0.1
const QUANTUM_US = (128 / 48_000) * 1e6
const SECONDS = Number(process.env.COMBWRIGHT_LIVE_SECONDS ?? 30)

const EIGHT_VOICES = {
  layout: 'stereo',
  'line.interpolation': 'lagrange3',
  'line.baseMs': 14,
  'voices.count': 8,
  'voices.spreadMs': 6,
  'sweep.depthMs': 2.5,
  'sweep.stereoPhase': 90,
  'loop.feedback': 0.4,
  'loop.dampingHz': 6500,
  'loop.lowCutHz': 80,
  'mix.wetHighCutHz': 9000,
} as const

export const pageWorkletLive: Bench = {
  id: 'page-worklet-live',
  title: 'Live: audio thread busy, 8 voices stereo, 48 kHz',
  async run(): Promise<Row[]> {
    const served = await servePage()
    try {
      const page = await served.browser.newPage({ viewport: { width: 1366, height: 768 } })
      await page.goto(served.url)
      await dropSet(page, EIGHT_VOICES)
      await start(page)
      await page.waitForTimeout(5000)
      const session = await served.browser.newBrowserCDPSession()
      const busy: { clock: number[]; thread: number[] } = { clock: [], thread: [] }
      let glitches = 0
      session.on('Tracing.dataCollected', ({ value }) => {
        for (const { name, dur, tdur } of value as unknown as (TraceEvent & { readonly tdur?: number })[]) {
          if (name === 'Glitch!') glitches += 1
          if (name !== 'RealtimeAudioDestinationHandler::Render' || dur === undefined) continue
          busy.clock.push(dur / QUANTUM_US)
          if (tdur !== undefined) busy.thread.push(tdur / QUANTUM_US)
        }
      })
      const complete = new Promise<void>((done) => session.once('Tracing.tracingComplete', () => done()))
      await session.send('Tracing.start', { transferMode: 'ReportEvents', traceConfig: { includedCategories: ['webaudio', 'audio'] } })
      await page.waitForTimeout(SECONDS * 1000)
      await session.send('Tracing.end')
      await complete
      // Time the thread itself worked; by the clock it also counts what the machine did in between.
      const ofThread = busy.thread.length > 0
      const measured = ofThread ? busy.thread : busy.clock
      const p99 = quantile(measured, 0.99)
      const kind = ofThread ? 'thread time' : 'by the clock'
      return [
        { what: `audio thread busy at p99, ${kind}`, value: 100 * p99, unit: '% of the quantum', target: '≤ 10 %', met: p99 <= TARGET },
        { what: 'the same, median', value: 100 * quantile(measured, 0.5), unit: '% of the quantum' },
        ...(ofThread ? [{ what: 'the same by the clock, p99', value: 100 * quantile(busy.clock, 0.99), unit: '% of the quantum' }] : []),
        { what: 'quanta measured', value: busy.clock.length, unit: '' },
        { what: `dropouts in ${SECONDS} s`, value: glitches, unit: '', target: '0', met: glitches === 0 },
      ]
    } finally {
      await served.close()
    }
  },
}
