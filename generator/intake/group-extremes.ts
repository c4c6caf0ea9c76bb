import type { Database } from './database.ts'

/** Mentions, and those at either end of the scale, by number of period and venue. */
export interface GroupedExtremes {
  readonly period: number
  readonly venue: number
  readonly mentions: number
  readonly extremes: number
}

export async function groupExtremes(database: Database): Promise<readonly GroupedExtremes[]> {
  const rows = await database.rows<Record<keyof GroupedExtremes, number | bigint>>(
    'SELECT period, factor_0 AS venue, sum(mentions)::BIGINT AS mentions, sum(extremes)::BIGINT AS extremes FROM cell_sum GROUP BY ALL ORDER BY ALL')
  return rows.map(({ period, venue, mentions, extremes }) => ({ period: Number(period), venue: Number(venue), mentions: Number(mentions), extremes: Number(extremes) }))
}
