// Row 8 of design 13: what the browser fetches before the first press, gzipped.
import { gzipSync } from 'node:zlib'
import type { Bench, Row } from './bench.ts'
import { servePage } from './servedPage.ts'

const TARGET_KB = 230

export const pageSize: Bench = {
  id: 'page-size',
  title: 'Page: first load, gzipped',
  async run(): Promise<Row[]> {
    const served = await servePage()
    try {
      const page = await served.browser.newPage({ viewport: { width: 1366, height: 768 } })
      const sizes = new Map<string, number>()
      page.on('response', async (response) => {
        const { pathname } = new URL(response.url())
        if (response.ok()) sizes.set(pathname, gzipSync(await response.body(), { level: 9 }).length)
      })
      await page.goto(served.url)
      await page.waitForTimeout(5000)
      const kb = (keep: (name: string) => boolean) =>
        [...sizes].filter(([name]) => keep(name)).reduce((sum, [, bytes]) => sum + bytes, 0) / 1000
      // The long lane's code is fetched after the first answer, by the worker.
      const long = (name: string) => /\/(longChecks|panelChecks|registry)-/.test(name)
      const worker = (name: string) => /worker|processor/.test(name) || long(name)
      const all = kb(() => true)
      return [
        { what: 'everything fetched before the first press', value: all, unit: 'kB', target: `≤ ${TARGET_KB} kB`, met: all <= TARGET_KB },
        { what: 'of that, the page itself', value: kb((name) => !worker(name)), unit: 'kB' },
        { what: 'of that, workers', value: kb(worker), unit: 'kB' },
        { what: 'of that, what takes long, after the first answer', value: kb(long), unit: 'kB' },
      ]
    } finally {
      await served.close()
    }
  },
}
