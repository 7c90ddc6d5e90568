import { expect, test } from '@playwright/test'
import { openPage, setMenu } from './setPage.ts'

test('popups, the file reader and the audio wrapper are fetched when they are wanted, not with the page', async ({ page }) => {
  const scripts: string[] = []
  page.on('request', (request) => request.resourceType() === 'script' && scripts.push(new URL(request.url()).pathname))
  await openPage(page)
  await page.waitForTimeout(3000)
  const before = scripts.length
  expect(scripts.filter((name) => /(?<!use)Popup|Dialog|Menu|module|\/read-|schema|material|processor/.test(name))).toEqual([])
  await page.getByRole('button', { name: 'View' }).click()
  await expect(page.getByRole('menuitem', { name: 'Keys…' })).toBeVisible()
  expect(scripts.length).toBeGreaterThan(before)
})

test('a menu opened first by an arrow takes the focus, gives it back at Escape, and opens again', async ({ page }) => {
  await openPage(page)
  const first = page.getByRole('menuitem', { name: 'New' })
  await expect(setMenu(page)).toHaveAttribute('aria-expanded', 'false')
  await setMenu(page).focus()
  for (const key of ['ArrowDown', 'Enter', 'Space']) {
    await page.keyboard.press(key)
    await expect(first).toBeFocused()
    await expect(page.getByRole('menu')).toHaveCount(1)
    await page.keyboard.press('Escape')
    await expect(first).toBeHidden()
    await expect(setMenu(page)).toBeFocused()
  }
  // Escape closed the menu and did nothing else.
  await expect(page.getByRole('button', { name: 'Mute' })).toHaveAttribute('aria-pressed', 'false')
})

test('a popup that cannot be fetched is said, and opens when it can', async ({ page }) => {
  await openPage(page)
  await page.route('**/assets/*Popup*.js', (route) => route.abort())
  await setMenu(page).click()
  await expect(page.getByRole('alert').filter({ hasText: 'could not be fetched' })).toBeVisible()
  await page.unroute('**/assets/*Popup*.js')
  await setMenu(page).click()
  await expect(page.getByRole('menuitem', { name: 'New' })).toBeVisible()
})
