import type { Findings } from '../findings/schema.ts'
import { points } from '../reading/summarise.ts'
import { defectCorrelation, equalSampleSize } from '../statistics/data-defect.ts'

type Volume = NonNullable<Findings['volume']>
const percent = 100

/**
 * What the volume of posts is worth: the share of content voices that the raw average amounts to, (1 + raw) / 2, which counts a neutral one half, beside the
 * latest wave of the survey's headline share, and what the gap implies (Meng 2018, Annals of Applied Statistics 12:685). The two ask
 * different things of different people, so that it is an order of size.
 *
 * @param customers - how many the brand has; null where the account does not say
 * @returns null without a survey of shares, or with too few authors
 */
export function readVolume({ raw, authors }: Findings['opinion'], survey: Findings['survey'], customers: number | null, smallestGroup: number): Volume | null {
  const wave = survey?.kind === 'share' ? survey.waves.filter(({ value }) => value !== null).at(-1) : undefined
  if (survey === null || wave === undefined || wave.value === null || raw === null || authors < smallestGroup) return null
  const posts = (1 + raw / points) / 2
  const truth = wave.value / percent
  const sd = Math.sqrt(truth * (1 - truth))
  const gap = posts - truth
  return {
    wave: wave.wave, metric: survey.metric, label: survey.label, posts: percent * posts, survey: wave.value, gap: percent * gap, authors, customers,
    defect_correlation: customers === null ? null : defectCorrelation({ size: authors, population: customers, gap, sd }).value,
    equal_sample: equalSampleSize(gap, wave.effective_base > 0 ? sd / Math.sqrt(wave.effective_base) : 0, sd).value,
  }
}
