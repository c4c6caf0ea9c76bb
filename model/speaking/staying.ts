import type { Findings } from '../findings/schema.ts'
import type { IntakeTables, StayingRow } from '../intake/intake-tables.ts'
import { movementOf } from '../reading/movement.ts'
import { differenceOfDifferences, type DifferenceInterval } from '../statistics/difference-of-differences.ts'
import { twoShares } from '../statistics/two-sample-tests.ts'
import { wilsonInterval } from '../statistics/wilson.ts'

type Staying = NonNullable<Findings['speaking']['staying']>

const stances = ['negative', 'middle', 'positive'] as const
const middle = 1
/** Transitions taken together for what is said of now: one alone is of few authors. */
const lastTransitions = 3
const percent = 100

/**
 * Of the authors of one period, by stance, the share that posted in the next one too; and whether the middling stay less than the others, now
 * and against the base.
 *
 * @param smallestGroup - shares of fewer authors are not told
 * @returns null where no author is known, or there is one period only
 */
export function readStaying({ staying, timeline }: IntakeTables, interval: number, smallestGroup: number): Staying | null {
  const transitions = staying.filter(({ period }) => period < timeline.current)
  if (transitions.length === 0) return null
  const inBase = (period: number) => timeline.periodOf.some((of, t) => of === period && timeline.inBase[t] === 1)
  const now = gapOf(transitions.filter(({ period }) => period >= timeline.current - lastTransitions), interval, smallestGroup)
  const base = gapOf(transitions.filter(({ period }) => inBase(period) && period < timeline.current - lastTransitions), interval, smallestGroup)
  return {
    periods: transitions.map((row) => transitionOf(row, timeline.periods.map(({ name }) => name), interval, smallestGroup)),
    middle_gap: now === null ? null : told(now),
    middle_gap_change: now === null || base === null ? null : told(differenceOfDifferences(now, base)),
  }
}

function transitionOf({ period, stance, authors, stayed }: StayingRow, names: readonly string[], interval: number, smallestGroup: number): Staying['periods'][number] {
  const shown = authors >= smallestGroup
  const bounds = shown ? wilsonInterval(stayed, authors, interval) : null
  return {
    from: names[period], to: names[period + 1], stance: stances[stance], authors: shown ? authors : 0, stayed: shown ? stayed : null,
    share: shown ? stayed / authors : null, low: bounds?.low ?? null, high: bounds?.high ?? null,
  }
}

/** Share of the middling that stayed less that of all others; null where either are too few. */
function gapOf(rows: readonly StayingRow[], interval: number, smallestGroup: number): DifferenceInterval | null {
  const sum = (of: (row: StayingRow) => number, inMiddle: boolean) => rows.filter(({ stance }) => (stance === middle) === inMiddle).reduce((total, row) => total + of(row), 0)
  const [authors, others] = [sum((row) => row.authors, true), sum((row) => row.authors, false)]
  if (Math.min(authors, others) < smallestGroup) return null
  return twoShares({ share: sum((row) => row.stayed, true) / authors, base: authors }, { share: sum((row) => row.stayed, false) / others, base: others }, interval)
}

/** In percentage points. */
function told({ difference, low, high }: DifferenceInterval): NonNullable<Staying['middle_gap']> {
  const [mean, least, most] = [difference, low, high].map((share) => percent * share)
  return { difference: mean, low: least, high: most, movement: movementOf({ mean, low: least, high: most, sd: 0 }) }
}
