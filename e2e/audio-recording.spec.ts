import { expect, test } from '@playwright/test'
import { writeWav } from '../src/media/wav.ts'
import { button, drop, dropSet, dropTone, expectLevel, level, PATIENCE_MS, STILL, sine, source, start } from './audioPage.ts'

test('a dropped WAV plays, and a changed set is heard: measured at the effect’s output', async ({ page }) => {
  await page.goto('./')
  // Dry alone: out is in.
  await dropSet(page, { ...STILL, 'mix.dry': 1, 'mix.wet': 0 })
  await dropTone(page)
  await start(page)
  await expectLevel(page, 'in', -6.02)
  await expectLevel(page, 'out', -6.02)
  // Half the dry gain: 20 log10 ½ = −6.02 dB more.
  await dropSet(page, { ...STILL, 'mix.dry': 0.5, 'mix.wet': 0 })
  await expectLevel(page, 'out', -12.04)
})

test('a comb’s notch and peak are where the textbook puts them: 1 kHz is nulled at 0.5 ms and doubled at 1 ms', async ({ page }) => {
  await page.goto('./')
  await dropTone(page, { peak: 0.25, seconds: 30 })
  await start(page)
  // FACTS 1: notches of y = x + x[n − M] at (2k+1)/(2τ), peaks at k/τ; both gains ½, so 0 dB at the peak.
  const comb = { ...STILL, 'mix.dry': 0.5, 'mix.wet': 0.5 }
  await dropSet(page, { ...comb, 'line.baseMs': 0.5 })
  await expect.poll(() => level(page, 'out'), { timeout: PATIENCE_MS }).toBeLessThan(-90)
  await dropSet(page, { ...comb, 'line.baseMs': 1 })
  await expectLevel(page, 'out', -12.04)
})

test('bypass gives the input back, and equal loudness raises a soft set to it', async ({ page }) => {
  await page.goto('./')
  await dropSet(page, { ...STILL, 'mix.dry': 0.5, 'mix.wet': 0 })
  await dropTone(page)
  await start(page)
  await expectLevel(page, 'out', -12.04)
  await button(page, 'Bypass').click()
  await expectLevel(page, 'out', -6.02)
  await button(page, 'Bypass').click()
  await expectLevel(page, 'out', -12.04)
  const equal = button(page, 'Equal loudness')
  await equal.click()
  // The meter shows the effect itself; what equal loudness adds to it is told by the button.
  await expect(equal).toHaveAttribute('title', /\+6\.0 dB/)
  await expect(equal).toHaveAttribute('aria-pressed', 'true')
})

test('the output passing full scale says “over”', async ({ page }) => {
  await page.goto('./')
  await dropTone(page)
  await dropSet(page, { ...STILL, 'mix.dry': 3, 'mix.wet': 0 })
  await start(page)
  await expect(page.getByText('over', { exact: true })).toBeVisible()
  await dropSet(page, { ...STILL, 'mix.dry': 1, 'mix.wet': 0 })
  await expect(page.getByText('over', { exact: true })).toBeHidden({ timeout: 8000 })
})

test('a WAV at another rate says that it was resampled, and sounds at its own pitch', async ({ page }) => {
  await page.goto('./')
  await dropTone(page, { fs: 44_100, hz: 1000, peak: 0.25, seconds: 30 })
  await source(page).click()
  await expect(page.getByText('read as WAV, resampled from 44.1 kHz')).toBeVisible()
  await page.keyboard.press('Escape')
  await start(page)
  // Played at the wrong rate, 1 kHz would be 1088 Hz and miss the notch.
  await dropSet(page, { ...STILL, 'mix.dry': 0.5, 'mix.wet': 0.5, 'line.baseMs': 0.5 })
  await expect.poll(() => level(page, 'out'), { timeout: PATIENCE_MS }).toBeLessThan(-70)
})

test('files that cannot be played are refused with a reason, and what was open stays', async ({ page }) => {
  await page.goto('./')
  await dropTone(page)
  const whole = writeWav([sine(1, 440, 48_000, 0.5)], 48_000, 'pcm16')
  const refusals: readonly (readonly [name: string, type: string, bytes: Uint8Array, reason: RegExp])[] = [
    ['cut.wav', 'audio/wav', whole.slice(0, 5000), /header promises/],
    ['empty.wav', 'audio/wav', new Uint8Array(0), /empty/],
    ['words.wav', 'audio/wav', new TextEncoder().encode('no sound in here'), /not a WAV file/],
    ['words.mp3', 'audio/mpeg', new TextEncoder().encode('no sound in here'), /cannot decode/],
    ['words.txt', 'text/plain', new TextEncoder().encode('no sound in here'), /drop a recording/],
  ]
  for (const [name, type, bytes, reason] of refusals) {
    await drop(page, name, type, bytes)
    const message = page.getByRole('alert').filter({ hasText: name })
    await expect(message).toContainText(reason)
    await expect(message).toContainText('what was open stays')
    await expect(source(page)).toContainText('tone.wav')
    await message.getByRole('button', { name: 'Dismiss' }).click()
  }
})

test('the repeat region is chosen by dragging and by keys', async ({ page }) => {
  await page.goto('./')
  await dropTone(page)
  await source(page).click()
  const panel = page.getByRole('dialog', { name: 'Source' })
  await expect(panel).toContainText('Repeats 0.00 s to 2.00 s')
  const from = panel.getByRole('slider', { name: 'Repeat from' })
  const to = panel.getByRole('slider', { name: 'Repeat to' })
  await from.press('ArrowRight')
  await to.press('PageDown')
  await expect(panel).toContainText('Repeats 0.01 s to 1.80 s')
  await panel.getByRole('button', { name: 'Repeat everything' }).click()
  const frame = panel.locator('.cw-waveform-frame')
  const box = await frame.boundingBox()
  if (!box) throw new Error('the waveform has no place')
  await page.mouse.move(box.x + box.width / 4, box.y + 20)
  await page.mouse.down()
  await page.mouse.move(box.x + box.width / 2, box.y + 20, { steps: 4 })
  await page.mouse.up()
  await expect(panel).toContainText(/Repeats 0\.(49|50|51) s to (0\.99|1\.00|1\.01) s/)
})
