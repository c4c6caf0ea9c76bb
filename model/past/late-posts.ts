import type { IntakeTables } from '../intake/intake-tables.ts'

/** Mentions of a past period that were not there when it was sealed, and those that are gone since. */
export interface LatePosts {
  readonly late: number
  readonly gone: number
}

/**
 * Mentions then and now, compared by step and venue, over the steps of a period that were over and whole when it was sealed: a last step that the period's end
 * cut short is completed by the days after, which is no lateness. One that left while another came in the same step and venue is not seen.
 *
 * @param sameVenues - whether the venues of both are the same things; if not, steps are compared as a whole
 */
export function latePosts(then: IntakeTables, now: IntakeTables, period: string, sameVenues: boolean): LatePosts {
  const p = then.timeline.periods.findIndex(({ name }) => name === period)
  const [before, after] = [countsOf(then, sameVenues), countsOf(now, sameVenues)]
  const whole = then.timeline.steps.flatMap((step, t) => {
    const place = now.timeline.steps.indexOf(step)
    return then.timeline.periodOf[t] === p && place >= 0 && then.timeline.lastDays[t] === now.timeline.lastDays[place] ? [step] : []
  })
  const venues = new Set([...before.values(), ...after.values()].flatMap((counts) => [...counts.keys()]))
  const changes = whole.flatMap((step) => [...venues].map((venue) => (after.get(step)?.get(venue) ?? 0) - (before.get(step)?.get(venue) ?? 0)))
  const sum = (values: readonly number[]) => values.reduce((total, value) => total + value, 0)
  return { late: sum(changes.map((change) => Math.max(0, change))), gone: sum(changes.map((change) => Math.max(0, -change))) }
}

/** Mentions by step, and by venue within. */
function countsOf({ cells, timeline, factors }: IntakeTables, byVenue: boolean): ReadonlyMap<string, ReadonlyMap<string, number>> {
  const counts = new Map(timeline.steps.map((step) => [step, new Map<string, number>()]))
  for (let c = 0; c < cells.count; c++) {
    const ofStep = counts.get(timeline.steps[cells.step[c]])!
    const venue = byVenue ? factors[0].levels[cells.levels[0][c]].name : ''
    ofStep.set(venue, (ofStep.get(venue) ?? 0) + cells.mentions[c])
  }
  return counts
}
