import type { Findings } from '../findings/schema.ts'
import type { IntakeTables } from '../intake/intake-tables.ts'
import { readPull } from '../speaking/pull.ts'
import { readSpread } from '../speaking/spread.ts'
import { readStaying } from '../speaking/staying.ts'
import { concentrationOf } from '../statistics/concentration.ts'
import { sumCells } from './cell-sums.ts'
import { shareOf } from './venues.ts'

type Speaking = Findings['speaking']
type Concentration = NonNullable<Speaking['concentration']['period']>

/** Who is speaking: how concentrated mentions are in few authors, and the mix of every factor over the periods. */
export function readSpeaking(tables: IntakeTables, interval: number, smallestGroup: number): Speaking {
  const { timeline, factors } = tables
  const all = -1
  return {
    concentration: {
      period: readConcentration(tables, timeline.current, all),
      previous: timeline.current < 1 ? null : readConcentration(tables, timeline.current - 1, all),
    },
    venues: factors[0].levels.map(({ name }, v) => ({ venue: name, concentration: readConcentration(tables, timeline.current, v) })),
    mix: factors.flatMap((_, f) => readMix(tables, f)),
    staying: readStaying(tables, interval, smallestGroup), spread: readSpread(tables, interval, smallestGroup), pull: readPull(tables, interval, smallestGroup),
  }
}

/** null where no author is known. */
function readConcentration(tables: IntakeTables, period: number, venue: number): Concentration | null {
  const found = concentrationOf(tables.concentration.filter((row) => row.period === period && row.venue === venue))
  if (found === null) return null
  return { authors: found.authors, mentions: found.mentions, top_share: found.topShare, gini: found.gini, effective_authors: found.effectiveAuthors }
}

function readMix(tables: IntakeTables, f: number): Speaking['mix'] {
  const { timeline, factors, cells } = tables
  return timeline.periods.slice(0, timeline.current + 1).flatMap((period, p) => {
    const inPeriod = (c: number) => timeline.periodOf[cells.step[c]] === p
    const total = sumCells(tables, inPeriod).mentions
    if (total === 0) return []
    return factors[f].levels.map(({ name, label }, l) => {
      const { mentions } = sumCells(tables, (c) => inPeriod(c) && cells.levels[f][c] === l)
      return { factor: factors[f].name, level: name, label, period: period.name, mentions, share: shareOf(mentions, total) }
    })
  })
}
