// The page as it is shipped, built into a folder of its own and served with its policy headers, for benchmarks in the browser.
import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { type Browser, chromium } from '@playwright/test'
import { build, preview } from 'vite'
import { findChromium } from '../tools.ts'

export interface ServedPage {
  readonly url: string
  readonly browser: Browser
  close(): Promise<void>
}

const configFile = path.join(path.dirname(fileURLToPath(import.meta.url)), '..', '..', 'vite.config.ts')

/** Builds, serves and opens a browser without GPU. The caller closes it. */
export async function servePage(): Promise<ServedPage> {
  const outDir = await mkdtemp(path.join(tmpdir(), 'combwright-bench-'))
  await build({ configFile, logLevel: 'error', build: { outDir, emptyOutDir: true } })
  const server = await preview({ configFile, logLevel: 'error', build: { outDir }, preview: { port: 0, host: 'localhost' } })
  const browser = await chromium.launch({
    executablePath: findChromium(),
    args: ['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-background-networking', '--mute-audio'],
  })
  return {
    url: server.resolvedUrls?.local[0] ?? '',
    browser,
    async close() {
      await browser.close()
      await server.close()
      await rm(outDir, { recursive: true, force: true })
    },
  }
}
