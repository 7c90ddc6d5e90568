// What the specs of frame, fields and drawing share: a set file to open, fields by their label, problems of the page itself.
import { expect, type Locator, type Page } from '@playwright/test'

/** Opens the page and fails on anything the browser reports: errors, refused resources, broken policy. */
export async function openPage(page: Page): Promise<void> {
  const problems: string[] = []
  page.on('pageerror', (error) => problems.push(error.message))
  page.on('console', (message) => {
    if (message.type() === 'error' || message.type() === 'warning') problems.push(message.text())
  })
  await page.goto('./')
  await expect(field(page, 'Base delay')).toBeVisible()
  expect(problems).toEqual([])
}

export const field = (page: Page, label: string): Locator => page.getByRole('spinbutton', { name: label, exact: true })
export const choice = (page: Page, label: string): Locator => page.getByRole('combobox', { name: label, exact: true })
export const block = (page: Page, name: RegExp): Locator => page.getByRole('tablist', { name: 'Signal path' }).getByRole('tab', { name })
export const undo = (page: Page): Locator => page.getByRole('button', { name: /^(Undo|Nothing to undo)/ })
export const setMenu = (page: Page): Locator => page.getByRole('heading', { level: 1 }).getByRole('button')

/** Types into a field and presses Enter. */
export async function type(page: Page, label: string, text: string): Promise<void> {
  await field(page, label).fill(text)
  await field(page, label).press('Enter')
}

/** Chooses a file through the menu's Open. */
export async function openFile(page: Page, text: string, name = 'x.set.json'): Promise<void> {
  const chooser = page.waitForEvent('filechooser')
  await setMenu(page).click()
  await page.getByRole('menuitem', { name: 'Open…' }).click()
  await (await chooser).setFiles({ name, mimeType: 'application/json', buffer: Buffer.from(text) })
}

/** Opens a demo set through the menu. */
export async function openDemo(page: Page, name: string): Promise<void> {
  await setMenu(page).click()
  await page.getByRole('menuitem', { name: 'Demo sets' }).click()
  await page.getByRole('menuitem', { name: new RegExp(name) }).click()
  await expect(setMenu(page)).toContainText(name)
}

/** The smallest set file with some fields given. */
export const setText = (fields: object): string => JSON.stringify({ format: 'combwright-set', version: 1, ...fields })
