import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { shadeLevels, shadeOf } from '../../../../app/plots/map/mapPicture.ts'
import { oklab, type Rgb, SHADES, shades } from '../../../../app/plots/map/palette.ts'

const css = readFileSync(new URL('../../../../app/styles/tokens.css', import.meta.url), 'utf8')
const [light = '', dark = ''] = css.split('[data-theme="dark"]')

function token(theme: string, name: string): Rgb {
  const hex = new RegExp(`--${name}: #([0-9a-f]{6})`).exec(theme)?.[1] ?? ''
  return [0, 2, 4].map((i) => Number.parseInt(hex.slice(i, i + 2), 16)) as unknown as Rgb
}

const stops = (theme: string) => ({ paper: token(theme, 'paper'), now: token(theme, 'now'), ink: token(theme, 'ink') })
const at = (colours: Uint8ClampedArray, i: number): Rgb => [
  colours[3 * i] as number,
  colours[3 * i + 1] as number,
  colours[3 * i + 2] as number,
]

/** Relative luminance, WCAG 2.2. */
function luminance(rgb: Rgb): number {
  const [r, g, b] = rgb.map((byte) =>
    byte / 255 <= 0.04045 ? byte / 255 / 12.92 : ((byte / 255 + 0.055) / 1.055) ** 2.4,
  ) as unknown as Rgb
  return 0.2126 * r + 0.7152 * g + 0.0722 * b
}

describe.each([
  ['light', light, -1],
  ['dark', dark, 1],
])('the shades of the %s theme', (_, theme, direction) => {
  const colours = shades(stops(theme))

  it('go from the paper through the colour of what is heard to the ink', () => {
    const { paper, now, ink } = stops(theme)
    const near = (a: Rgb, b: Rgb) => Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2])
    expect(near(at(colours, 0), paper)).toBeLessThan(2)
    expect(near(at(colours, SHADES - 1), ink)).toBeLessThan(2)
    expect(Math.min(...Array.from({ length: SHADES }, (_unused, i) => near(at(colours, i), now)))).toBeLessThan(4)
  })

  // Oracle: relative luminance of WCAG 2.2, which the mixing does not use.
  it('grow one way in luminance, so that they read without colour', () => {
    for (let i = 1; i < SHADES; i++) {
      const step = direction * (luminance(at(colours, i)) - luminance(at(colours, i - 1)))
      expect(step).toBeGreaterThanOrEqual(0)
    }
    const [a, b] = [luminance(at(colours, 0)), luminance(at(colours, SHADES - 1))]
    expect((Math.max(a, b) + 0.05) / (Math.min(a, b) + 0.05)).toBeGreaterThan(10)
  })

  it('step evenly in lightness', () => {
    const steps = Array.from({ length: 16 }, (_unused, k) => oklab(at(colours, 17 * k))[0]).map((l, k, all) =>
      k === 0 ? 0 : l - (all[k - 1] as number),
    )
    const sizes = steps.slice(1).map(Math.abs)
    expect(Math.max(...sizes) / Math.min(...sizes)).toBeLessThan(1.35)
  })
})

describe('a middle colour that does not lie between', () => {
  it('is left out', () => {
    const colours = shades({ paper: [255, 255, 255], now: [255, 255, 0], ink: [250, 250, 250] })
    for (let i = 1; i < SHADES; i++) expect(luminance(at(colours, i))).toBeLessThanOrEqual(luminance(at(colours, i - 1)))
  })
})

describe('the white point', () => {
  // Oracle: Oklab has white at L = 1, a = b = 0 (B. Ottosson 2020).
  it('is 1, 0, 0', () => {
    const [l, a, b] = oklab([255, 255, 255])
    expect(l).toBeCloseTo(1, 6)
    expect(a).toBeCloseTo(0, 6)
    expect(b).toBeCloseTo(0, 6)
  })
})

describe('the range of the shades', () => {
  const of = (...db: number[]) => shadeLevels({ channels: [Float32Array.from(db)] })

  it('is whole steps of 3 dB around the cells; deep notches are cut off 36 dB below the top', () => {
    expect(of(-7, 2)).toEqual({ minDb: -9, maxDb: 3 })
    expect(of(-200, 5.9)).toEqual({ minDb: -30, maxDb: 6 })
  })

  it('is 12 dB at least with what there is in its middle, and no step more for what rounding adds', () => {
    expect(of(0, 0)).toEqual({ minDb: -6, maxDb: 6 })
    expect(of(-2, 4)).toEqual({ minDb: -3, maxDb: 9 })
    expect(of(-20, 6.0000002)).toEqual({ minDb: -21, maxDb: 6 })
  })

  it('leaves out peaks of few cells that stand far above all others', () => {
    const rest = Array.from({ length: 999 }, (_, i) => -i / 100)
    expect(of(40, ...rest).maxDb).toBe(12)
    expect(of(10, ...rest).maxDb).toBe(12)
    // One cell in a hundred is not few.
    expect(of(...Array.from({ length: 10 }, () => 40), ...rest).maxDb).toBe(42)
  })

  it('maps levels to shades, held at both ends', () => {
    const levels = { minDb: -30, maxDb: 6 }
    expect([-400, -30, -12, 6, 40].map((db) => shadeOf(db, levels))).toEqual([0, 0, 128, 255, 255])
  })
})
