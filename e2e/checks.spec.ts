// The checks column: a warning appears while feedback is raised, a mend mends, the working opens, all by keyboard, too.
import { expect, type Page, test } from '@playwright/test'
import { panelBoxSteps } from '../src/checks/panelBox.ts'
import { CHECKS, runChecks } from '../src/checks/registry.ts'
import type { Check } from '../src/checks/types.ts'
import type { ParameterSet } from '../src/set/types.ts'
import { setWith } from './audioPage.ts'
import { numberIn, openSet } from './plotsPage.ts'

const FLANGER = {
  layout: 'mono',
  'line.baseMs': 3.5,
  'sweep.depthMs': 2.5,
  'sweep.rateHz': 0.23,
  'voices.count': 1,
  'voices.spreadMs': 0,
  'loop.feedback': 0.62,
} as const

const column = (page: Page) => page.getByRole('region', { name: /^Checks/ })
const row = (page: Page, name: RegExp) => column(page).getByRole('button', { name })

// Figures come from workers: on a busy machine they may take a while.
const slowly = expect.configure({ timeout: 40_000 })

/** What the page lists: every check there is, and the panel's worst places. */
const COUNT = CHECKS.length + 1
function everyCheck(set: ParameterSet): Check[] {
  const steps = panelBoxSteps(set)
  let step = steps.next()
  while (!step.done) step = steps.next()
  return [...runChecks(set), step.value]
}

/** Nothing is still being worked out. */
const settled = (page: Page) => slowly(page.getByRole('link', { name: /^Shape/ })).not.toContainText('being worked out')

test.beforeEach(async ({ page }) => {
  await page.goto('/')
  await openSet(page, FLANGER)
  await slowly(row(page, /^Loop gain margin/)).toContainText('4.15 dB')
})

test('every check has its figure, status word and limit as the registry gives them', async ({ page }) => {
  await settled(page)
  await expect(column(page).locator('.cw-check')).toHaveCount(COUNT)
  for (const { id, label, status, value } of everyCheck(setWith(FLANGER))) {
    const one = row(page, new RegExp(`^${label}`))
    await expect(one).toContainText(status)
    if (typeof value === 'string' && id !== 'panel.box') await expect(one).toContainText(value)
  }
  await expect(column(page).getByRole('heading')).toHaveText(/^Checks · [^·]+$/)
})

test('the warning appears while feedback is dragged towards the limit, before the drag ends; the rows keep their places', async ({
  page,
}) => {
  await settled(page)
  await page.getByRole('tab', { name: /^Feedback/ }).click()
  const track = page
    .getByRole('tabpanel', { name: /^Feedback/ })
    .locator('.cw-track')
    .first()
  const box = await track.boundingBox()
  if (!box) throw new Error('the feedback field has no track')
  const y = box.y + box.height / 2
  const feedback = page.getByRole('spinbutton', { name: 'Feedback', exact: true })
  const places = await column(page)
    .locator('.cw-check')
    .evaluateAll((rows) => rows.map((one) => one.getAttribute('data-check')))
  await page.mouse.move(box.x + 0.8 * box.width, y)
  await page.mouse.down()
  for (let x = 0.8; numberIn(await feedback.inputValue()) < 0.96 && x < 1; x += 0.005) await page.mouse.move(box.x + x * box.width, y)
  // 0.96 is 0.35 dB below the limit: within the margin of 0.5 dB.
  const margin = row(page, /^Loop gain margin/)
  await slowly(margin).toContainText('near')
  await page.mouse.move(box.x + 1.1 * box.width, y)
  await slowly(margin).toContainText('fails')
  await expect(page.getByRole('link', { name: /^Shape/ })).toContainText('■')
  const during = await column(page)
    .locator('.cw-check')
    .evaluateAll((rows) => rows.map((one) => one.getAttribute('data-check')))
  expect(during).toEqual(places)
  await page.mouse.up()
  await expect(column(page).locator('.cw-check').first()).toHaveAttribute('data-status', 'fails')
  // Spoken once every check, the slow ones too, is of the set as it stands.
  await slowly(page.getByRole('status').filter({ hasText: /Checks: \d fails/ })).toHaveCount(1)
})

test('a mend makes its change as one step that can be undone', async ({ page }) => {
  await openSet(page, { ...FLANGER, 'loop.feedback': 1.05 })
  await slowly(row(page, /^Stability under the sweep/)).toContainText('diverges')
  const mend = column(page)
    .getByRole('group', { name: /Stability under the sweep/ })
    .getByRole('button')
    .first()
  await mend.click()
  await slowly(row(page, /^Stability under the sweep/)).toContainText('proven')
  await expect(column(page).locator('[data-check="loop.stability"]')).toHaveAttribute('data-status', 'holds')
  await page.keyboard.press('Control+z')
  await slowly(row(page, /^Stability under the sweep/)).toContainText('diverges')
})

test('a check opens to its working: formula, numbers, result, source; one at a time', async ({ page }) => {
  await row(page, /^Loop gain margin/).click()
  const working = column(page).getByRole('region', { name: 'Working: Loop gain margin' })
  const [margin] = runChecks(setWith(FLANGER)).filter(({ id }) => id === 'loop.margin')
  const [step] = margin?.working ?? []
  for (const part of [step?.formula, step?.numbers, step?.result, step?.source]) await slowly(working).toContainText(part ?? 'nothing')
  await row(page, /^Longest ring/).click()
  await expect(column(page).getByRole('region', { name: 'Working: Longest ring' })).toBeVisible()
  await slowly(working).toHaveCount(0)
})

test('the checks are one stop of the Tab key: arrows move inside, Enter opens and closes', async ({ page }) => {
  await settled(page)
  await expect(column(page).locator('button[tabindex="0"]')).toHaveCount(1)
  await row(page, /^Stability under the sweep/).focus()
  await page.keyboard.press('ArrowDown')
  await slowly(row(page, /^Loop gain margin/)).toBeFocused()
  await page.keyboard.press('Enter')
  await slowly(row(page, /^Loop gain margin/)).toHaveAttribute('aria-expanded', 'true')
  await page.keyboard.press('Enter')
  await slowly(row(page, /^Loop gain margin/)).toHaveAttribute('aria-expanded', 'false')
  await page.keyboard.press('End')
  await slowly(column(page).locator('.cw-check button').last()).toBeFocused()
  await expect(column(page).locator('button[tabindex="0"]')).toHaveCount(1)
})

test('the limit of an opened check becomes the set’s own, moves the verdict, and goes back, each one step', async ({ page }) => {
  await row(page, /^Loop gain margin/).click()
  const limit = column(page).getByRole('spinbutton', { name: 'Limit', exact: true })
  await slowly(limit).toHaveValue('0.00')
  await limit.fill('6 dB')
  await limit.press('Enter')
  await slowly(row(page, /^Loop gain margin/)).toContainText('own limit 6 dB')
  await expect(column(page).locator('[data-check="loop.margin"]')).toHaveAttribute('data-status', 'fails')
  await column(page).getByRole('button', { name: 'Back to 0.00 dB' }).click()
  await slowly(row(page, /^Loop gain margin/)).toContainText('holds · limit 0 dB')
  await page.keyboard.press('Control+z')
  await slowly(row(page, /^Loop gain margin/)).toContainText('own limit 6 dB')
})

test('the same set is judged at other rates, its own marked', async ({ page }) => {
  await column(page).getByRole('button', { name: 'At other rates' }).click()
  const dialog = page.getByRole('dialog', { name: 'At other rates' })
  await slowly(dialog.getByRole('columnheader')).toHaveText([
    /Check/,
    '32 kHz',
    '44.1 kHz',
    /48 kHz\s*the set’s/,
    '88.2 kHz',
    '96 kHz',
    '192 kHz',
  ])
  // At 32 kHz a linear read loses more at the same frequency.
  await slowly(dialog.getByRole('row', { name: /^Interpolation loss/ })).toContainText('dB')
  await slowly(dialog.getByText(/^The same at every rate: .*longest delay/)).toBeVisible()
  await page.keyboard.press('Escape')
  await expect(dialog).toHaveCount(0)
})

test('ways to mend are reached by the arrows and used with Enter', async ({ page }) => {
  await openSet(page, { ...FLANGER, 'loop.feedback': 1.05 })
  const first = row(page, /^Stability under the sweep/)
  await expect(first).toContainText('diverges')
  await first.focus()
  await page.keyboard.press('ArrowDown')
  await expect(
    column(page)
      .getByRole('group', { name: /Stability under the sweep/ })
      .getByRole('button')
      .first(),
  ).toBeFocused()
  await page.keyboard.press('Enter')
  await expect(first).toContainText('proven')
})

test('on a narrow page the checks are one line that opens', async ({ page }) => {
  await page.setViewportSize({ width: 390, height: 844 })
  const line = page.getByRole('button', { name: /^Checks · / })
  await expect(line).toHaveAttribute('aria-expanded', 'false')
  await expect(page.locator('.cw-check')).toHaveCount(0)
  await line.click()
  await slowly(page.locator('.cw-check')).toHaveCount(COUNT)
})
