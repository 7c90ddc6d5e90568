import { readFile } from 'node:fs/promises'
import { expect, test } from '@playwright/test'
import { field, openDemo, openFile, openPage, setMenu, setText, type, undo } from './setPage.ts'

test.beforeEach(({ page }) => openPage(page))

test('a reload keeps the set, the block and the tempo', async ({ page }) => {
  await type(page, 'Base delay', '7.25 ms')
  await type(page, 'Tempo for beats', '96')
  await page.getByRole('tab', { name: /^Mix/ }).click()
  await page.reload()
  await expect(page.getByRole('tab', { name: /^Mix/ })).toHaveAttribute('aria-selected', 'true')
  await page.getByRole('tab', { name: /^Two lines/ }).click()
  await expect(field(page, 'Base delay')).toHaveValue('7.25')
  await expect(field(page, 'Tempo for beats')).toHaveValue('96')
})

test('a second tab starts from the first one’s set and then keeps its own', async ({ page, context }) => {
  await type(page, 'Base delay', '7.25')
  const second = await context.newPage()
  await openPage(second)
  await expect(field(second, 'Base delay')).toHaveValue('7.25')
  await type(second, 'Base delay', '9')
  await page.reload()
  await expect(field(page, 'Base delay')).toHaveValue('7.25')
  await second.reload()
  await expect(field(second, 'Base delay')).toHaveValue('9.00')
})

test('what is stored and cannot be read is put aside and said', async ({ page }) => {
  await type(page, 'Base delay', '9')
  await page.evaluate(() => {
    for (const key of Object.keys(localStorage)) if (key.startsWith('combwright.tab.')) localStorage.setItem(key, '{"document":')
    // The page would write the good state again on leaving.
    const broken = localStorage.setItem.bind(localStorage)
    Storage.prototype.setItem = (key: string, value: string) => (key.startsWith('combwright.tab.') ? undefined : broken(key, value))
  })
  await page.reload()
  await expect(page.getByRole('alert').filter({ hasText: 'could not be read' })).toBeVisible()
  await expect(field(page, 'Base delay')).toBeVisible()
})

test('undo and redo are named for the step and move the page with them', async ({ page }) => {
  await expect(undo(page)).toHaveAttribute('title', 'Nothing to undo')
  await type(page, 'Base delay', '9')
  await expect(undo(page)).toHaveAttribute('title', 'Undo Base delay')
  await undo(page).click()
  await expect(field(page, 'Base delay')).toHaveValue('12.00')
  await page.getByRole('button', { name: 'Redo Base delay' }).click()
  await expect(field(page, 'Base delay')).toHaveValue('9.00')
  await page.locator('body').press('Control+z')
  await expect(field(page, 'Base delay')).toHaveValue('12.00')
})

test('each demo set opens and is one step', async ({ page }) => {
  for (const name of ['Narrow resonant sweep', 'Struck tube', 'Two takes', 'Gentle waver', 'Through the null', 'Three slow voices']) {
    await openDemo(page, name)
    await expect(undo(page)).toHaveAttribute('title', `Undo Open ${name}`)
  }
})

test('a new set is started for an intent', async ({ page }) => {
  await setMenu(page).click()
  await page.getByRole('menuitem', { name: 'New' }).click()
  await page.getByRole('menuitem', { name: 'vibrato' }).click()
  await expect(page.getByTitle('Name, notes, rate and layout')).toContainText('vibrato')
  await expect(undo(page)).toHaveAttribute('title', 'Undo New vibrato')
})

test('Save hands over a file that opens again as the same set', async ({ page }) => {
  await openDemo(page, 'Struck tube')
  const saved = page.waitForEvent('download')
  await page.locator('body').press('Control+s')
  const download = await saved
  expect(download.suggestedFilename()).toBe('struck-tube.set.json')
  const text = await readFile(await download.path(), 'utf8')
  await openDemo(page, 'Gentle waver')
  await openFile(page, text)
  await expect(setMenu(page)).toContainText('Struck tube')
  const again = page.waitForEvent('download')
  await page.locator('body').press('Control+s')
  expect(await readFile(await (await again).path(), 'utf8')).toBe(text)
})

const refusals: readonly (readonly [string, string, RegExp])[] = [
  ['broken JSON', '{"format": "combwright-set",', /line 1/i],
  ['a document that is no set', '{"a": 1}', /format/],
  ['a future version', '{"format":"combwright-set","version":7}', /7/],
  ['an unknown key', setText({ loop: { feedbak: 0.5 } }), /loop\.feedbak/],
  ['a wrong type', setText({ sweep: { rateHz: 'slow' } }), /sweep\.rateHz.*0 to 100 Hz.*slow/],
  ['a value out of range', setText({ loop: { feedback: 3 } }), /loop\.feedback.*-2 to 2.*3/],
  ['a read before the write point', setText({ line: { baseMs: 1 } }), /line\.baseMs/],
]
for (const [what, text, why] of refusals) {
  test(`${what} is refused with path, value and range; what was open stays`, async ({ page }) => {
    await openDemo(page, 'Gentle waver')
    await openFile(page, text, 'bad.set.json')
    const message = page.getByRole('alert').filter({ hasText: '“bad.set.json” was not opened; what was open stays' })
    await expect(message).toContainText(why)
    await expect(setMenu(page)).toContainText('Gentle waver')
    await message.getByRole('button', { name: 'Dismiss' }).click()
    await expect(message).toBeHidden()
  })
}

test('Save as writes to a chosen place, and Save writes there again', async ({ page }) => {
  // A place in the browser's own file system stands for one on the disk: same interface, no dialog of the system.
  await page.evaluate(() => {
    const picker = async () => (await navigator.storage.getDirectory()).getFileHandle('kept.set.json', { create: true })
    Object.assign(window, { showSaveFilePicker: picker })
  })
  const kept = () =>
    page.evaluate(async () => (await (await (await navigator.storage.getDirectory()).getFileHandle('kept.set.json')).getFile()).text())
  await setMenu(page).click()
  await page.getByRole('menuitem', { name: 'Save as…' }).click()
  await expect.poll(kept).toContain('"baseMs": 12')
  await type(page, 'Base delay', '9')
  await page.locator('h2').first().click()
  await page.keyboard.press('Control+s')
  await expect.poll(kept).toContain('"baseMs": 9')
})

test('Escape with nothing to close mutes', async ({ page }) => {
  const mute = page.getByRole('button', { name: /^(Mute|Unmute|Sound on)/ })
  await field(page, 'Base delay').fill('9')
  await page.keyboard.press('Escape')
  await expect(field(page, 'Base delay')).toHaveValue('12.00')
  await expect(mute).toHaveAttribute('aria-pressed', 'false')
  await page.keyboard.press('Escape')
  await expect(mute).toHaveAttribute('aria-pressed', 'true')
})

test('name and notes are edited and can be undone', async ({ page }) => {
  await page.getByTitle('Name, notes, rate and layout').click()
  await page.getByLabel('Name', { exact: true }).fill('Wide and slow')
  await page.getByLabel('Name', { exact: true }).press('Enter')
  await expect(setMenu(page)).toContainText('Wide and slow')
  await page.getByLabel('Notes').fill('for the four-knob unit')
  await page.getByLabel('Name', { exact: true }).focus()
  await expect(undo(page)).toHaveAttribute('title', 'Undo Notes')
})

test('the theme is chosen, kept, and there before the bundle runs', async ({ page }) => {
  await page.getByRole('button', { name: 'View' }).click()
  await page.getByRole('menuitemradio', { name: 'Dark' }).click()
  await expect(page.locator('html')).toHaveAttribute('data-theme', 'dark')
  await page.route('**/assets/*.js', (route) => route.abort())
  await page.reload()
  await expect(page.locator('html')).toHaveAttribute('data-theme', 'dark')
})

test('letter keys do nothing in a field, and can be switched off', async ({ page }) => {
  const mute = page.getByRole('button', { name: /^(Mute|Unmute|Sound on)/ })
  const pressed = () => mute.first().getAttribute('aria-pressed')
  const before = await pressed()
  await field(page, 'Base delay').press('m')
  expect(await pressed()).toBe(before)
  await field(page, 'Base delay').press('Escape')
  await page.locator('h2').first().click()
  await page.keyboard.press('m')
  await expect.poll(pressed).not.toBe(before)
  await page.keyboard.press('m')
  await page.getByRole('button', { name: 'View' }).click()
  await page.getByRole('menuitemcheckbox', { name: 'Letter keys' }).click()
  await page.keyboard.press('Escape')
  await page.locator('h2').first().click()
  await page.keyboard.press('m')
  expect(await pressed()).toBe(before)
})

test('the keys are listed', async ({ page }) => {
  await page.getByRole('button', { name: 'View' }).click()
  await page.getByRole('menuitem', { name: 'Keys…' }).click()
  const dialog = page.getByRole('dialog', { name: 'Keys' })
  await expect(dialog).toContainText('play, pause')
  await dialog.press('Escape')
  await expect(dialog).toBeHidden()
})

test('1366 × 640 needs no scrolling of the page', async ({ page }) => {
  await page.setViewportSize({ width: 1366, height: 640 })
  for (const name of ['Three slow voices', 'Narrow resonant sweep', 'Through the null']) {
    await openDemo(page, name)
    const size = await page.evaluate(() => ({
      wide: document.documentElement.scrollWidth - innerWidth,
      high: document.documentElement.scrollHeight - innerHeight,
    }))
    expect(size).toEqual({ wide: 0, high: 0 })
  }
})
