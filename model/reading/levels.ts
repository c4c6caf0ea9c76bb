import type { Findings } from '../findings/schema.ts'
import { difference } from './draw-columns.ts'
import type { Reading } from './context.ts'
import { scaled } from './summarise.ts'
import { mentionTotals, shareOf, sumsOf } from './venues.ts'

type LevelFinding = Omit<Findings['topics'][number], 'topic'> & { readonly name: string }

/** Every level of a factor that stands still: its offset against the target mix, and how much was said there. */
export function readLevels(reading: Reading, factor: string): LevelFinding[] {
  const { tables, columns, centre, summary } = reading
  const { factors, cells, authors, timeline } = tables
  const f = factors.findIndex(({ name }) => name === factor)
  if (f < 0) return []
  const totals = mentionTotals(reading)
  const { levels } = factors[f]
  return levels.map(({ name, label }, l) => {
    const sums = sumsOf(reading, (c) => cells.levels[f][c] === l)
    return {
      name, label,
      offset: summary.estimate(difference(columns.offset[f][l], centre[f])),
      mentions: sums.period.mentions, mentions_previous: sums.previous?.mentions ?? 0,
      share: shareOf(sums.period.mentions, totals.period),
      share_previous: sums.previous === null ? null : shareOf(sums.previous.mentions, totals.previous),
      share_base: shareOf(sums.base.mentions, totals.base),
      authors: authors.byPeriodLevel[f][timeline.current * levels.length + l],
      raw: scaled(sums.period.raw), raw_previous: scaled(sums.previous?.raw ?? null),
    }
  })
}
