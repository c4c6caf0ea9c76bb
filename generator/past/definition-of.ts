import type { Definition, NamedLevel } from '../../model/past/definition.ts'
import type { Account, LevelEntry, Source } from '../account/account.ts'

/** What figures of an account mean, but for the base, which may follow from its mentions. */
export function definitionOf(account: Account, version: string): Omit<Definition, 'base'> {
  return {
    brand: account.brand, grid: account.grid, reporting: account.reporting, factors: account.factors, posters: account.posters,
    levels: { venue: account.venues.map(namedLevel), topic: account.topics.map(namedLevel) },
    anchors: account.venues.flatMap(({ name, anchor }) => (anchor ? [name] : [])).sort(),
    targetMix: Object.fromEntries(account.targetMix.map(({ factor, shares }) => [factor, Object.fromEntries(shares.map(({ level, share }) => [level, share]))])),
    sources: account.mentions.map(readingOf).sort(),
    major: Number.parseInt(version, 10),
  }
}

function namedLevel({ name, values }: LevelEntry): NamedLevel {
  return { name, values }
}

/** Columns and scores: files that moved, or were cut into others, are read alike. */
function readingOf(source: Source): string {
  if (source.kind === 'cells') return 'cells'
  const { columns, score, timeFormat } = source
  return JSON.stringify([Object.entries(columns).map(([ours, theirs]) => [ours, theirs]).sort(), score, timeFormat])
}
