import { expect, test } from '@playwright/test'
import { button, dropSet, expectLevel, expectSound, PATIENCE_MS, start } from './audioPage.ts'

const runaway = { 'line.baseMs': 10, 'sweep.depthMs': 2, 'loop.feedback': 1.4, 'loop.interpolation': 'linear' } as const

test('a loop that runs away is muted with a message and sounds again once the set is safe', async ({ page }) => {
  await page.goto('./')
  await start(page)
  await expectSound(page, 'out')
  await dropSet(page, runaway)
  const notice = page.getByRole('alert').filter({ hasText: 'The guard muted the sound' })
  await expect(notice).toContainText('+12 dBFS')
  await expectLevel(page, 'out', Number.NEGATIVE_INFINITY)
  // It stays muted while the loop goes on running away unheard.
  await page.waitForTimeout(2500)
  await expect(notice).toBeVisible()
  await dropSet(page, { ...runaway, 'loop.feedback': 0.3 })
  await expect(notice).toBeHidden({ timeout: 6000 })
  await expectSound(page, 'out')
})

test('resumed into the same loop it mutes again', async ({ page }) => {
  await page.goto('./')
  await dropSet(page, runaway)
  await start(page)
  const notice = page.getByRole('alert').filter({ hasText: 'The guard muted the sound' })
  await expect(notice).toBeVisible({ timeout: PATIENCE_MS })
  await notice.getByRole('button', { name: 'Resume' }).click()
  await expect(notice).toBeVisible()
  await button(page, 'Pause').click()
})
