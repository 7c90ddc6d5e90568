// The Curve plot and the shaper's fields: what is shown follows from the set, is read by keyboard, and comes only when it is asked for.
import { expect, test } from '@playwright/test'
import { drivenSine, harmonicDb } from '../src/analysis/harmonics.ts'
import { defaultShaper } from '../src/set/defaults.ts'
import { numberIn, openSet, pane, reading, show } from './plotsPage.ts'
import { block, choice, field, type, undo } from './setPage.ts'

const SHAPER = { ...defaultShaper('tanh'), drive: 4, negative: 0.6 }
const slowly = expect.configure({ timeout: 20_000 })

test('without a shaper the plot says where to add one; its code comes with its tab, the shaper’s fields with the first curve', async ({
  page,
}) => {
  const asked: string[] = []
  page.on('request', (request) => asked.push(request.url()))
  await page.goto('./')
  await expect(field(page, 'Base delay')).toBeVisible()
  expect(asked.filter((url) => /\/(curve|ShaperBody)[-.]/.test(url))).toEqual([])
  await show(pane(page, 1), 'Curve')
  await slowly(pane(page, 1).getByText('No shaper', { exact: true })).toBeVisible()
  await block(page, /^Input/).click()
  await choice(page, 'Curve').selectOption({ label: 'tanh' })
  await slowly(reading(pane(page, 1))).toContainText('table off by at most')
  await expect(field(page, 'Drive')).toBeVisible()
  await expect(pane(page, 1).getByText('Input shaper', { exact: true })).toBeVisible()
})

test('the cursor reads the exact curve, and where the table holds its end', async ({ page }) => {
  await page.goto('./')
  await openSet(page, { 'mix.shaper': SHAPER })
  await show(pane(page, 0), 'Curve')
  const curve = pane(page, 0).getByRole('slider', { name: 'Curve at an input' })
  await slowly(reading(pane(page, 0))).toContainText('table off by at most')
  await curve.focus()
  await page.keyboard.press('Home')
  // Oracle: −0.6 tanh(4 · 1.12/0.6) by hand: −0.6 to the last digit shown.
  await slowly(curve).toHaveAttribute('aria-valuetext', '−1.120 → −0.600 · beyond the table, its end held')
  await page.keyboard.press('End')
  // tanh 4.48.
  await slowly(curve).toHaveAttribute('aria-valuetext', '1.120 → 1.000 · beyond the table, its end held')
})

test('harmonics stand against drive; the reading is the shaper’s own drive and follows the field', async ({ page }) => {
  await page.goto('./')
  await openSet(page, { 'mix.shaper': SHAPER })
  await block(page, /^Output/).click()
  const upper = pane(page, 0)
  await show(upper, 'Curve')
  await upper.getByRole('button', { name: 'Harmonics' }).click()
  const third = (drive: number) => harmonicDb(drivenSine({ ...SHAPER, drive }, 10 ** (-6 / 20), 3), 3) as number
  await slowly(reading(upper)).toContainText('drive 4.00 · 3: ')
  const words = (await reading(upper).textContent()) as string
  expect(numberIn(words.split('3: ')[1] as string)).toBeCloseTo(third(4), 1)
  await type(page, 'Drive', '2')
  await slowly(reading(upper)).toContainText('drive 2.00')
  await slowly(reading(upper)).toContainText(third(2).toFixed(1).replace('-', '−'))
  await upper.getByRole('button', { name: /table and files/ }).click()
  await page.getByRole('menuitem', { name: 'Show as a table' }).click()
  await expect(upper.getByRole('columnheader', { name: 'Harmonic 3' })).toBeVisible()
})

test('a drawn curve is moved by its points; the typed list stays; one step of history', async ({ page }) => {
  await page.goto('./')
  await openSet(page, {
    'mix.shaper': {
      ...defaultShaper('drawn'),
      points: [
        [0, 0],
        [0.5, 0.5],
        [1, 0.8],
      ],
    },
  })
  await block(page, /^Output/).click()
  const point = page.getByRole('slider', { name: 'Point 2 of 3' })
  await slowly(point).toBeVisible()
  await point.focus()
  await page.keyboard.press('ArrowUp')
  await slowly(point).not.toHaveAttribute('aria-valuenow', '0.5')
  const typed = page.getByRole('textbox', { name: /^Points/ })
  await expect(typed).not.toHaveValue(/0\.5, 0\.5\n/)
  await expect(undo(page)).toHaveAttribute('title', /points/)
  await undo(page).click()
  await expect(typed).toHaveValue('0, 0\n0.5, 0.5\n1, 0.8')
})
