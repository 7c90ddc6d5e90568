import AxeBuilder from '@axe-core/playwright'
import { expect, type Page, test } from '@playwright/test'
import { block, field, openDemo, openFile, openPage, setMenu, type, undo } from './setPage.ts'

const TAGS = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice']

// One walk over the page takes seconds on a small machine.
test.describe.configure({ timeout: 180_000 })

async function violations(page: Page, part?: string): Promise<readonly string[]> {
  // The menus' focus guards are hidden and take the focus only to hand it on at once.
  const axe = new AxeBuilder({ page }).withTags(TAGS).exclude('[data-base-ui-focus-guard]')
  const { violations: found } = await (part === undefined ? axe : axe.include(part)).analyze()
  return found.flatMap(({ id, nodes }) => nodes.map((node) => `${id}: ${node.target.join(' ')} ${node.failureSummary ?? ''}`))
}

for (const theme of ['light', 'dark'] as const) {
  for (const [width, height] of [
    [1366, 768],
    [900, 700],
    [390, 844],
  ] as const) {
    test(`axe finds nothing, ${theme}, ${width} px`, async ({ page }) => {
      await page.emulateMedia({ colorScheme: theme })
      await page.setViewportSize({ width, height })
      await openPage(page)
      await openDemo(page, 'Narrow resonant sweep')
      expect(await violations(page)).toEqual([])
    })
  }

  test(`axe finds nothing in menu, dialog, refusals and every block, ${theme}`, async ({ page }) => {
    await page.emulateMedia({ colorScheme: theme })
    await openPage(page)
    for (const name of [/^Input/, /^Voices/, /^Wet tone/, /^Mix/, /^Output/, /^Feedback/, /^Loop shaper/]) {
      await block(page, name).click()
      expect(await violations(page, '.cw-shape-fields')).toEqual([])
    }
    await block(page, /^Two lines/).click()
    await type(page, 'Base delay', '1')
    await openFile(page, '{"format":')
    expect(await violations(page)).toEqual([])
    await setMenu(page).click()
    expect(await violations(page)).toEqual([])
    await page.keyboard.press('Escape')
    await page.getByRole('button', { name: 'View' }).click()
    await page.getByRole('menuitem', { name: 'Keys…' }).click()
    await expect(page.getByRole('dialog', { name: 'Keys' })).toBeVisible()
    expect(await violations(page)).toEqual([])
  })
}

test('keyboard only: open a set, change the feedback, walk the blocks, undo', async ({ page }) => {
  await openPage(page)
  const tabTo = async (reached: () => Promise<boolean>) => {
    for (let i = 0; i < 60; i++) {
      if (await reached()) return
      await page.keyboard.press('Tab')
    }
    throw new Error('not reached by Tab')
  }
  const isFocused = (locator: ReturnType<typeof field>) => () => locator.evaluate((element) => element === document.activeElement)

  await tabTo(isFocused(setMenu(page)))
  await page.keyboard.press('Enter')
  await expect(page.getByRole('menuitem', { name: 'New' })).toBeFocused()
  await page.keyboard.press('End')
  await page.keyboard.press('ArrowUp')
  await expect(page.getByRole('menuitem', { name: 'Demo sets' })).toBeFocused()
  await page.keyboard.press('ArrowRight')
  await expect(page.getByRole('menuitem', { name: /^Three slow voices/ })).toBeFocused()
  await page.keyboard.press('ArrowDown')
  await page.keyboard.press('Enter')
  await expect(setMenu(page)).toContainText('Narrow resonant sweep')

  await tabTo(isFocused(block(page, /^Line/)))
  await page.keyboard.press('ArrowDown')
  await page.keyboard.press('Home')
  await expect(block(page, /^Feedback/)).toBeFocused()
  const feedback = field(page, 'Feedback')
  await tabTo(isFocused(feedback))
  await page.keyboard.type('0.5')
  await page.keyboard.press('Enter')
  await expect(block(page, /^Feedback: \+0\.50/)).toBeVisible()
  await page.keyboard.press('Control+z')
  await expect(block(page, /^Feedback: \+0\.50/)).toBeHidden()
  await expect(undo(page)).toHaveAttribute('title', 'Undo Open Narrow resonant sweep')
})

test('what happened is spoken once, in one polite live region', async ({ page }) => {
  await openPage(page)
  const status = page.locator('[role="status"][aria-live="polite"]')
  await expect(status).toHaveCount(1)
  await type(page, 'Base delay', '9')
  await page.keyboard.press('Control+z')
  await expect(status).toHaveText('Undone: Base delay')
})

test('less motion: nothing on the page is animated', async ({ page }) => {
  await page.emulateMedia({ reducedMotion: 'reduce' })
  await openPage(page)
  const moving = await page.evaluate(
    () =>
      [...document.querySelectorAll('*')].filter((element) => {
        const style = getComputedStyle(element)
        return [...style.transitionDuration.split(','), ...style.animationDuration.split(',')].some((part) => Number.parseFloat(part) > 0)
      }).length,
  )
  expect(moving).toBe(0)
})

test('forced colours keep state visible: the chosen block and a switch that is on', async ({ page }) => {
  await page.emulateMedia({ forcedColors: 'active' })
  await openPage(page)
  const outline = await block(page, /^Two lines/).evaluate((element) => getComputedStyle(element).outlineStyle)
  expect(outline).toBe('solid')
  expect(await violations(page)).toEqual([])
})
