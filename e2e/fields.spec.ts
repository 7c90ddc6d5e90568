import { expect, test } from '@playwright/test'
import { block, choice, field, openFile, openPage, setText, type, undo } from './setPage.ts'

test.beforeEach(({ page }) => openPage(page))

test('texts with units are read: other units, decimal comma, samples, beats at a tempo, a note', async ({ page }) => {
  const typed: readonly (readonly [string, string, string])[] = [
    ['Base delay', '0.015 s', '15.00'],
    ['Base delay', '9500 us', '9.50'],
    ['Base delay', '12,5', '12.50'],
    ['Base delay', '480 samples', '10.00'],
    // Oracle: the period of A3, 220 Hz.
    ['Base delay', 'A3', '4.545'],
    ['Rate', '1.5', '1.50'],
    // Oracle: a quarter at 96 lasts 60/96 s.
    ['Rate', '1/4 @ 96', '1.60'],
  ]
  await type(page, 'Depth', '1')
  for (const [label, text, shown] of typed) {
    await type(page, label, text)
    await expect(field(page, label)).toHaveValue(shown)
  }
  await expect(page.getByText('1 beat at 96')).toBeVisible()
})

test('what cannot be read says why in place, stays to be mended, and Escape restores', async ({ page }) => {
  await type(page, 'Base delay', '12 apples')
  await expect(page.getByRole('alert').filter({ hasText: 'apples' })).toBeVisible()
  await expect(field(page, 'Base delay')).toHaveValue('12 apples')
  await expect(undo(page)).toHaveAttribute('title', 'Nothing to undo')
  await field(page, 'Base delay').press('Escape')
  await expect(field(page, 'Base delay')).toHaveValue('12.00')
  await expect(page.getByRole('alert').filter({ hasText: 'apples' })).toBeHidden()
})

test('out of range says the range', async ({ page }) => {
  await type(page, 'Rate', '2000')
  await expect(page.getByRole('alert').filter({ hasText: 'Rate takes 0 to 100 Hz' })).toBeVisible()
})

test('typing applies nothing on the way; leaving applies', async ({ page }) => {
  await field(page, 'Rate').focus()
  await page.keyboard.type('0.25')
  await expect(undo(page)).toHaveAttribute('title', 'Nothing to undo')
  await page.keyboard.press('Tab')
  await expect(undo(page)).toHaveAttribute('title', 'Undo Rate')
  await expect(field(page, 'Rate')).toHaveValue('0.25')
})

test('a value that needs a second change offers it in place; what sounds stays until then', async ({ page }) => {
  await openFile(page, setText({ line: { baseMs: 3.5 }, sweep: { depthMs: 2.5 }, voices: { count: 1 } }))
  await expect(field(page, 'Base delay')).toHaveValue('3.50')
  await type(page, 'Base delay', '0.75')
  await expect(page.getByRole('alert').filter({ hasText: 'The delay would come to −1.75' })).toBeVisible()
  await expect(block(page, /^Two lines: 1\.00 to 6\.00 ms/)).toBeVisible()
  await page.getByRole('button', { name: 'Also set depth to 0.70 ms' }).click()
  await expect(field(page, 'Base delay')).toHaveValue('0.75')
  await expect(field(page, 'Depth')).toHaveValue('0.70')
  await expect(undo(page)).toHaveAttribute('title', 'Undo Base delay')
  await undo(page).click()
  await expect(field(page, 'Base delay')).toHaveValue('3.50')
  await expect(field(page, 'Depth')).toHaveValue('2.50')
})

test('arrows step, a held key is one step of history, Escape while it is held drops it', async ({ page }) => {
  await field(page, 'Base delay').focus()
  await page.keyboard.down('ArrowUp')
  for (let i = 0; i < 4; i++) await page.keyboard.down('ArrowUp')
  await page.keyboard.up('ArrowUp')
  await expect(field(page, 'Base delay')).toHaveValue('13.00')
  await undo(page).click()
  await expect(field(page, 'Base delay')).toHaveValue('12.00')
  await expect(undo(page)).toHaveAttribute('title', 'Nothing to undo')
  await field(page, 'Base delay').press('Shift+ArrowUp')
  await expect(field(page, 'Base delay')).toHaveValue('14.00')
  await page.keyboard.down('PageUp')
  await page.keyboard.press('Escape')
  await page.keyboard.up('PageUp')
  await expect(field(page, 'Base delay')).toHaveValue('14.00')
})

test('the track is dragged as one step and held where the delay would come too close', async ({ page }) => {
  const track = page.locator('.cw-field', { has: field(page, 'Base delay') }).locator('.cw-track')
  const box = await track.boundingBox()
  if (!box) throw new Error('no track')
  await page.mouse.move(box.x + box.width * 0.7, box.y + box.height / 2)
  await page.mouse.down()
  await page.mouse.move(box.x + box.width * 0.5, box.y + box.height / 2, { steps: 5 })
  await page.mouse.move(box.x + box.width * 0.1, box.y + box.height / 2, { steps: 5 })
  await expect(page.getByText(/^△ Held: the delay would come/)).toBeVisible()
  await page.mouse.up()
  const value = Number(await field(page, 'Base delay').inputValue())
  // Oracle: the default set reaches 2 ms (spread) and 2.5 ms (depth) below base; its cubic reads no closer than a sample.
  expect(value).toBeGreaterThanOrEqual(4.5 + 1000 / 48000)
  expect(value).toBeLessThan(4.7)
  await undo(page).click()
  await expect(field(page, 'Base delay')).toHaveValue('12.00')
})

test('a label is dragged to scrub', async ({ page }) => {
  const label = page.locator('label', { hasText: /^Rate$/ })
  const box = await label.boundingBox()
  if (!box) throw new Error('no label')
  await page.mouse.move(box.x + 5, box.y + 5)
  await page.mouse.down()
  await page.mouse.move(box.x + 65, box.y + 5, { steps: 6 })
  await page.mouse.up()
  expect(Number(await field(page, 'Rate').inputValue())).toBeGreaterThan(0.6)
  await expect(undo(page)).toHaveAttribute('title', 'Undo Rate')
})

test('the wheel steps the focused field as one step, and scrolls elsewhere', async ({ page }) => {
  const rate = field(page, 'Rate')
  await rate.hover()
  await page.mouse.wheel(0, -100)
  await expect(rate).toHaveValue('0.40')
  await rate.focus()
  await rate.hover()
  // At once, so that a busy machine does not stretch them past the rest that ends a gesture.
  await rate.evaluate((input) => {
    for (let i = 0; i < 3; i++) input.dispatchEvent(new WheelEvent('wheel', { deltaY: -100, bubbles: true, cancelable: true }))
  })
  await expect(rate).not.toHaveValue('0.40')
  await expect(undo(page)).toHaveAttribute('title', 'Undo Rate')
  await undo(page).click()
  await expect(rate).toHaveValue('0.40')
})

test('a filter is switched on where it last stood', async ({ page }) => {
  await block(page, /^Loop damping/).click()
  await expect(field(page, 'Damping')).toHaveValue('off')
  await type(page, 'Damping', '6.5 kHz')
  await expect(page.getByText(/true −3 dB point/)).toBeVisible()
  const toggle = page.getByRole('switch', { name: 'Damping in the path' })
  await toggle.click()
  await expect(field(page, 'Damping')).toHaveValue('off')
  await toggle.click()
  await expect(field(page, 'Damping')).toHaveValue('6\u2009500')
})

test('first notch from … to … sets base and depth so that the response has it there', async ({ page }) => {
  await openFile(page, setText({ line: { baseMs: 3.5 }, sweep: { depthMs: 2.5 }, voices: { count: 1 } }))
  await expect(field(page, 'Base delay')).toHaveValue('3.50')
  const low = field(page, 'First notch where the delay is largest')
  const high = field(page, 'First notch where the delay is smallest')
  // Oracle: an ideal comb with equal gains has its first notch at 1/(2τ): 83.3 Hz at 6 ms, 500 Hz at 1 ms.
  await expect(low).toHaveValue('83.33')
  await expect(high).toHaveValue('500')
  await low.fill('100')
  await low.press('Enter')
  // Oracle: 5 ms and 1 ms are 3 ± 2 ms.
  await expect(field(page, 'Base delay')).toHaveValue('3.00')
  await expect(field(page, 'Depth')).toHaveValue('2.00')
  await expect(undo(page)).toHaveAttribute('title', 'Undo First notch')
  await high.fill('50')
  await high.press('Enter')
  await expect(page.getByRole('alert').filter({ hasText: 'cannot be above' })).toBeVisible()
})

test('width in cents sets the depth', async ({ page }) => {
  await type(page, 'Rate', '1')
  await type(page, 'Width', '20')
  // Oracle: a sine of depth d at 1 Hz bends down by 1200 log2(1 − 2π d): d = (1 − 2^(−20/1200))/2π = 1.828 ms.
  await expect(field(page, 'Depth')).toHaveValue('1.828')
})

test('choices, a drawn sweep and its points', async ({ page }) => {
  await choice(page, 'Sweep shape').selectOption('drawn')
  const points = page.getByLabel(/^Points/)
  await expect(points).toHaveValue(/0\.25, 1/)
  await points.fill('0, −1\n0.5, 1')
  await points.press('Control+Enter')
  await expect(page.getByText('2 points')).toBeVisible()
  await expect(undo(page)).toHaveAttribute('title', 'Undo Sweep shape, points')
  await points.fill('0, 0')
  await points.press('Control+Enter')
  await expect(page.getByRole('alert').filter({ hasText: '2 to 64 points' })).toBeVisible()
})
