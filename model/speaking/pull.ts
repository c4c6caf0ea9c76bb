import type { Findings } from '../findings/schema.ts'
import type { IntakeTables } from '../intake/intake-tables.ts'
import { movementOf } from '../reading/movement.ts'
import { twoSidedQuantile } from '../statistics/wilson.ts'

type Pull = Findings['speaking']['pull'][number]

/** How far replies lean towards the thread before them, or away from it: every venue, then its poster classes. */
export function readPull({ pull, factors }: IntakeTables, interval: number, smallestGroup: number): Pull[] {
  const poster = factors.find(({ name }) => name === 'poster')?.levels ?? []
  return pull.filter(({ authors }) => authors >= smallestGroup).map(({ venue, poster: class_, replies, authors, slope, standardError }) => {
    const reach = twoSidedQuantile(interval) * standardError
    const estimate = { mean: slope, low: slope - reach, high: slope + reach, sd: standardError }
    const level = class_ < 0 ? null : poster[class_]
    return {
      venue: factors[0].levels[venue].name, label: factors[0].levels[venue].label, poster: level?.name ?? null, poster_label: level?.label ?? null,
      replies, authors, slope: estimate, movement: movementOf(estimate),
    }
  })
}
