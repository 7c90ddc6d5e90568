// What the audio specs share: starting sound from a real press, dropping files, reading the meters' numbers.
import { expect, type Page } from '@playwright/test'
import { writeWav } from '../src/media/wav.ts'
import { defaultSet } from '../src/set/defaults.ts'
import { withAt } from '../src/set/path.ts'
import type { ParameterSet } from '../src/set/types.ts'
import { writeSet } from '../src/set/write.ts'

/** A set from the defaults with fields replaced by path. */
export const setWith = (fields: Readonly<Record<string, unknown>>): ParameterSet =>
  Object.entries(fields).reduce((set, [path, value]) => withAt(set, path, value), defaultSet())

/** One line, nothing moving: what the output must be follows by hand. */
export const STILL = { layout: 'mono', 'sweep.rateHz': 0, 'sweep.depthMs': 0, 'voices.count': 1, 'voices.spreadMs': 0 } as const

export const sine = (seconds: number, hz: number, fs: number, peak: number): Float64Array =>
  Float64Array.from({ length: Math.round(seconds * fs) }, (_, n) => peak * Math.sin((2 * Math.PI * hz * n) / fs))

/** Drops one file on the page, as a hand would. */
export async function drop(page: Page, name: string, type: string, bytes: Uint8Array | string): Promise<void> {
  const base64 = Buffer.from(bytes).toString('base64')
  await page.evaluate(
    (file) => {
      const content = Uint8Array.from(atob(file.base64), (letter) => letter.charCodeAt(0))
      const dataTransfer = new DataTransfer()
      dataTransfer.items.add(new File([content], file.name, { type: file.type }))
      for (const kind of ['dragenter', 'dragover', 'drop'])
        document.body.dispatchEvent(new DragEvent(kind, { dataTransfer, bubbles: true, cancelable: true }))
    },
    { name, type, base64 },
  )
}

export async function dropSet(page: Page, fields: Readonly<Record<string, unknown>>): Promise<void> {
  await drop(page, 'dropped.set.json', 'application/json', writeSet(setWith({ name: 'Dropped', ...fields })))
}

/** A mono WAV of 2 s, 1 kHz at −6.02 dBFS unless said otherwise. The seam of its repeat is heard through a notch: nulls need a longer one. */
export async function dropTone(page: Page, { hz = 1000, fs = 48_000, peak = 0.5, seconds = 2, name = 'tone.wav' } = {}): Promise<void> {
  await drop(page, name, 'audio/wav', writeWav([sine(seconds, hz, fs, peak)], fs, 'float32'))
  await expect(source(page)).toContainText(name)
}

export const source = (page: Page) => page.getByRole('button', { name: /^Source:/ })
export const sound = (page: Page) => page.getByRole('region', { name: 'Sound', exact: true })
export const button = (page: Page, name: string | RegExp) => sound(page).getByRole('button', { name, exact: true })

/** The first press, with the caution confirmed. */
export async function start(page: Page): Promise<void> {
  await button(page, 'Play').click()
  await page.getByRole('alertdialog').getByRole('button', { name: 'Start quietly' }).click()
  await expect(button(page, 'Pause')).toBeVisible()
}

/** What a meter's number reads, dBFS; −Infinity for silence. */
export async function level(page: Page, side: 'in' | 'out'): Promise<number> {
  const text = await page
    .locator('.cw-meter-number')
    .nth(side === 'in' ? 0 : 1)
    .textContent()
  return text?.includes('∞') ? Number.NEGATIVE_INFINITY : Number((text ?? 'NaN').replace('−', '-').replace('+', ''))
}

/** Sound is real time: what waits for it waits this long on a busy machine. */
export const PATIENCE_MS = 15_000

/** Waits until the effect is fed or sounds. */
export async function expectSound(page: Page, side: 'in' | 'out'): Promise<void> {
  await expect.poll(() => level(page, side), { timeout: PATIENCE_MS, message: `${side} sounds` }).toBeGreaterThan(-40)
}

/** Silence is as far from silence as nothing is: −∞ − −∞ is no number. */
const isWithin = (value: number, wanted: number, tolerance: number) => value === wanted || Math.abs(value - wanted) <= tolerance

/** Waits until a meter's number stands within `tolerance` dB of `db`. The meters hold peaks for 1.5 s and then fall. */
export async function expectLevel(page: Page, side: 'in' | 'out', db: number, tolerance = 0.15): Promise<void> {
  await expect
    .poll(async () => isWithin(await level(page, side), db, tolerance), { timeout: PATIENCE_MS, message: `${side} at ${db} dBFS` })
    .toBe(true)
}

/** Installs a record of every audio context the page makes, and of every stream it opens, before its own code runs. */
export async function recordAudio(page: Page, options: { readonly onlyRate?: number } = {}): Promise<void> {
  await page.addInitScript(({ onlyRate }) => {
    const record = { contexts: [] as AudioContext[], nodes: [] as AudioWorkletNode[], streams: [] as MediaStream[], asked: [] as unknown[] }
    Object.assign(window, { heard: record })
    const Context = window.AudioContext
    window.AudioContext = class extends Context {
      constructor(given?: AudioContextOptions) {
        if (onlyRate !== undefined && given?.sampleRate !== undefined && given.sampleRate !== onlyRate)
          throw new DOMException('this device cannot', 'NotSupportedError')
        super(onlyRate === undefined ? given : { ...given, sampleRate: onlyRate })
        record.contexts.push(this)
      }
    }
    const Node = window.AudioWorkletNode
    window.AudioWorkletNode = class extends Node {
      constructor(...given: ConstructorParameters<typeof Node>) {
        super(...given)
        record.nodes.push(this)
      }
    }
    const devices = navigator.mediaDevices
    const open = devices.getUserMedia.bind(devices)
    devices.getUserMedia = async (constraints) => {
      record.asked.push(constraints)
      const stream = await open(constraints)
      record.streams.push(stream)
      return stream
    }
  }, options)
}

export interface Heard {
  readonly contexts: AudioContext[]
  readonly nodes: AudioWorkletNode[]
  readonly streams: MediaStream[]
  readonly asked: MediaStreamConstraints[]
}

/** States of all contexts made so far. */
export const contextStates = (page: Page): Promise<readonly string[]> =>
  page.evaluate(() => (window as unknown as { heard: Heard }).heard.contexts.map(({ state }) => state))
