// The panel: any field put on a knob, knobs played and edited, undone and kept, and the panel's worst place one press away.
import AxeBuilder from '@axe-core/playwright'
import { expect, type Page, test } from '@playwright/test'
import { block, choice, field, openDemo, openFile, openPage, setText, type, undo } from './setPage.ts'

const column = (page: Page) => page.getByRole('region', { name: 'Fields', exact: true })
const knob = (page: Page, name: string) => page.getByRole('slider', { name, exact: true })
const showPanel = (page: Page) => page.getByRole('button', { name: 'Panel', exact: true }).click()
const move = (parameter: string, min: number, max: number, taper = 'linear') => ({ parameter, min, max, taper })

/** One voice at 3.5 ms; Speed has three steps, Depth reaches past the write point, Regrowth past 1. */
const PANEL = setText({
  name: 'Ostler trial',
  layout: 'mono',
  line: { baseMs: 3.5 },
  voices: { count: 1 },
  sweep: { rateHz: 1, depthMs: 2.5 },
  loop: { feedback: 0.5 },
  panel: [
    { knob: 'Speed', position: 0.5, steps: 3, moves: [move('sweep.rateHz', 0.1, 10, 'log')] },
    { knob: 'Depth', position: 0.5, steps: 0, moves: [move('sweep.depthMs', 0, 5)] },
    { knob: 'Regrowth', position: 0.5, steps: 0, moves: [move('loop.feedback', -0.05, 1.05)] },
  ],
})

async function openTrial(page: Page) {
  await openPage(page)
  await openFile(page, PANEL)
  await expect(page.getByRole('heading', { level: 1 })).toContainText('Ostler trial')
}

test('a field is put on a knob from where it stands, by keys; typing its value turns the knob; undo and reload', async ({ page }) => {
  await openPage(page)
  await page.getByRole('button', { name: 'Put rate on a knob' }).focus()
  await page.keyboard.press('Enter')
  await expect(page.getByRole('menuitem', { name: 'On a new knob' })).toBeFocused()
  await page.keyboard.press('Enter')
  await expect(undo(page)).toHaveAttribute('title', 'Undo Rate on a knob')
  await expect(page.getByRole('button', { name: 'Rate is on knob Rate' })).toBeVisible()
  await type(page, 'Rate', '1.5')
  await showPanel(page)
  await expect(knob(page, 'Rate')).toHaveAttribute('aria-valuetext', /^rate 1\.5 hertz/)
  await expect(page.getByText('would give')).toHaveCount(0)
  await page.reload()
  await expect(knob(page, 'Rate')).toHaveAttribute('aria-valuetext', /^rate 1\.5 hertz/)
  // Choosing a block opens its fields again.
  await block(page, /^Voices/).click()
  await expect(field(page, 'Voices')).toBeVisible()
})

test('a knob is played by keys, wheel and drag; each turn is one step of history named for it', async ({ page }) => {
  await openTrial(page)
  await showPanel(page)
  const speed = knob(page, 'Speed')
  await speed.focus()
  await page.keyboard.press('ArrowUp')
  // Oracle: three steps of 0.1 to 10 Hz in ratios are 0.1, 1 and 10 Hz.
  await expect(speed).toHaveAttribute('aria-valuetext', /^rate 10 hertz/)
  await page.keyboard.press('Home')
  await expect(speed).toHaveAttribute('aria-valuetext', /^rate 0\.1 hertz/)
  await expect(undo(page)).toHaveAttribute('title', 'Undo Speed')
  const regrowth = knob(page, 'Regrowth')
  const box = await regrowth.boundingBox()
  if (!box) throw new Error('no knob')
  await page.mouse.move(box.x + box.width / 2, box.y + box.height / 2)
  await page.mouse.down()
  await page.mouse.move(box.x + box.width / 2, box.y + box.height / 2 - 40, { steps: 8 })
  await page.mouse.up()
  // Oracle: 40 of the 160 px of a turn from the middle of −0.05 to 1.05: three quarters, 0.775.
  await expect(regrowth).toHaveAttribute('aria-valuetext', /^feedback 0\.775/)
  await expect(undo(page)).toHaveAttribute('title', 'Undo Regrowth')
  await page.keyboard.press('Control+z')
  await expect(regrowth).toHaveAttribute('aria-valuetext', /^feedback 0\.5,/)
  await regrowth.focus()
  await regrowth.hover()
  await page.mouse.wheel(0, -100)
  await expect(regrowth).toHaveAttribute('aria-valuenow', '0.52')
  await expect(undo(page)).toHaveAttribute('title', 'Undo Regrowth')
})

test('a turn through a place that cannot sound is held and said; a value out of reach is refused with a wider knob offered', async ({
  page,
}) => {
  await openTrial(page)
  await showPanel(page)
  const depth = knob(page, 'Depth')
  await depth.focus()
  await page.keyboard.press('End')
  await expect(column(page).getByRole('status').filter({ hasText: 'Held' })).toContainText('a voice reads no closer')
  // Oracle: 3.5 ms less one sample of 48 kHz.
  await expect(depth).toHaveAttribute('aria-valuetext', /^depth 3\.4\d+ milliseconds/)
  await type(page, 'Speed, rate', '12')
  await expect(column(page).getByRole('alert')).toContainText('Speed goes from 0.10 Hz to 10 Hz')
  await column(page).getByRole('button', { name: 'Widen to 12 Hz' }).click()
  await expect(knob(page, 'Speed')).toHaveAttribute('aria-valuetext', /^rate 12 hertz, at 1\.00/)
  await expect(field(page, 'Rate at the knob’s right end')).toHaveValue('12')
})

test('a knob is edited: name, steps, smoothing, ends, taper, another move, its place, and away', async ({ page }) => {
  await openTrial(page)
  await showPanel(page)
  await column(page).getByLabel('Name', { exact: true }).fill('Pace')
  await page.keyboard.press('Enter')
  await expect(knob(page, 'Pace')).toBeVisible()
  await type(page, 'Steps', '1')
  await expect(column(page).getByRole('alert')).toContainText('but not 1')
  await type(page, 'Steps', '101')
  await type(page, 'Smoothing', '0.2 s')
  await expect(field(page, 'Smoothing')).toHaveValue('200')
  await type(page, 'Rate at the knob’s left end', '0.2 Hz')
  await expect(undo(page)).toHaveAttribute('title', 'Undo Pace, rate')
  await choice(page, 'Taper of rate').selectOption('drawn')
  await expect(page.getByLabel(/^Taper, position/)).toHaveValue(/^0, 0\n/)
  await choice(page, 'Move another field').selectOption('mix.wet')
  await expect(field(page, 'Wet at the knob’s right end')).toBeVisible()
  await page.getByRole('button', { name: 'Take wet off knob Pace' }).click()
  await expect(field(page, 'Wet at the knob’s right end')).toHaveCount(0)
  await page.getByRole('button', { name: 'Put knob Pace later' }).click()
  await expect(page.getByRole('slider', { name: /^(Pace|Depth|Regrowth)$/ }).first()).toHaveAccessibleName('Depth')
  await page.getByRole('button', { name: 'Remove knob Pace' }).click()
  await expect(knob(page, 'Pace')).toHaveCount(0)
  await undo(page).click()
  await expect(knob(page, 'Pace')).toBeVisible()
})

test('a taper that cannot go by ratios is refused with the end that lets it', async ({ page }) => {
  await openTrial(page)
  await showPanel(page)
  await knob(page, 'Depth').focus()
  await choice(page, 'Taper of depth').selectOption('log')
  await expect(column(page).getByRole('alert')).toContainText('goes by ratios')
  await column(page)
    .getByRole('button', { name: /^Also start at/ })
    .click()
  await expect(choice(page, 'Taper of depth')).toHaveValue('log')
})

test('where a field and its knob part, what the knob would give is said, with ways to settle', async ({ page }) => {
  await openTrial(page)
  await type(page, 'Rate', '15')
  const note = page.locator('.cw-knob-note')
  await expect(note).toContainText('knob Speed would give 1.00 Hz')
  await note.getByRole('button', { name: 'Widen Speed to 15 Hz' }).click()
  await expect(note).toHaveCount(0)
  await expect(field(page, 'Rate')).toHaveValue('15')
  await type(page, 'Rate', '2')
  await expect(note).toContainText('its nearest step gives 1.225 Hz')
  await note.getByRole('button', { name: 'Use 1.225 Hz' }).click()
  await expect(field(page, 'Rate')).toHaveValue(/^1\.22/)
})

test('the panel’s worst place is one press away, and the knob’s end that holds is offered', async ({ page }) => {
  test.setTimeout(120_000)
  await openTrial(page)
  const slowly = expect.configure({ timeout: 60_000 })
  const checks = page.getByRole('region', { name: /^Checks/ })
  const go = checks.getByRole('button', { name: 'Go there: Delay range' })
  await slowly(go).toBeVisible()
  // The delay there would lie before the write point: it cannot sound, and the end that can is offered.
  await go.click()
  await expect(checks.getByRole('alert')).toContainText('It cannot sound there')
  await checks
    .getByRole('alert')
    .getByRole('button', { name: /^End Depth at 3\.4/ })
    .click()
  await expect(undo(page)).toHaveAttribute('title', /^Undo End Depth at 3\.4/)
  await showPanel(page)
  await slowly(checks.getByRole('button', { name: 'Go there: Stability under the sweep' })).toBeVisible()
  await checks.getByRole('button', { name: 'Go there: Stability under the sweep' }).click()
  await expect(knob(page, 'Regrowth')).toHaveAttribute('aria-valuetext', /^feedback 1\.05/)
  await page.keyboard.press('Control+z')
  await expect(knob(page, 'Regrowth')).toHaveAttribute('aria-valuetext', /^feedback 0\.5,/)
})

test('on a narrow page the panel opens in the list', async ({ page }) => {
  await page.setViewportSize({ width: 320, height: 700 })
  await openPage(page)
  await openDemo(page, 'Gentle waver')
  await page.getByRole('button', { name: 'Panel Speed, Depth' }).click()
  await expect(knob(page, 'Depth')).toBeVisible()
  expect(await page.locator('.cw-shape-fields').evaluate((part) => part.scrollWidth <= part.clientWidth)).toBe(true)
})

for (const theme of ['light', 'dark'] as const)
  test(`axe finds nothing in the panel, its refusals, its menu at a field, ${theme}`, async ({ page }) => {
    // One walk over a part takes seconds on a small machine.
    test.setTimeout(180_000)
    await page.emulateMedia({ colorScheme: theme })
    await openTrial(page)
    const found = async (part: string) => {
      const { violations } = await new AxeBuilder({ page })
        .withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'])
        .include(part)
        .exclude('[data-base-ui-focus-guard]')
        .analyze()
      return violations.flatMap(({ id, nodes }) => nodes.map((node) => `${id}: ${node.target.join(' ')} ${node.failureSummary ?? ''}`))
    }
    await type(page, 'Rate', '15')
    await page.getByRole('button', { name: 'Put base delay on a knob' }).click()
    await expect(page.getByRole('menuitem', { name: 'On a new knob' })).toBeVisible()
    expect(await found('.cw-menu')).toEqual([])
    await page.keyboard.press('Escape')
    expect(await found('.cw-shape-fields')).toEqual([])
    await showPanel(page)
    await choice(page, 'Taper of rate').selectOption('drawn')
    await type(page, 'Speed, rate', '18')
    expect(await found('.cw-shape-fields')).toEqual([])
  })
