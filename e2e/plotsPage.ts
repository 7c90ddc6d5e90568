// What the specs of plots and checks share: panes, their readings and canvases, numbers in readings.
import { expect, type Locator, type Page } from '@playwright/test'
import { dropSet } from './audioPage.ts'

/** A plot's pane: 0 the upper, 1 the lower. */
export const pane = (page: Page, index: 0 | 1): Locator => page.getByRole('region', { name: 'Plots' }).locator('.cw-plot-pane').nth(index)

export const reading = (of: Locator): Locator => of.locator('.cw-plot-reading')

/** What is drawn now, as one string: all canvases of the plot. */
export const drawn = (of: Locator): Promise<string> =>
  of.locator('canvas').evaluateAll((layers) => layers.map((canvas) => (canvas as HTMLCanvasElement).toDataURL()).join())

/** The first number in a text, as the page writes it: real minus sign, thin spaces. */
export function numberIn(text: string): number {
  const found = /[−+]?\d[\d\u2009]*(\.\d+)?/.exec(text)?.[0] ?? 'NaN'
  return Number(found.replace('−', '-').replace('+', '').replaceAll('\u2009', ''))
}

/** Shows a plot in a pane. */
export async function show(of: Locator, name: string): Promise<void> {
  await of.getByRole('tab', { name }).click()
}

/** Drops a set on the page once the page listens, and waits until it is the one shown. */
export async function openSet(page: Page, fields: Readonly<Record<string, unknown>>): Promise<void> {
  await expect(page.getByRole('button', { name: 'Play' })).toBeVisible()
  const name = `Set ${++opened}`
  await dropSet(page, { ...fields, name })
  await expect(page.getByRole('heading', { level: 1 })).toContainText(name)
}

let opened = 0
