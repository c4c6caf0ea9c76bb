import { distance, lightOf, oklabOf } from './colour/oklab.ts'
import type { Demand } from './colour/nearest-passing.ts'
import { nearestPassing } from './colour/nearest-passing.ts'
import { leastContrast } from './colour/contrast.ts'
import { colourOf, linearOf } from './colour/srgb.ts'

/** Colours that an account may give, by what they are for. */
export const givenRoles = ['paper', 'ink', 'quiet', 'accent', 'raw', 'highlight', 'loss', 'caution', 'serious'] as const
export type GivenRole = typeof givenRoles[number]

/** Grounds and hairlines between paper and ink: they keep their place on the way from one to the other. */
const tints = ['rule', 'wash', 'base_span', 'leader'] as const
/** Companions of the raw average's grey: they keep their distance to it. */
export const shades = ['bar', 'raw_line', 'share_dark', 'share_middle'] as const

export const roles = [...givenRoles, ...tints, ...shades] as const
export type Role = typeof roles[number]

/** Every colour of a review, `#rrggbb`. */
export type Palette = Readonly<Record<Role, string>>
export type GivenColours = Readonly<Partial<Record<GivenRole, string>>>

/** What carries meaning on paper without being text: lines, bars, the edges of cautions. */
export const givenMarks = ['raw', 'loss', 'caution', 'serious'] as const satisfies readonly GivenRole[]

/** Grounds that text stands on. */
export const grounds = ['paper', 'wash', 'base_span', 'highlight'] as const satisfies readonly Role[]

/**
 * The house's palette with an account's colours in it: what was not given follows what was, so that a colour in one place is the same everywhere. Marks that
 * nobody chose and that fall short on an account's paper take the nearest colour that does not.
 * Where nothing is given, it is the house's, to the bit.
 */
export function paletteOf(house: Palette, given: GivenColours): Palette {
  const demand: Demand = { ground: given.paper ?? house.paper, least: leastContrast.mark }
  const eased = givenMarks.filter((role) => given[role] === undefined).map((role) => [role, nearestPassing(house[role], [demand]) ?? house[role]] as const)
  const own: Palette = { ...house, ...Object.fromEntries(eased), ...given }
  const moved = (role: Role): boolean => own[role] !== house[role]
  const tinted = moved('paper') || moved('ink') ? tints.map((role) => [role, between(own, house, role)] as const) : []
  const shaded = moved('paper') || moved('raw') ? shades.map((role) => [role, beside(own, house, role, demand)] as const) : []
  return { ...own, ...Object.fromEntries([...tinted, ...shaded]) }
}

function between(own: Palette, house: Palette, role: Role): string {
  const [paper, ink, tint] = [house.paper, house.ink, house[role]].map((colour) => oklabOf(linearOf(colour)))
  const share = distance(paper, tint) / distance(paper, ink)
  const [from, to] = [own.paper, own.ink].map((colour) => oklabOf(linearOf(colour)))
  return colourOf(lightOf([0, 1, 2].map((axis) => from[axis] + share * (to[axis] - from[axis])) as [number, number, number]))
}

function beside(own: Palette, house: Palette, role: Role, demand: Demand): string {
  const [raw, shade, anew] = [house.raw, house[role], own.raw].map((colour) => oklabOf(linearOf(colour)))
  const colour = colourOf(lightOf([0, 1, 2].map((axis) => anew[axis] + shade[axis] - raw[axis]) as [number, number, number]))
  return nearestPassing(colour, [demand]) ?? colour
}
