import { expect, test } from '@playwright/test'
import { button, dropSet, expectLevel, expectSound, type Heard, level, recordAudio, STILL, source, start } from './audioPage.ts'

test('the microphone path: voice processing off, silent until headphones are confirmed, tracks stopped with the source', async ({
  page,
}) => {
  await recordAudio(page)
  await page.goto('./')
  await dropSet(page, { ...STILL, 'mix.dry': 1, 'mix.wet': 0 })
  await start(page)
  await source(page).click()
  const panel = page.getByRole('dialog', { name: 'Source' })
  await panel.getByRole('button', { name: 'Live input…' }).click()
  await expect(source(page)).toContainText('Fake')
  await expectLevel(page, 'in', Number.NEGATIVE_INFINITY)

  const asked = await page.evaluate(() => (window as unknown as { heard: Heard }).heard.asked[0])
  expect(asked?.audio).toMatchObject({ echoCancellation: false, noiseSuppression: false, autoGainControl: false })
  expect(await panel.getByRole('combobox', { name: 'Device' }).locator('option').count()).toBeGreaterThan(1)

  await panel.getByRole('button', { name: 'I wear headphones' }).click()
  // The fake device beeps once a second.
  await expectSound(page, 'in')
  await expect.poll(async () => Math.abs((await level(page, 'in')) - (await level(page, 'out')))).toBeLessThan(1)

  await panel.getByRole('radio', { name: 'Held chord' }).check()
  await expect(source(page)).toContainText('Held chord')
  const states = await page.evaluate(() =>
    (window as unknown as { heard: Heard }).heard.streams.flatMap((stream) => stream.getTracks().map(({ readyState }) => readyState)),
  )
  expect(states).toEqual(['ended'])
})

test('an input that goes away is said and falls silent', async ({ page }) => {
  await recordAudio(page)
  await page.goto('./')
  await start(page)
  await source(page).click()
  const panel = page.getByRole('dialog', { name: 'Source' })
  await panel.getByRole('button', { name: 'Live input…' }).click()
  await panel.getByRole('button', { name: 'I wear headphones' }).click()
  await expectSound(page, 'in')
  // What the browser does when a device is unplugged.
  await page.evaluate(() => {
    for (const track of (window as unknown as { heard: Heard }).heard.streams[0]?.getTracks() ?? []) track.dispatchEvent(new Event('ended'))
  })
  await expect(page.getByRole('alert').filter({ hasText: 'is gone' })).toBeVisible()
  await expectLevel(page, 'in', Number.NEGATIVE_INFINITY)
})

test('a refused microphone is said and the source stays', async ({ page }) => {
  await page.addInitScript(() => {
    navigator.mediaDevices.getUserMedia = () => Promise.reject(new DOMException('no', 'NotAllowedError'))
  })
  await page.goto('./')
  await source(page).click()
  await page.getByRole('dialog', { name: 'Source' }).getByRole('button', { name: 'Live input…' }).click()
  await expect(page.getByRole('alert').filter({ hasText: 'did not allow' })).toBeVisible()
  await expect(source(page)).toContainText('Plucked chords')
  await expect(button(page, 'Play')).toBeVisible()
})
