import { faultOf } from '../faults/catalogue.ts'
import type { Fault } from '../faults/fault.ts'
import { contrast, leastContrast } from './colour/contrast.ts'
import { leastDifference } from './colour/dichromacy.ts'
import { nearestPassing } from './colour/nearest-passing.ts'
import { oklabOf } from './colour/oklab.ts'
import { linearOf } from './colour/srgb.ts'
import { type GivenColours, givenMarks, type GivenRole, givenRoles, grounds, type Palette, type Role, shades } from './palette.ts'

const texts = ['ink', 'quiet', 'accent'] as const satisfies readonly Role[]
/** On paper. Bands, spans, hairlines and leaders carry nothing that a line or label does not. */
const marks = [...givenMarks, 'bar', 'raw_line', 'share_dark', 'share_middle'] as const satisfies readonly Role[]

/** Colours that stand in one chart and mean different things. */
const apart = [
  ['accent', 'raw'], ['accent', 'raw_line'], ['accent', 'bar'], ['accent', 'ink'], ['accent', 'loss'], ['accent', 'share_dark'], ['accent', 'share_middle'],
  ['raw', 'ink'], ['bar', 'ink'], ['bar', 'loss'],
] as const satisfies readonly (readonly [Role, Role])[]

/**
 * Least difference of such a pair, in OKLab, to every kind of eye: five times what is just noticed when two large fields touch (0.02), since lines and dots are
 * small and lie apart. It counts lightness too: a pair of one hue passes where one is clearly darker. The house's least is 0.118.
 */
const leastApart = 0.1

/** Paper is printed on: lightness in OKLab that it has at least. White has 1. */
const lightestOf = 0.93

/** Where each given colour stands in the file. */
type PlaceOf = (role: GivenRole) => string

/**
 * What is wrong with a palette: text and marks that fall short of WCAG 2.2 AA, and colours in one chart that not everyone can tell apart.
 *
 * @param given - only what an account has given, or moved by it, can be at fault
 */
export function paletteFaults(palette: Palette, given: GivenColours, placeOf: PlaceOf): readonly Fault[] {
  if (Object.keys(given).length === 0) return []
  const [lightness] = oklabOf(linearOf(palette.paper))
  if (lightness < lightestOf) return [faultOf('theme-paper-dark', placeOf('paper'), { colour: palette.paper, lightness, least: lightestOf })]
  // a ground that makes the house's own text faint is the one to be mended
  const blamed = (role: Role, ground: Role): string => placeOf(givenOf(keyOf(role), keyOf(ground), given))
  const faint = [...texts.map((role) => faintness(palette, role, grounds, 'text', blamed)), ...marks.map((role) => faintness(palette, role, ['paper'], 'mark', blamed))].flat()
  return faint.length > 0 ? faint : apart.flatMap(([one, other]) => likeness(palette, one, other, given, placeOf))
}

function faintness(palette: Palette, role: Role, on: readonly Role[], kind: 'text' | 'mark', blamed: (role: Role, ground: Role) => string): readonly Fault[] {
  const least = leastContrast[kind]
  const [worst] = on.map((ground) => ({ ground, ratio: contrast(palette[role], palette[ground]) })).sort((a, b) => a.ratio - b.ratio)
  if (worst.ratio >= least) return []
  const nearest = nearestPassing(palette[role], on.map((ground) => ({ ground: palette[ground], least })))
  return [faultOf('theme-contrast', blamed(role, worst.ground), { role, colour: palette[role], ground: worst.ground, on: palette[worst.ground], ratio: worst.ratio, least, kind, nearest })]
}

/** The key that an account can give to move a colour: companions of the raw average are made from `raw`, grounds and hairlines from `paper`. */
function keyOf(role: Role): GivenRole {
  if (isOneOf(givenRoles, role)) return role
  return isOneOf(shades, role) ? 'raw' : 'paper'
}

/** Of two keys that which the account has given; the first where it gives both or neither. */
function givenOf(one: GivenRole, other: GivenRole, given: GivenColours): GivenRole {
  return Object.hasOwn(given, one) || !Object.hasOwn(given, other) ? one : other
}

function isOneOf<R extends Role>(some: readonly R[], role: Role): role is R {
  return (some as readonly Role[]).includes(role)
}

function likeness(palette: Palette, one: Role, other: Role, given: GivenColours, placeOf: PlaceOf): readonly Fault[] {
  const { difference, vision } = leastDifference(palette[one], palette[other])
  if (difference >= leastApart) return []
  return [faultOf('theme-alike', placeOf(givenOf(keyOf(one), keyOf(other), given)), { one, other, colours: [palette[one], palette[other]], difference, least: leastApart, vision })]
}
