import { luminance } from './contrast.ts'
import { distance, lightOf, type Oklab, oklabOf } from './oklab.ts'
import { bytesOf, colourOf, colourOfBytes, linearOf } from './srgb.ts'

/** A colour must have at least this contrast on this ground. */
export interface Demand {
  readonly ground: string
  readonly least: number
}

/**
 * The colour nearest to one that has every contrast asked for, of the same hue: nearest in OKLab. What is asked for bounds the luminance from above (darker
 * than the grounds) or below (lighter); on the bound the chroma is chosen, and the result put on 8 bits without falling back under it.
 *
 * @returns the colour itself where it passes; null where black and white fail too
 */
export function nearestPassing(colour: string, demands: readonly Demand[]): string | null {
  const grounds = demands.map(({ ground, least }) => ({ lit: luminance(linearOf(ground)) + 0.05, least }))
  const most = Math.min(...grounds.map(({ lit, least }) => lit / least - 0.05))
  const fewest = Math.max(...grounds.map(({ lit, least }) => lit * least - 0.05))
  const passes = (candidate: string): boolean => {
    const lit = luminance(linearOf(candidate))
    return lit <= most || lit >= fewest
  }
  if (passes(colour)) return colour
  const wanted = oklabOf(linearOf(colour))
  const apart = (candidate: string): number => distance(oklabOf(linearOf(candidate)), wanted)
  const bounds = [most, fewest].filter((bound) => bound >= 0 && bound <= 1)
  const candidates = bounds.flatMap((bound) => sameHue(wanted, bound)).flatMap(neighbours).filter((candidate) => passes(candidate) && (isGrey(candidate) || !isGrey(colour)))
  return candidates.reduce<string | null>((nearest, candidate) => (nearest === null || apart(candidate) < apart(nearest) ? candidate : nearest), null)
}

const chromaSteps = 80

/** On a hue and a luminance, the colour that lies nearest, on 8 bits; none where the luminance has no colour. */
function sameHue(wanted: Oklab, bound: number): readonly string[] {
  const toned = Array.from({ length: chromaSteps + 1 }, (_, step) => {
    // a little more chroma may lie nearer, since a saturated blue is darker than a pale one of the same lightness
    const share = (1.2 * step) / chromaSteps
    return ofLuminance(bound, share * wanted[1], share * wanted[2])
  }).filter((lab) => lightOf(lab).every((part) => part > -1e-4 && part < 1 + 1e-4))
  if (toned.length === 0) return []
  return [colourOf(lightOf(toned.reduce((best, lab) => (distance(lab, wanted) < distance(best, wanted) ? lab : best))))]
}

/** The lightness that gives a luminance, by bisection: luminance rises with it. */
function ofLuminance(wanted: number, a: number, b: number): Oklab {
  let [low, high] = [0, 1]
  for (let step = 0; step < 40; step += 1) {
    const middle = (low + high) / 2
    if (luminance(lightOf([middle, a, b])) < wanted) low = middle
    else high = middle
  }
  return [low, a, b]
}

/** A grey has no hue to keep, and gets none. */
function isGrey(colour: string): boolean {
  return new Set(bytesOf(colour)).size === 1
}

/** The colour and those next to it on 8 bits, so that rounding can go to the side that passes. */
function neighbours(colour: string): readonly string[] {
  const steps = [-2, -1, 0, 1, 2]
  const [red, green, blue] = bytesOf(colour)
  return steps.flatMap((r) => steps.flatMap((g) => steps.map((b) => [red + r, green + g, blue + b])))
    .filter((bytes) => bytes.every((byte) => byte >= 0 && byte <= 255)).map(colourOfBytes)
}
