// Row 3 of design 13: the page's processor, whole as it ships (player, engine, guard, meters, listening chain), rendering offline in Chromium against
// the nearest graph of native nodes. The figure is native time over ours: how many times as fast the processor is.
import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { chromium, type Page } from '@playwright/test'
import { build, preview } from 'vite'
import { setWith } from '../../e2e/audioPage.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { findChromium } from '../tools.ts'
import type { Bench, Row } from './bench.ts'
import type { Comparison } from './page-worklet-offline/main.ts'

const TARGET = 2.5
/** Long enough that compiling, which each context begins anew, weighs little; the best of some rounds, since the machine may be busy. */
const SECONDS = 120
const ROUNDS = 4

const chorus = (voices: number, interpolation: string): ParameterSet =>
  setWith({
    layout: 'stereo',
    'voices.count': voices,
    'line.interpolation': interpolation,
    'line.baseMs': 12,
    'sweep.depthMs': 2.5,
    'sweep.stereoPhase': 90,
    'voices.spreadMs': 4,
    'mix.dry': 0.7071,
    'mix.wet': 0.7071,
  })

export const pageWorklet: Bench = {
  id: 'page-worklet',
  title: 'Worklet offline against native nodes, Chromium',
  async run(): Promise<Row[]> {
    const outDir = await mkdtemp(path.join(tmpdir(), 'combwright-worklet-'))
    const root = fileURLToPath(new URL('page-worklet-offline', import.meta.url))
    const common = { root, configFile: false, logLevel: 'error' } as const
    await build({ ...common, build: { outDir, emptyOutDir: true, target: 'es2023' }, worker: { format: 'es' } })
    const server = await preview({ ...common, build: { outDir }, preview: { port: 0, host: 'localhost' } })
    const browser = await chromium.launch({ executablePath: findChromium(), args: ['--no-sandbox', '--disable-gpu'] })
    try {
      const page = await browser.newPage()
      await page.goto(server.resolvedUrls?.local[0] ?? '')
      return [
        ...(await compared(page, '8 voices stereo, linear', chorus(8, 'linear'), true)),
        ...(await compared(page, '8 voices stereo, lagrange3 (native stays linear)', chorus(8, 'lagrange3'), false)),
        ...(await compared(page, '4 voices stereo, linear', chorus(4, 'linear'), false)),
        ...(await compared(page, '1 voice stereo, linear', chorus(1, 'linear'), false)),
      ]
    } finally {
      await browser.close()
      await server.close()
      await rm(outDir, { recursive: true, force: true })
    }
  },
}

async function compared(page: Page, what: string, set: ParameterSet, isRow: boolean): Promise<Row[]> {
  const rounds: Comparison[] = []
  for (let round = 0; round <= ROUNDS; round++) {
    const result = (await page.evaluate(
      ([one, seconds]) => (globalThis as unknown as { compare(set: unknown, seconds: number): Promise<unknown> }).compare(one, seconds),
      [set, SECONDS] as const,
    )) as Comparison
    checkAlike(what, result)
    if (round > 0) rounds.push(result)
  }
  const best = (pick: (one: Comparison) => number) => Math.min(...rounds.map(pick))
  const ratio = best((one) => one.native.seconds) / best((one) => one.worklet.seconds)
  return [
    {
      what: `${what}: native time / worklet time`,
      value: ratio,
      unit: '×',
      ...(isRow ? { target: `≥ ${TARGET} ×`, met: ratio >= TARGET } : {}),
    },
    { what: `${what}: worklet, times real time`, value: SECONDS / best((one) => one.worklet.seconds), unit: '×' },
  ]
}

/** Both must have made the same sound, or the times mean nothing: within half a decibel, since a linear read loses more treble than a cubic one. */
function checkAlike(what: string, { worklet, native }: Comparison): void {
  const apartDb = Math.abs(20 * Math.log10(worklet.rms / native.rms))
  if (!(apartDb < 0.5)) throw new RangeError(`${what}: worklet and native nodes differ by ${apartDb.toFixed(2)} dB; nothing was compared`)
}
