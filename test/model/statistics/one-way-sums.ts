import type { AuthorVariation } from '../../../model/intake/intake-tables.ts'

/** The sums of a one-way analysis of variance, straight from its definition. */
export function oneWaySums(groups: readonly (readonly number[])[]): AuthorVariation {
  const all = groups.flat()
  const average = (x: readonly number[]) => x.reduce((sum, value) => sum + value, 0) / x.length
  const sum = (x: readonly number[]) => x.reduce((total, value) => total + value, 0)
  const grand = average(all)
  return {
    authors: groups.length,
    mentions: all.length,
    squaredSizes: sum(groups.map((group) => group.length ** 2)),
    betweenSquares: sum(groups.map((group) => group.length * (average(group) - grand) ** 2)),
    withinSquares: sum(groups.flatMap((group) => group.map((value) => (value - average(group)) ** 2))),
  }
}
