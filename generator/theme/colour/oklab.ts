import type { Linear } from './srgb.ts'

/** Lightness in [0, 1], and two axes of colour, 0 for greys: equal distances look about equally large. */
export type Oklab = readonly [number, number, number]

/**
 * Linear light in OKLab, and back.
 *
 * @see Ottosson (2020), A perceptual color space for image processing, https://bottosson.github.io/posts/oklab/ (matrices for linear sRGB); also CSS Color 4, section 9
 */
export function oklabOf([red, green, blue]: Linear): Oklab {
  const long = Math.cbrt(0.4122214708 * red + 0.5363325363 * green + 0.0514459929 * blue)
  const middle = Math.cbrt(0.2119034982 * red + 0.6806995451 * green + 0.1073969566 * blue)
  const short = Math.cbrt(0.0883024619 * red + 0.2817188376 * green + 0.6299787005 * blue)
  return [
    0.2104542553 * long + 0.793617785 * middle - 0.0040720468 * short,
    1.9779984951 * long - 2.428592205 * middle + 0.4505937099 * short,
    0.0259040371 * long + 0.7827717662 * middle - 0.808675766 * short,
  ]
}

/** @returns parts outside [0, 1] where the screen has no such colour */
export function lightOf([lightness, a, b]: Oklab): Linear {
  const long = (lightness + 0.3963377774 * a + 0.2158037573 * b) ** 3
  const middle = (lightness - 0.1055613458 * a - 0.0638541728 * b) ** 3
  const short = (lightness - 0.0894841775 * a - 1.291485548 * b) ** 3
  return [
    4.0767416621 * long - 3.3077115913 * middle + 0.2309699292 * short,
    -1.2684380046 * long + 2.6097574011 * middle - 0.3413193965 * short,
    -0.0041960863 * long - 0.7034186147 * middle + 1.707614701 * short,
  ]
}

/** Euclidean distance; about 0.02 is just noticed. */
export function distance(one: Oklab, other: Oklab): number {
  return Math.hypot(one[0] - other[0], one[1] - other[1], one[2] - other[2])
}
