// Shades from the paper over the colour of what is heard to the ink, evenly in lightness, so that more is always farther from the
// paper, in both themes. Mixed in Oklab (B. Ottosson, "A perceptual color space for image processing", 2020).

export type Rgb = readonly [number, number, number]

export interface Stops {
  readonly paper: Rgb
  readonly now: Rgb
  readonly ink: Rgb
}

export const SHADES = 256

/** `SHADES` colours, 0 to 255 a component. Where the middle colour lies not between the outer ones in lightness it is left out. */
export function shades({ paper, now, ink }: Stops): Uint8ClampedArray {
  const [low, middle, high] = [oklab(paper), oklab(now), oklab(ink)]
  const at = (middle[0] - low[0]) / (high[0] - low[0])
  const between = at > 0.05 && at < 0.95
  const out = new Uint8ClampedArray(3 * SHADES)
  for (let i = 0; i < SHADES; i++) {
    const t = i / (SHADES - 1)
    const colour = !between ? mix(low, high, t) : t < at ? mix(low, middle, t / at) : mix(middle, high, (t - at) / (1 - at))
    out.set(srgb(colour), 3 * i)
  }
  return out
}

const mix = (a: Rgb, b: Rgb, t: number): Rgb => [a[0] + (b[0] - a[0]) * t, a[1] + (b[1] - a[1]) * t, a[2] + (b[2] - a[2]) * t]

/** L, a, b. */
export function oklab(rgb: Rgb): Rgb {
  const [r, g, b] = [linear(rgb[0]), linear(rgb[1]), linear(rgb[2])]
  const l = Math.cbrt(0.4122214708 * r + 0.5363325363 * g + 0.0514459929 * b)
  const m = Math.cbrt(0.2119034982 * r + 0.6806995451 * g + 0.1073969566 * b)
  const s = Math.cbrt(0.0883024619 * r + 0.2817188376 * g + 0.6299787005 * b)
  return [
    0.2104542553 * l + 0.793617785 * m - 0.0040720468 * s,
    1.9779984951 * l - 2.428592205 * m + 0.4505937099 * s,
    0.0259040371 * l + 0.7827717662 * m - 0.808675766 * s,
  ]
}

function srgb([lightness, a, b]: Rgb): Rgb {
  const l = (lightness + 0.3963377774 * a + 0.2158037573 * b) ** 3
  const m = (lightness - 0.1055613458 * a - 0.0638541728 * b) ** 3
  const s = (lightness - 0.0894841775 * a - 1.291485548 * b) ** 3
  return [
    encoded(4.0767416621 * l - 3.3077115913 * m + 0.2309699292 * s),
    encoded(-1.2684380046 * l + 2.6097574011 * m - 0.3413193965 * s),
    encoded(-0.0041960863 * l - 0.7034186147 * m + 1.707614701 * s),
  ]
}

/** The curve of sRGB (IEC 61966-2-1) and back. */
const linear = (byte: number) => (byte <= 0.04045 * 255 ? byte / 255 / 12.92 : ((byte / 255 + 0.055) / 1.055) ** 2.4)
const encoded = (part: number) => 255 * (part <= 0.0031308 ? 12.92 * part : 1.055 * part ** (1 / 2.4) - 0.055)
