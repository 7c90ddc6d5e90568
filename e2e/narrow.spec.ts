import { expect, test } from '@playwright/test'
import { field, openPage, type } from './setPage.ts'

const overflow = () => document.documentElement.scrollWidth - innerWidth

for (const [width, height] of [
  [390, 844],
  [320, 640],
] as const) {
  test.describe(`${width} px`, () => {
    test.use({ viewport: { width, height } })

    test('is one column without sideways scrolling; play stays in reach', async ({ page }) => {
      await openPage(page)
      expect(await page.evaluate(overflow)).toBe(0)
      const play = page.getByRole('button', { name: /^Play/ })
      await expect(play).toBeInViewport()
      await page.evaluate(() => scrollTo(0, 1e6))
      await expect(play).toBeInViewport()
      await expect(page.getByRole('button', { name: /^(Mute|Unmute)/ })).toBeInViewport()
    })

    test('the path is a list whose fields open in place', async ({ page }) => {
      await openPage(page)
      const mix = page.getByRole('button', { name: /^Mix/ })
      await expect(mix).toHaveAttribute('aria-expanded', 'false')
      await mix.click()
      await expect(mix).toHaveAttribute('aria-expanded', 'true')
      await type(page, 'Wet', '0.5')
      await expect(mix).toContainText('wet 0.50')
      expect(await page.evaluate(overflow)).toBe(0)
      await mix.click()
      await expect(mix).toHaveAttribute('aria-expanded', 'false')
      await expect(field(page, 'Wet')).toBeHidden()
    })
  })
}

test('text at twice its size holds', async ({ page }) => {
  await openPage(page)
  await page.evaluate(() => {
    document.documentElement.style.fontSize = '200%'
  })
  await expect(page.getByRole('button', { name: /^Mix/ })).toBeVisible()
  expect(await page.evaluate(overflow)).toBe(0)
  await type(page, 'Base delay', '9')
  await expect(field(page, 'Base delay')).toHaveValue('9.00')
})
