import type { GivenMargins } from '../cells/target-mix.ts'

/**
 * What the figures of a review mean: whoever changes it makes figures that cannot simply be set beside the earlier ones. Labels, costs, looks and words are
 * no part of it.
 */
export interface Definition {
  readonly brand: string
  readonly grid: string
  readonly reporting: string
  readonly base: { readonly from: string; readonly to: string }
  readonly factors: readonly string[]
  /** Which spellings are which level, of the factors whose levels the account names. */
  readonly levels: Readonly<Record<'venue' | 'topic', readonly NamedLevel[]>>
  /** Venues that stand still, sorted. */
  readonly anchors: readonly string[]
  readonly posters: { readonly occasional: number; readonly regular: number }
  readonly targetMix: GivenMargins
  /** How each source is read, as text: columns and scores. */
  readonly sources: readonly string[]
  /** First number of the program's version. */
  readonly major: number
}

/** A level as the account names it, and the spellings in the data that mean it; its own name where it lists none. */
export interface NamedLevel {
  readonly name: string
  readonly values: readonly string[]
}

export const definitionParts = ['brand', 'grid', 'reporting', 'base', 'factors', 'venues', 'topics', 'posters', 'target_mix', 'sources', 'program'] as const
export type DefinitionPart = (typeof definitionParts)[number]

const contentOf: Readonly<Record<DefinitionPart, (of: Definition) => unknown>> = {
  brand: ({ brand }) => brand.toLowerCase(),
  grid: ({ grid }) => grid,
  reporting: ({ reporting }) => reporting,
  base: ({ base }) => [base.from, base.to],
  factors: ({ factors }) => [...factors].sort(),
  venues: ({ levels, anchors }) => [sorted(levels.venue), anchors],
  topics: ({ levels }) => sorted(levels.topic),
  posters: ({ posters }) => [posters.occasional, posters.regular],
  target_mix: ({ targetMix }) => Object.entries(targetMix).map(([factor, shares]) => [factor, ...Object.entries(shares).map(String).sort()]).sort(),
  sources: ({ sources }) => sources,
  program: ({ major }) => major,
}

/** A level without spellings is the same as one whose only spelling is its name: nothing that is named is read otherwise for it. */
function sorted(levels: readonly NamedLevel[]): unknown {
  return levels.map(({ name, values }) => [name, ...[...values].sort()]).filter(([name, ...values]) => values.some((value) => value !== name)).sort()
}

/** In what two definitions differ, in the order of `definitionParts`. */
export function definitionChanges(from: Definition, to: Definition): readonly DefinitionPart[] {
  return definitionParts.filter((part) => JSON.stringify(contentOf[part](from)) !== JSON.stringify(contentOf[part](to)))
}
