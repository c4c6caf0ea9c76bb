import type { Findings } from '../../../model/findings/schema.ts'
import { sampleFindings } from '../../support/sample-findings.ts'

export interface Stretch {
  readonly venues: number
  readonly topics: number
  readonly steps: number
  readonly grid: 'week' | 'month'
}

const longLabel = 'Comments under the operator\u2019s own articles and press releases'

/**
 * Sample findings pulled to other sizes, with gaps in the raw averages and a label longer than any column: what charts and pages must hold.
 * Figures stay those of the sample, repeated.
 */
export function stretchedFindings({ venues, topics, steps, grid }: Stretch): Findings {
  const findings = sampleFindings()
  const dates = Array.from({ length: steps }, (_, index) => dateOf(index, steps, grid))
  const gap = (index: number, raw: number | null) => (index % 13 === 5 ? null : raw)
  const label = (name: string, index: number) => (index === 1 ? longLabel : `${name} ${index + 1}`)
  const at = <T>(list: readonly T[], index: number): T => list[index % list.length]
  const venueList = Array.from({ length: venues }, (_, index) => at(findings.venues, index)).map((of, index) => ({
    ...of, venue: `venue-${index}`, label: label('Venue', index), share: 1 / venues,
    series: dates.map((step, place) => ({ ...at(of.series, place), step, raw: gap(place, at(of.series, place).raw) })),
  }))
  const perVenue = <T extends { readonly venue: string, readonly label: string }>(list: readonly T[]) => venueList.map(({ venue, label: name }, index) => ({ ...at(list, index), venue, label: name }))
  const topicList = Array.from({ length: topics }, (_, index) => ({ ...at(findings.topics, index), topic: `topic-${index}`, label: label('Topic', index) }))
  return {
    ...findings, grid, venues: venueList, topics: topicList,
    opinion: { ...findings.opinion, series: dates.map((step, place) => ({ ...at(findings.opinion.series, place), step, raw: gap(place, at(findings.opinion.series, place).raw) })) },
    method: { ...findings.method, base: { from: dates[0], to: dates[Math.min(steps - 1, grid === 'week' ? 51 : 11)] } },
    coder: { ...findings.coder, venues: perVenue(findings.coder.venues) }, hearing: findings.hearing && { ...findings.hearing, venues: perVenue(findings.hearing.venues) },
    importance: findings.importance && { ...findings.importance, topics: topicList.map(({ topic, label: name }, index) => ({ ...at(findings.importance!.topics, index), topic, label: name })) },
    speaking: { ...findings.speaking, spread: perVenue(findings.speaking.spread), pull: perVenue(findings.speaking.pull.filter(({ poster }) => poster === null)), mix: [
      ...findings.speaking.mix.filter((row) => row.factor !== 'venue'),
      ...findings.opinion.periods.flatMap(({ period }) => venueList.map((of, index) => ({
        factor: 'venue', level: of.venue, label: of.label, period, mentions: 100, share: shareOf(index, venues),
      }))),
    ] },
  }
}

/** Shares that fall quickly, so that the last levels are thin. */
function shareOf(index: number, count: number): number {
  const weight = (place: number) => 0.6 ** place
  return weight(index) / Array.from({ length: count }, (_, place) => weight(place)).reduce((sum, part) => sum + part, 0)
}

function dateOf(index: number, steps: number, grid: 'week' | 'month'): string {
  const last = Date.UTC(2026, 9, 26)
  if (grid === 'week') return new Date(last - (steps - 1 - index) * 7 * 864e5).toISOString().slice(0, 10)
  return new Date(Date.UTC(2026, 9 - (steps - 1 - index), 1)).toISOString().slice(0, 10)
}
