// The plots: they move with the sound, can be held and dragged, read out true figures, export, and are usable by keyboard.
import { readFile } from 'node:fs/promises'
import { expect, test } from '@playwright/test'
import { freeze } from '../src/analysis/frozen.ts'
import { frozenResponse } from '../src/analysis/response.ts'
import { sweepTable } from '../src/analysis/sweepTable.ts'
import { setWith, start } from './audioPage.ts'
import { drawn, numberIn, openSet, pane, reading, show } from './plotsPage.ts'

/** One voice, so that the readings follow from the formulas. */
const FLANGER = {
  layout: 'mono',
  'line.baseMs': 3.5,
  'sweep.depthMs': 2.5,
  'sweep.rateHz': 0.5,
  'voices.count': 1,
  'voices.spreadMs': 0,
} as const

// Figures come from workers: on a busy machine they may take a while.
const slowly = expect.configure({ timeout: 20_000 })

test.beforeEach(async ({ page }) => {
  await page.goto('/')
})

test('the response moves while the sound plays, and stands still when it is paused', async ({ page }) => {
  await openSet(page, FLANGER)
  const response = pane(page, 0)
  await slowly(reading(response)).toContainText('notches every')
  await start(page)
  const before = await drawn(response)
  const noted = await reading(response).textContent()
  await expect.poll(() => drawn(response), { timeout: 10_000 }).not.toBe(before)
  await expect.poll(() => reading(response).textContent(), { timeout: 10_000 }).not.toBe(noted)
  await page.getByRole('button', { name: 'Pause' }).click()
  await expect
    .poll(
      async () => {
        const one = await drawn(response)
        await page.waitForTimeout(300)
        return (await drawn(response)) === one
      },
      { timeout: 10_000 },
    )
    .toBe(true)
})

test('dragging in the sweep holds the position there; Release lets it follow the sound again', async ({ page }) => {
  await openSet(page, FLANGER)
  await start(page)
  const sweep = pane(page, 1)
  const area = await sweep.locator('.u-over').boundingBox()
  if (!area) throw new Error('the sweep has no plotting area')
  const y = area.y + area.height / 2
  await page.mouse.move(area.x + 0.2 * area.width, y)
  await page.mouse.down()
  await page.mouse.move(area.x + 0.75 * area.width, y, { steps: 4 })
  await page.mouse.up()
  await page.mouse.move(area.x - 200, y)
  // Oracle: base + depth · sin 2π0.75 = 3.5 − 2.5 ms; the slope there is 0.
  await slowly(reading(sweep)).toHaveText(/^position 0\.7[45] · 1\.0\d ms · [−+]?0\.\d cents · held$/)
  const held = await reading(sweep).textContent()
  await page.waitForTimeout(500)
  expect(await reading(sweep).textContent()).toBe(held)
  await sweep.getByRole('button', { name: 'Release' }).click()
  await slowly(reading(sweep)).not.toContainText('held')
  await expect.poll(() => reading(sweep).textContent()).not.toContain('position 0.75')
})

test('the sweep position is a slider: arrows 0.01, Page 0.1, spoken with delay and cents', async ({ page }) => {
  await openSet(page, FLANGER)
  const slider = page.getByRole('slider', { name: 'Sweep position' })
  await slowly(slider).toHaveAttribute('aria-valuetext', 'follows the sound')
  await slider.focus()
  await page.keyboard.press('PageUp')
  await page.keyboard.press('PageUp')
  await page.keyboard.press('ArrowRight')
  await slowly(slider).toHaveAttribute('aria-valuenow', '0.21')
  const [voice] = sweepTable(setWith(FLANGER), 100).voices
  const spoken = (await slider.getAttribute('aria-valuetext')) ?? ''
  const [, delay = '', bend = ''] = spoken.split(' · ')
  expect(numberIn(delay)).toBeCloseTo(voice?.delayMs[21] ?? Number.NaN, 2)
  expect(numberIn(bend)).toBeCloseTo(voice?.cents[21] ?? Number.NaN, 1)
  expect(spoken).toContain('held')
  await page.keyboard.press('Home')
  await slowly(slider).toHaveAttribute('aria-valuenow', '0.00')
  await page.keyboard.press('h')
  await slowly(slider).toHaveAttribute('aria-valuetext', 'follows the sound')
})

test('the cursor reads frequency, level and note; the level is the exact response', async ({ page }) => {
  await openSet(page, FLANGER)
  const response = pane(page, 0)
  await slowly(reading(response)).toContainText('notches every')
  const area = await response.locator('.u-over').boundingBox()
  if (!area) throw new Error('the response has no plotting area')
  for (const part of [0.2, 0.4, 0.55]) {
    await page.mouse.move(area.x + Math.round(part * area.width), area.y + 40)
    await slowly(reading(response)).toHaveText(/^[\d.\u2009]+ Hz · [−+]?[\d.]+ dB · [A-G]♯?\d [−+]?\d+ ct\u2003notches every [\d.]+ Hz$/)
    const text = (await reading(response).textContent()) ?? ''
    const hz = numberIn(text)
    expect(hz).toBeCloseTo(20 * 1000 ** part, -1)
    // The frequency is rounded to four digits: the level lies between those at both ends of the rounding.
    const step = hz < 100 ? 0.05 : 0.5
    const [channel] = frozenResponse(freeze(setWith(FLANGER), 0), [hz - step, hz, hz + step])
    const levels = [...(channel?.db ?? [])]
    const level = numberIn(text.split(' · ')[1] ?? '')
    expect(level).toBeGreaterThanOrEqual(Math.min(...levels) - 0.051)
    expect(level).toBeLessThanOrEqual(Math.max(...levels) + 0.051)
  }
})

test('the response has a cursor from the keyboard, spoken as it is read', async ({ page }) => {
  await openSet(page, FLANGER)
  const slider = page.getByRole('slider', { name: 'Response at a frequency' })
  await slider.focus()
  await page.keyboard.press('End')
  await page.keyboard.press('PageDown')
  await slowly(slider).toHaveAttribute('aria-valuenow', '0.90')
  await slowly(slider).toHaveAttribute('aria-valuetext', /^10\u2009024 Hz · [−+]?[\d.]+ dB · D♯9 \+\d\d ct$/)
})

test('two plots stand at once; a tab shows another, and takes from the other pane what stands there', async ({ page }) => {
  const [upper, lower] = [pane(page, 0), pane(page, 1)]
  await expect(upper.getByRole('tab', { name: 'Response' })).toHaveAttribute('aria-selected', 'true')
  await expect(lower.getByRole('tab', { name: 'Sweep' })).toHaveAttribute('aria-selected', 'true')
  await lower.getByRole('tab', { name: 'Sweep' }).focus()
  await page.keyboard.press('ArrowRight')
  await expect(lower.getByRole('tab', { name: 'Map' })).toHaveAttribute('aria-selected', 'true')
  await show(lower, 'Response')
  await expect(lower.getByRole('tab', { name: 'Response' })).toHaveAttribute('aria-selected', 'true')
  await expect(upper.getByRole('tab', { name: 'Map' })).toHaveAttribute('aria-selected', 'true')
  await expect(page.locator('.cw-plot')).toHaveCount(2)
})

test('a plot shows as a table: third octaves with the level that the formulas give', async ({ page }) => {
  await openSet(page, { ...FLANGER, 'mix.wet': 0.3 })
  const response = pane(page, 0)
  await slowly(reading(response)).toContainText('notches every')
  await response.getByRole('button', { name: 'Response: table and files' }).click()
  await page.getByRole('menuitem', { name: 'Show as a table' }).click()
  const table = response.getByRole('table')
  await expect(table.getByRole('row').nth(3)).toBeVisible()
  const cells = table.getByRole('row', { name: /^20 Hz / }).getByRole('cell')
  const [channel] = frozenResponse(freeze(setWith({ ...FLANGER, 'mix.wet': 0.3 }), 0), [20])
  expect(numberIn((await cells.nth(1).textContent()) ?? '')).toBeCloseTo(channel?.db[0] ?? Number.NaN, 1)
  await response.getByRole('button', { name: 'Response: table and files' }).click()
  await page.getByRole('menuitem', { name: 'Show the plot' }).click()
  await expect(table).toHaveCount(0)
})

test('a plot saves its numbers as CSV: as exact as they are drawn', async ({ page }) => {
  await openSet(page, FLANGER)
  const response = pane(page, 0)
  await slowly(reading(response)).toContainText('notches every')
  await response.getByRole('button', { name: 'Response: table and files' }).click()
  const download = page.waitForEvent('download')
  await page.getByRole('menuitem', { name: 'Save the numbers (CSV)' }).click()
  const file = await download
  expect(file.suggestedFilename()).toMatch(/^set-\d+-response\.csv$/)
  const [head, ...rows] = (await readFile(await file.path(), 'utf8')).trimEnd().split('\r\n')
  expect(head).toMatch(/^frequency_hz,level_db/)
  expect(rows.length).toBeGreaterThan(1000)
  const numbers = rows.map((row) => row.split(',').map(Number))
  const [channel] = frozenResponse(
    freeze(setWith(FLANGER), 0),
    numbers.map(([hz]) => hz ?? 0),
  )
  numbers.forEach(([, db], i) => {
    // Frequencies are written with twelve digits: at a null even that moves the level.
    if ((channel?.db[i] ?? 0) > -80) expect(db).toBeCloseTo(channel?.db[i] ?? Number.NaN, 3)
  })
})

test('a plot saves its picture as PNG', async ({ page }) => {
  const sweep = pane(page, 1)
  await sweep.getByRole('button', { name: 'Sweep: table and files' }).click()
  const download = page.waitForEvent('download')
  await page.getByRole('menuitem', { name: 'Save the picture (PNG)' }).click()
  const file = await download
  expect(file.suggestedFilename()).toMatch(/-sweep\.png$/)
  const bytes = await readFile(await file.path())
  expect([...bytes.subarray(0, 8)]).toEqual([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a])
  expect(bytes.readUInt32BE(16)).toBeGreaterThan(400)
})

test('the loop says plainly when there is no feedback, and how far below the limit it stays when there is', async ({ page }) => {
  const lower = pane(page, 1)
  await openSet(page, FLANGER)
  await show(lower, 'Loop')
  await slowly(reading(lower)).toHaveText('no feedback')
  await openSet(page, { ...FLANGER, 'loop.feedback': 0.62 })
  // Oracle: linear reads and no filter: at most |g|; −20 log10 0.62 = 4.15 dB.
  await slowly(reading(lower)).toHaveText(/^largest pole 0\.99\d+ · rings \d+ ms · 4\.2 dB below the limit$/)
})

test('the scope asks for sound, shows it, and keeps the last window when it stops', async ({ page }) => {
  await openSet(page, FLANGER)
  const lower = pane(page, 1)
  await show(lower, 'Scope')
  await expect(lower.getByRole('slider', { name: 'Scope at a time' })).toHaveAttribute('aria-valuetext', /Press Play/)
  await start(page)
  await slowly(reading(lower)).toHaveText(/^peak in \d\.\d+ · out \d\.\d+$/, { timeout: 10_000 })
  await page.getByRole('button', { name: 'Pause' }).click()
  await slowly(reading(lower)).toHaveText(/^peak in \d\.\d+ · out \d\.\d+$/)
})

test('a narrow page shows one plot', async ({ page }) => {
  await page.setViewportSize({ width: 390, height: 844 })
  await expect(page.locator('.cw-plot')).toHaveCount(1)
  const only = pane(page, 0)
  await expect(only.getByRole('tab', { name: 'Response' })).toHaveAttribute('aria-selected', 'true')
  const box = await only.boundingBox()
  expect((box?.x ?? -1) >= 0 && (box?.x ?? 0) + (box?.width ?? 999) <= 390).toBe(true)
})
