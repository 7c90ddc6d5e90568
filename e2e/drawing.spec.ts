import { expect, test } from '@playwright/test'
import { block, choice, field, openFile, openPage, setText, type } from './setPage.ts'

test.beforeEach(({ page }) => openPage(page))

const blocks: readonly (readonly [RegExp, string])[] = [
  [/^Input/, 'Input gain'],
  [/^Two lines/, 'Base delay'],
  [/^Voices/, 'Voices'],
  [/^Wet tone/, 'Wet low cut'],
  [/^Mix/, 'Dry'],
  [/^Output/, 'Output gain'],
  [/^Feedback/, 'Feedback'],
  [/^Loop low cut/, 'Low cut'],
  [/^Loop damping/, 'Damping'],
]
test('choosing a block opens its fields', async ({ page }) => {
  for (const [name, label] of blocks) {
    await block(page, name).click()
    await expect(field(page, label)).toBeVisible()
    await expect(block(page, name)).toHaveAttribute('aria-selected', 'true')
  }
  await block(page, /^Loop shaper/).click()
  await expect(choice(page, 'Curve')).toBeVisible()
})

test('the drawing is one tab stop; arrows move inside it and down to the loop', async ({ page }) => {
  const stops = page.getByRole('tablist', { name: 'Signal path' }).locator('[tabindex="0"]')
  await expect(stops).toHaveCount(1)
  await block(page, /^Two lines/).focus()
  await page.keyboard.press('ArrowRight')
  await expect(block(page, /^Voices/)).toBeFocused()
  await expect(field(page, 'Voices')).toBeVisible()
  await page.keyboard.press('End')
  await expect(block(page, /^Output/)).toBeFocused()
  await page.keyboard.press('Home')
  await page.keyboard.press('ArrowDown')
  await expect(block(page, /^Feedback/)).toBeFocused()
  await page.keyboard.press('ArrowUp')
  await expect(block(page, /^Two lines/)).toBeFocused()
  await expect(stops).toHaveCount(1)
})

test('blocks that are not in the path say so and come in when they are set', async ({ page }) => {
  await expect(block(page, /^Wet tone: not in the path/)).toHaveAttribute('data-absent', 'true')
  await block(page, /^Wet tone/).click()
  await type(page, 'Wet high cut', '6.5k')
  await expect(block(page, /^Wet tone: to 6\.5 kHz/)).not.toHaveAttribute('data-absent')
  await block(page, /^Feedback: not in the path/).click()
  await type(page, 'Feedback', '−0.6')
  await expect(block(page, /^Feedback: −0\.60/)).toBeVisible()
})

test('dry leaves where dryTap says', async ({ page }) => {
  const wires = page.locator('.cw-wires .cw-wire-ink')
  const paths = () => wires.evaluateAll((all) => all.map((path) => path.getAttribute('d') ?? ''))
  /** Where the wire that goes up, over and down to the mix begins. */
  const dryStart = async () => Number((await paths()).map((d) => /^M([\d.]+) [\d.]+V[\d.]+H[\d.]+V/.exec(d)?.[1]).find(Boolean))
  const sumX = Number(await page.locator('.cw-wire-ring').getAttribute('cx'))
  expect(await dryStart()).toBeLessThan(sumX)
  await block(page, /^Mix/).click()
  await choice(page, 'Dry leaves').selectOption('line')
  await expect.poll(dryStart).toBeGreaterThan(sumX)
})

test('two lines run side by side and cross where the loops cross-feed; one line does not', async ({ page }) => {
  await openFile(page, setText({ loop: { feedback: 0.5, crossFeed: 0.25 } }))
  await expect(page.getByText('cross 0.25')).toBeVisible()
  await expect(page.locator('.cw-wire-gap').first()).toBeAttached()
  await openFile(page, setText({ layout: 'mono', loop: { feedback: 0.5, crossFeed: 0.25 } }))
  await expect(page.getByText('cross 0.25')).toBeHidden()
  await expect(page.locator('.cw-wire-gap')).toHaveCount(0)
  await expect(block(page, /^Line/)).toBeVisible()
})

test('the line shows the delay of now, and its mark moves with the held position', async ({ page }) => {
  await openFile(page, setText({ line: { baseMs: 3.5 }, sweep: { depthMs: 2.5 }, voices: { count: 1 } }))
  await expect(block(page, /^Two lines/)).toContainText('3.50 ms now · 1.00 to 6.00 ms')
  await page.locator('h2').first().click()
  await page.keyboard.press('h')
  const mark = page.locator('.cw-ruler-voice').first()
  const before = await mark.evaluate((element) => element.getBoundingClientRect().x)
  await type(page, 'Base delay', '4.5')
  await expect(block(page, /^Two lines/)).toContainText('4.50 ms now')
  await type(page, 'Start position', '0.25')
  await page.locator('h2').first().click()
  await page.keyboard.press('h')
  // Oracle: s(¼) = 1, base plus depth.
  await expect(block(page, /^Two lines/)).toContainText('7.00 ms now')
  await expect.poll(() => mark.evaluate((element) => element.getBoundingClientRect().x)).not.toBe(before)
})

test('the equation holds today’s numbers and follows what is present', async ({ page }) => {
  const equation = page.getByRole('region', { name: 'Difference equation' })
  await openFile(page, setText({ layout: 'mono', line: { baseMs: 3.5 }, sweep: { depthMs: 2.5, rateHz: 0.23 }, voices: { count: 1 } }))
  const text = async () => (await equation.textContent())?.replace(/\s+/g, '')
  // Oracle: 3.5 and 2.5 ms at 48 kHz are 168 and 120 samples.
  await expect.poll(text).toContain('D(n)=168+120sin(2π·0.23n/fs)samples')
  await expect.poll(text).toContain('y[n]=0.707x[n]+0.707w[n−D(n)]')
  await expect.poll(text).toContain('w[n]=x[n]')
  await block(page, /^Feedback/).click()
  await type(page, 'Feedback', '0.62')
  await type(page, 'Damping', '6500')
  await expect.poll(text).toContain('w[n]=x[n]+0.62·damp(w[n−D(n)])')
})

test('the equation is live while a value is dragged', async ({ page }) => {
  const track = page.locator('.cw-field', { has: field(page, 'Rate') }).locator('.cw-track')
  const box = await track.boundingBox()
  if (!box) throw new Error('no track')
  const equation = page.getByRole('region', { name: 'Difference equation' })
  const before = await equation.textContent()
  await page.mouse.move(box.x + box.width * 0.5, box.y + 4)
  await page.mouse.down()
  await page.mouse.move(box.x + box.width * 0.8, box.y + 4, { steps: 4 })
  await expect.poll(() => equation.textContent()).not.toBe(before)
  await page.mouse.up()
})
