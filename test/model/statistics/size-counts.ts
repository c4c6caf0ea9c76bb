import type { SizeCount } from '../../../model/statistics/concentration.ts'

/** Counts of counts of a list of sizes, in the order of first appearance. */
export function sizeCounts(sizes: readonly number[]): SizeCount[] {
  const authors = new Map<number, number>()
  for (const size of sizes) authors.set(size, (authors.get(size) ?? 0) + 1)
  return [...authors].map(([mentionsPerAuthor, count]) => ({ mentionsPerAuthor, authors: count }))
}
