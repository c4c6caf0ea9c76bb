import type { PageFigures } from './page-figures.ts'
import type { ListedReview } from './read-reviews.ts'

/** All reviews of one period, the one that stands first, then those that it replaced, back to the first. */
export type ListedPeriod = readonly [ListedReview, ...ListedReview[]]

/** Periods, newest first. */
export function periodsOf(reviews: readonly ListedReview[]): readonly ListedPeriod[] {
  const byPeriod = new Map<string, ListedPeriod>()
  for (const review of reviews.toSorted((a, b) => a.manifest.sequence - b.manifest.sequence)) {
    const { period } = review.manifest
    byPeriod.set(period, [review, ...byPeriod.get(period) ?? []])
  }
  return [...byPeriod.values()].sort((a, b) => (startOf(a) < startOf(b) ? 1 : -1))
}

/** First day; a period of which no figures can be read stands by its name, which sorts alike. */
function startOf(period: ListedPeriod): string {
  return `${period.map(figuresOf).find((figures) => figures !== null)?.period.start ?? ''}${period[0].manifest.period}`
}

export function figuresOf({ figures }: ListedReview): PageFigures | null {
  return typeof figures === 'string' ? null : figures
}

/** By what program two neighbouring reviews were made otherwise: another version, or the same with other code of the model; null: by the same. */
export function breakBetween(above: ListedReview, below: ListedReview): 'version' | 'model' | null {
  const [later, earlier] = [above.manifest.program, below.manifest.program]
  if (later.version !== earlier.version) return 'version'
  return later.model === earlier.model ? null : 'model'
}
