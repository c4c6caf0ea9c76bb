import type { Findings } from '../findings/schema.ts'
import type { IntakeTables } from '../intake/intake-tables.ts'
import { sumCells } from '../reading/cell-sums.ts'
import { movementOf } from '../reading/movement.ts'
import { points, scaled } from '../reading/summarise.ts'
import { twoSidedQuantile } from '../statistics/wilson.ts'

type Spread = Findings['speaking']['spread'][number]

/**
 * How far apart scores lie inside each venue, over the periods, and the share of them at either end of the scale. The change against the base has
 * the interval of two standard deviations of large samples, sd^2 / 2n each (Kendall and Stuart 1977, The Advanced Theory of Statistics, vol. 1,
 * section 10.5, for scores near normal), n the authors: posts of one author are not independent.
 *
 * @param smallestGroup - figures of fewer authors are not told
 */
export function readSpread(tables: IntakeTables, interval: number, smallestGroup: number): Spread[] {
  const { cells, timeline, factors, authors, extremes } = tables
  const venues = factors[0].levels
  const authorsIn = (period: number, v: number) => authors.byPeriodLevel[0][period * venues.length + v]
  return venues.map(({ name, label }, v) => {
    const within = (holds: (t: number) => boolean) => sumCells(tables, (c) => cells.levels[0][c] === v && holds(cells.step[c]))
    const basePeriods = new Set(Array.from(timeline.periodOf).filter((_, t) => timeline.inBase[t] === 1))
    const now = { spread: within((t) => timeline.periodOf[t] === timeline.current).spread, authors: authorsIn(timeline.current, v) }
    const base = { spread: within((t) => timeline.inBase[t] === 1).spread, authors: [...basePeriods].reduce((sum, period) => sum + authorsIn(period, v), 0) }
    const change = changeOf(now, base, interval, smallestGroup)
    return {
      venue: name, label,
      now: now.authors < smallestGroup ? null : scaled(now.spread), base: base.authors < smallestGroup ? null : scaled(base.spread),
      change, movement: change === null ? null : movementOf(change),
      series: timeline.periods.slice(0, timeline.current + 1).map((period, p) => {
        const { mentions, spread } = within((t) => timeline.periodOf[t] === p)
        const ends = extremes.find((row) => row.period === p && row.venue === v)
        const shown = authorsIn(p, v) >= smallestGroup
        return { period: period.name, mentions, spread: shown ? scaled(spread) : null, extremes: shown && ends !== undefined && ends.mentions > 0 ? ends.extremes / ends.mentions : null }
      }),
    }
  })
}

interface Sample {
  readonly spread: number | null
  readonly authors: number
}

function changeOf(now: Sample, base: Sample, interval: number, smallestGroup: number): Spread['change'] {
  if (now.spread === null || base.spread === null || Math.min(now.authors, base.authors) < smallestGroup) return null
  const mean = points * (now.spread - base.spread)
  const sd = points * Math.sqrt(now.spread ** 2 / (2 * now.authors) + base.spread ** 2 / (2 * base.authors))
  const reach = twoSidedQuantile(interval) * sd
  return { mean, low: mean - reach, high: mean + reach, sd }
}
