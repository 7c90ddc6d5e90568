// Row 6 of design 13: main-thread work a frame while sound plays and two plots are live; frames a second.
import type { Page } from '@playwright/test'
import { start } from '../../e2e/audioPage.ts'
import { openSet, pane, reading } from '../../e2e/plotsPage.ts'
import type { Bench, Row } from './bench.ts'
import { frameWork, quantile, TRACED, type TraceEvent } from './mainThreadWork.ts'
import { servePage } from './servedPage.ts'

const SECONDS = 15
const SET = {
  'line.baseMs': 12,
  'sweep.depthMs': 2.5,
  'sweep.rateHz': 0.4,
  'loop.feedback': 0.6,
  'loop.dampingHz': 6500,
} as const

/** The heaviest pair: a stereo set of three voices, its response and its loop, both moving with the sound. */
export const pageFrame: Bench = {
  id: 'page-frame',
  title: 'Page: main-thread work a frame, two plots live',
  async run(): Promise<Row[]> {
    const served = await servePage()
    try {
      const page = await served.browser.newPage({ viewport: { width: 1366, height: 768 } })
      await page.goto(served.url)
      await openSet(page, SET)
      await pane(page, 1).getByRole('tab', { name: 'Loop' }).click()
      await start(page)
      await reading(pane(page, 1)).filter({ hasText: 'largest pole' }).waitFor()
      await page.waitForTimeout(3000)
      const { cpuMs, clockMs, apartMs } = frameWork(await traced(page, SECONDS))
      const fps = 1000 / (apartMs.reduce((sum, ms) => sum + ms, 0) / apartMs.length)
      return [
        {
          what: 'main-thread work a frame, p95, processor time',
          value: quantile(cpuMs, 0.95),
          unit: 'ms',
          target: '≤ 8 ms',
          met: quantile(cpuMs, 0.95) <= 8,
        },
        { what: 'the same, median', value: quantile(cpuMs, 0.5), unit: 'ms' },
        { what: 'the same by the clock, p95', value: quantile(clockMs, 0.95), unit: 'ms' },
        { what: 'frames a second', value: fps, unit: '1/s', target: '60', met: fps >= 59 },
      ]
    } finally {
      await served.close()
    }
  },
}

async function traced(page: Page, seconds: number): Promise<TraceEvent[]> {
  const session = await page.context().browser()?.newBrowserCDPSession()
  if (!session) throw new TypeError('this browser gives no tracing session')
  const events: TraceEvent[] = []
  session.on('Tracing.dataCollected', ({ value }) => events.push(...(value as unknown as TraceEvent[])))
  const complete = new Promise<void>((done) => session.once('Tracing.tracingComplete', () => done()))
  await session.send('Tracing.start', { transferMode: 'ReportEvents', traceConfig: { includedCategories: TRACED } })
  await page.waitForTimeout(seconds * 1000)
  await session.send('Tracing.end')
  await complete
  return events
}
