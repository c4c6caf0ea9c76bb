import type { Findings } from '../findings/schema.ts'
import type { IntakeTables } from '../intake/intake-tables.ts'
import { defectCorrelation, equalSampleSize } from '../statistics/data-defect.ts'

type Volume = NonNullable<Findings['volume']>

const positive = 2
const percent = 100

/**
 * What the volume of posts is worth: the share of authors who are positive on the whole beside the latest wave of the survey's headline share, and what
 * the gap implies (Meng 2018, Annals of Applied Statistics 12:685). The two ask different things of different people, so that it is an order of size.
 *
 * @param customers - how many the brand has; null where the account does not say
 * @returns null without a survey of shares, or with too few known authors
 */
export function readVolume({ staying, timeline }: IntakeTables, survey: Findings['survey'], customers: number | null, smallestGroup: number): Volume | null {
  const wave = survey?.kind === 'share' ? survey.waves.filter(({ value }) => value !== null).at(-1) : undefined
  const now = staying.filter(({ period }) => period === timeline.current)
  const authors = now.reduce((sum, row) => sum + row.authors, 0)
  if (survey === null || wave === undefined || wave.value === null || authors < smallestGroup) return null
  const posts = now.filter(({ stance }) => stance === positive).reduce((sum, row) => sum + row.authors, 0) / authors
  const truth = wave.value / percent
  const sd = Math.sqrt(truth * (1 - truth))
  const gap = posts - truth
  const standardError = wave.effective_base > 0 ? sd / Math.sqrt(wave.effective_base) : 0
  return {
    wave: wave.wave, metric: survey.metric, label: survey.label, posts: percent * posts, survey: wave.value, gap: percent * gap, authors, customers,
    defect_correlation: customers === null ? null : defectCorrelation({ size: authors, population: customers, gap, sd }).value,
    equal_sample: equalSampleSize(gap, standardError, sd).value,
  }
}
