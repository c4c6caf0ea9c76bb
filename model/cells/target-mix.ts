import type { IntakeTables } from '../intake/intake-tables.ts'

/** Shares of the levels of each factor, in the order of the tables' factors; each sums to 1. */
export interface TargetMix {
  readonly shares: readonly Float64Array[]
  readonly source: readonly ('base' | 'account')[]
}

/** Margins given by the account: factor name -> level name -> share. */
export type GivenMargins = Readonly<Record<string, Readonly<Record<string, number>>>>

/**
 * The mix at which opinion is reported: an account's margins where it gives them, else each factor's shares of mentions
 * pooled over the base. A level unseen there has share 0. Should the base hold no mention, all mentions serve.
 */
export function targetMix(tables: IntakeTables, given: GivenMargins = {}): TargetMix {
  const { cells, timeline } = tables
  const baseHasMentions = cells.step.some((t) => timeline.inBase[t] === 1)
  const shares = tables.factors.map(({ name, levels }, f) => {
    const margins = given[name]
    const sums = new Float64Array(levels.length)
    if (margins !== undefined) levels.forEach((level, i) => { sums[i] = margins[level.name] ?? 0 })
    else {
      for (let c = 0; c < cells.count; c++) {
        if (!baseHasMentions || timeline.inBase[cells.step[c]] === 1) sums[cells.levels[f][c]] += cells.mentions[c]
      }
    }
    const total = sums.reduce((a, b) => a + b, 0)
    return sums.map((x) => x / total)
  })
  return { shares, source: tables.factors.map(({ name }) => (given[name] === undefined ? 'base' : 'account')) }
}
