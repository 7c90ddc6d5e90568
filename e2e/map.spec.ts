// The map of the sweep, and the sweep drawn by hand.
import AxeBuilder from '@axe-core/playwright'
import { expect, type Page, test } from '@playwright/test'
import { freeze } from '../src/analysis/frozen.ts'
import { frozenResponse } from '../src/analysis/response.ts'
import { setWith, start } from './audioPage.ts'
import { numberIn, openSet, pane, reading, show } from './plotsPage.ts'
import { choice, field, undo } from './setPage.ts'

/** One voice whose delay is 3.5 ± 2.5 ms: the first notch stands at ½/τ. */
const FLANGER = {
  layout: 'mono',
  'line.baseMs': 3.5,
  'sweep.depthMs': 2.5,
  'sweep.rateHz': 0.5,
  'voices.count': 1,
  'voices.spreadMs': 0,
  'mix.wet': 0.5,
} as const

const slowly = expect.configure({ timeout: 20_000 })
const lower = (page: Page) => pane(page, 1)

async function showMap(page: Page, fields: Readonly<Record<string, unknown>> = FLANGER): Promise<void> {
  await openSet(page, fields)
  await show(lower(page), 'Map')
  await slowly(reading(lower(page))).toContainText('first notch')
}

test.beforeEach(async ({ page }) => {
  await page.goto('/')
})

test('plots that are not shown at first are fetched when they are chosen', async ({ page }) => {
  const scripts: string[] = []
  page.on('request', (request) => request.resourceType() === 'script' && scripts.push(new URL(request.url()).pathname))
  await page.reload()
  await expect(field(page, 'Base delay')).toBeVisible()
  const fetched = () => scripts.filter((name) => /\/(map|scope|loop|curve|PointsPicture)-/.test(name))
  expect(fetched()).toEqual([])
  await show(lower(page), 'Map')
  await slowly(reading(lower(page))).toContainText('position')
  // The plot's own code, and its worker's.
  expect(fetched().filter((name) => !name.includes('/map-'))).toEqual([])
  expect(fetched().length).toBeGreaterThan(0)
})

test('the map reads the exact level at position and frequency, and the first notch where nothing is pointed at', async ({ page }) => {
  await showMap(page)
  // Oracle: ½/3.5 ms.
  await slowly(reading(lower(page))).toHaveText('position 0.00 · first notch 143 Hz')
  const area = await lower(page).locator('.u-over').boundingBox()
  if (!area) throw new Error('the map has no plotting area')
  await page.mouse.move(area.x + 0.25 * area.width, area.y + 0.62 * area.height)
  await slowly(reading(lower(page))).toHaveText(/^position 0\.25 · [\d.]+ Hz · [−+][\d.]+ dB( \(mean [−+][\d.]+ dB\))? · [A-G]/)
  const [, hz = '', db = ''] = ((await reading(lower(page)).textContent()) ?? '').split(' · ')
  // The frequency is rounded to a hertz, the position to a hundredth.
  const around = [-0.005, 0, 0.005].flatMap((by) => {
    const [channel] = frozenResponse(freeze(setWith(FLANGER), 0.25 + by), [numberIn(hz) - 0.5, numberIn(hz), numberIn(hz) + 0.5])
    return [...(channel?.db ?? [])]
  })
  expect(numberIn(db)).toBeGreaterThanOrEqual(Math.min(...around) - 0.051)
  expect(numberIn(db)).toBeLessThanOrEqual(Math.max(...around) + 0.051)
})

test('pressing in the map holds the sweep there; position and frequency are sliders of their own', async ({ page }) => {
  await showMap(page)
  await start(page)
  const area = await lower(page).locator('.u-over').boundingBox()
  if (!area) throw new Error('the map has no plotting area')
  await page.mouse.click(area.x + 0.75 * area.width, area.y + area.height / 2)
  await page.mouse.move(area.x - 100, area.y)
  // Oracle: ½/1 ms.
  await slowly(reading(lower(page))).toHaveText(/^position 0\.7[45] · first notch (49|50)\d Hz · held$/)
  const position = lower(page).getByRole('slider', { name: 'Sweep position' })
  await position.focus()
  await page.keyboard.press('Home')
  await slowly(position).toHaveAttribute('aria-valuetext', /^position 0\.00 · first notch 143 Hz, held$/)
  const frequency = lower(page).getByRole('slider', { name: 'Frequency read in the map' })
  await frequency.focus()
  await page.keyboard.press('End')
  await page.keyboard.press('PageDown')
  await slowly(frequency).toHaveAttribute('aria-valuetext', /^position 0\.00 · 10\u2009024 Hz · /)
  await slowly(reading(lower(page))).toContainText('10\u2009024 Hz')
  await page.keyboard.press('h')
  await slowly(position).toHaveAttribute('aria-valuetext', 'follows the sound')
})

test('the map is a table of tracks, too', async ({ page }) => {
  await showMap(page)
  await lower(page).getByRole('button', { name: 'Map: table and files' }).click()
  await page.getByRole('menuitem', { name: 'Show as a table' }).click()
  // Oracle: ½/6 ms to ½/1 ms.
  await slowly(lower(page).getByRole('row', { name: /^Notch 1 83\.\d Hz .* 0\.25 500 Hz .* 0\.75 always$/ })).toBeVisible()
})

test('a sweep is drawn by hand: it starts from the shape it was, a drag is one step, points go and come', async ({ page }) => {
  await openSet(page, FLANGER)
  await choice(page, 'Sweep shape').selectOption('drawn')
  const editor = page.getByRole('group', { name: 'Drawn sweep' })
  const top = editor.getByRole('slider', { name: 'Point 5 of 16' })
  await slowly(top).toHaveAttribute('aria-valuetext', 'phase 0.25 · s 1 · 6.00\u00a0ms')
  await top.scrollIntoViewIfNeeded()
  const dot = await top.locator('.cw-points-dot').boundingBox()
  if (!dot) throw new Error('the point is not drawn')
  await page.mouse.move(dot.x + dot.width / 2, dot.y + dot.height / 2)
  await page.mouse.down()
  await page.mouse.move(dot.x + dot.width / 2, dot.y + dot.height / 2 + 36, { steps: 4 })
  await page.mouse.up()
  const dragged = Number((await top.getAttribute('aria-valuenow')) ?? Number.NaN)
  expect(dragged).toBeGreaterThan(0.4)
  expect(dragged).toBeLessThan(0.6)
  await undo(page).click()
  await slowly(top).toHaveAttribute('aria-valuenow', '1')
  await top.focus()
  await page.keyboard.press('Delete')
  await slowly(editor.getByRole('slider')).toHaveCount(15)
  await page.keyboard.press('Enter')
  await slowly(editor.getByRole('slider')).toHaveCount(16)
})

test('axe finds nothing in the map and in the editor, on a narrow page too', async ({ page }) => {
  await openSet(page, {
    ...FLANGER,
    'sweep.shape': 'drawn',
    'sweep.points': [
      [0, 0],
      [0.5, 1],
    ],
  })
  for (const width of [1366, 390]) {
    await page.setViewportSize({ width, height: 844 })
    await show(pane(page, 0), 'Map')
    await slowly(reading(pane(page, 0))).toContainText('first notch')
    await slowly(page.getByRole('group', { name: 'Drawn sweep' })).toBeVisible()
    const { violations } = await new AxeBuilder({ page }).include('.cw-plots').include('.cw-shape-fields').analyze()
    expect(violations.flatMap(({ id, nodes }) => nodes.map((node) => `${id}: ${node.target.join(' ')}`))).toEqual([])
  }
})

test('a point stops where the delay would reach the write point, and the editor says so', async ({ page }) => {
  await openSet(page, {
    ...FLANGER,
    'sweep.depthMs': 4,
    'sweep.shape': 'drawn',
    'sweep.points': [
      [0, 0],
      [0.5, -0.85],
    ],
  })
  const editor = page.getByRole('group', { name: 'Drawn sweep' })
  const second = editor.getByRole('slider', { name: 'Point 2 of 2' })
  await second.focus()
  for (let i = 0; i < 3; i++) await page.keyboard.press('ArrowDown')
  await slowly(editor.getByRole('status')).toContainText('a voice reads no closer than')
  // Oracle: 3.5 + 4 s ms = one sample at 48 kHz.
  const stopped = Number((await second.getAttribute('aria-valuenow')) ?? Number.NaN)
  expect(stopped).toBeGreaterThanOrEqual((1 / 48 - 3.5) / 4 - 1e-6)
  expect(stopped).toBeLessThan(-0.866)
})
