import { expect, test } from '@playwright/test'
import { button, contextStates, expectLevel, expectSound, recordAudio, sound, start } from './audioPage.ts'

test('no sound before the press: no context is made, and the browser itself would not let one run', async ({ page }) => {
  await recordAudio(page)
  // From the page's own code: what Playwright evaluates counts as a gesture.
  await page.addInitScript(() => {
    const Native = Object.getPrototypeOf(window.AudioContext) as typeof AudioContext
    addEventListener('load', () => {
      const probe = new Native()
      void probe.resume()
      setInterval(() => document.documentElement.setAttribute('data-probe', probe.state), 100)
    })
  })
  await page.goto('./')
  await expect(button(page, 'Play')).toBeVisible()
  await page.waitForTimeout(1000)
  expect(await contextStates(page)).toEqual([])
  await expect(page.locator('html')).toHaveAttribute('data-probe', 'suspended')
})

test('the first press shows the caution, not sound; declined, nothing sounds and it asks again', async ({ page }) => {
  await recordAudio(page)
  await page.goto('./')
  await button(page, 'Play').click()
  const caution = page.getByRole('alertdialog', { name: 'Before the first sound' })
  await expect(caution).toBeVisible()
  expect(await contextStates(page)).toEqual([])
  await caution.getByRole('button', { name: 'Not now' }).click()
  await expect(caution).toBeHidden()
  await expect(button(page, 'Play')).toBeVisible()
  expect(await contextStates(page)).toEqual([])
  await button(page, 'Play').click()
  await expect(caution).toBeVisible()
})

test('confirmed, it sounds quietly; after a reload one press is enough, and the level is back at −20 dB', async ({ page }) => {
  await recordAudio(page)
  await page.goto('./')
  await start(page)
  await expect.poll(() => contextStates(page)).toEqual(['running'])
  await expectSound(page, 'out')
  const slider = sound(page).getByRole('slider', { name: 'Level' })
  await expect(slider).toHaveAttribute('aria-valuetext', '−20 dB')
  await slider.press('End')
  await expect(slider).toHaveAttribute('aria-valuetext', '0 dB')

  await page.reload()
  await expect(sound(page).getByRole('slider', { name: 'Level' })).toHaveAttribute('aria-valuetext', '−20 dB')
  await button(page, 'Play').click()
  await expect(button(page, 'Pause')).toBeVisible()
  await expect(page.getByRole('alertdialog')).toBeHidden()
  await expectSound(page, 'out')
})

test('keys: Space plays and pauses, M mutes, B bypasses; Escape mutes and never unmutes', async ({ page }) => {
  await page.goto('./')
  await start(page)
  await page.locator('body').click({ position: { x: 700, y: 4 } })
  await page.keyboard.press('m')
  await expect(button(page, 'Muted')).toHaveAttribute('aria-pressed', 'true')
  await page.keyboard.press('m')
  await expect(button(page, 'Mute')).toHaveAttribute('aria-pressed', 'false')
  await page.keyboard.press('Escape')
  await expect(button(page, 'Muted')).toBeVisible()
  await page.keyboard.press('Escape')
  await expect(button(page, 'Muted')).toBeVisible()
  await page.keyboard.press('b')
  await expect(button(page, 'Bypass')).toHaveAttribute('aria-pressed', 'true')
  await page.keyboard.press('Space')
  await expect(button(page, 'Play')).toBeVisible()
  await page.keyboard.press('Space')
  await expect(button(page, 'Pause')).toBeVisible()
})

test('paused, the context rests and the meters fall to silence', async ({ page }) => {
  await recordAudio(page)
  await page.goto('./')
  await start(page)
  await expectSound(page, 'out')
  await button(page, 'Pause').click()
  await expect.poll(() => contextStates(page)).toEqual(['suspended'])
  await expectLevel(page, 'out', Number.NEGATIVE_INFINITY)
})
