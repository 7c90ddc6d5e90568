import { expect, test } from '@playwright/test'
import {
  button,
  contextStates,
  dropSet,
  dropTone,
  expectLevel,
  expectSound,
  type Heard,
  level,
  PATIENCE_MS,
  recordAudio,
  STILL,
  start,
} from './audioPage.ts'

test('a device that refuses the set’s rate is used at its own, and the page says so', async ({ page }) => {
  await recordAudio(page, { onlyRate: 44_100 })
  await page.goto('./')
  await start(page)
  await expect(page.getByText('Heard at 44.1 kHz, set at 48.')).toBeVisible()
  // The set's times run at the device's rate: 0.5 ms nulls 1 kHz at 44.1 kHz as well.
  await dropTone(page, { fs: 44_100, peak: 0.25, seconds: 30 })
  await dropSet(page, { ...STILL, 'mix.dry': 0.5, 'mix.wet': 0.5, 'line.baseMs': 0.5, 'line.interpolation': 'lagrange3' })
  await expect.poll(() => level(page, 'out'), { timeout: PATIENCE_MS }).toBeLessThan(-60)
})

test('a changed sample rate makes a new context, closes the old one and goes on sounding', async ({ page }) => {
  await recordAudio(page)
  await page.goto('./')
  await dropSet(page, { ...STILL, 'mix.dry': 1, 'mix.wet': 0 })
  await dropTone(page)
  await start(page)
  await expectLevel(page, 'out', -6.02)
  await dropSet(page, { ...STILL, 'mix.dry': 1, 'mix.wet': 0, sampleRate: 44_100 })
  await expect.poll(() => contextStates(page)).toEqual(['closed', 'running'])
  expect(await page.evaluate(() => (window as unknown as { heard: Heard }).heard.contexts[1]?.sampleRate)).toBe(44_100)
  await expectLevel(page, 'out', -6.02)
})

test('a clock that stands still is said within two seconds, and Restart brings the sound back', async ({ page }) => {
  await recordAudio(page)
  await page.goto('./')
  await start(page)
  await expectSound(page, 'out')
  await page.evaluate(() => (window as unknown as { heard: Heard }).heard.contexts[0]?.suspend())
  const notice = page.getByRole('alert').filter({ hasText: 'the audio clock stands still' })
  await expect(notice).toBeVisible({ timeout: 3000 })
  await notice.getByRole('button', { name: 'Restart' }).click()
  await expect(notice).toBeHidden()
  await expect.poll(() => contextStates(page)).toEqual(['closed', 'running'])
  await expectSound(page, 'out')
})

test('a processor that fails is said, and Restart brings the sound back', async ({ page }) => {
  await recordAudio(page)
  await page.goto('./')
  await start(page)
  await expectSound(page, 'out')
  await page.evaluate(() => (window as unknown as { heard: Heard }).heard.nodes.at(-1)?.dispatchEvent(new ErrorEvent('processorerror')))
  const notice = page.getByRole('alert').filter({ hasText: 'the audio part of the page failed' })
  await notice.getByRole('button', { name: 'Restart' }).click()
  await expect(notice).toBeHidden()
  await expectSound(page, 'out')
})

test('page and processor of different builds refuse each other', async ({ page }) => {
  await page.route('**/processor-*.js', async (route) => {
    const response = await route.fetch()
    const text = await response.text()
    // The build id is the time of the build in base 36, eight letters and digits.
    const isId = (word: string) => Math.abs(Number.parseInt(word, 36) - Date.now()) < 30 * 24 * 3600 * 1000
    const body = text.replace(/(["'`])([a-z0-9]{8})\1/g, (quoted, quote, word) => (isId(word) ? `${quote}00000000${quote}` : quoted))
    expect(body).not.toBe(text)
    await route.fulfill({ response, body })
  })
  await page.goto('./')
  await button(page, 'Play').click()
  await page.getByRole('button', { name: 'Start quietly' }).click()
  await expect(page.getByRole('alert').filter({ hasText: 'different builds: reload the page' })).toBeVisible()
  await expect(button(page, 'Play')).toBeVisible()
})
