import type { Unruled } from '../caveats/rule.ts'
import type { IntakeTables } from '../intake/intake-tables.ts'

/**
 * Findings without any figure of what people said that rests on fewer authors than may be shown: raw averages and spreads of few are null, levels of a factor
 * that never had as many authors in a period are left out. How many mentions and authors there were is told; what so few said is not.
 *
 * @param tables - whose counts of authors decide
 * @param smallestGroup - fewest authors of a group that is shown
 */
export function maskSmallGroups(findings: Unruled, tables: IntakeTables, smallestGroup: number): Unruled {
  const { authors, factors, timeline } = tables
  const few = (count: number) => count < smallestGroup
  const stepOf = new Map(timeline.steps.map((step, t) => [step, t]))
  const previousAuthors = timeline.current < 1 ? 0 : authors.byPeriod[timeline.current - 1]
  const hidden = factors.map((_, f) => hiddenLevels(tables, f, smallestGroup))
  const shows = (factor: string, level: string) => !(hidden[factors.findIndex(({ name }) => name === factor)]?.has(level) ?? false)
  const levelsOf = <T extends Level>(factor: string, levels: readonly T[], nameOf: (level: T) => string): T[] => {
    const f = factors.findIndex(({ name }) => name === factor)
    return levels.filter((level) => shows(factor, nameOf(level))).map((level) => maskLevel(level, previousOf(tables, f, nameOf(level)), smallestGroup))
  }
  const { opinion, speaking, decomposition, hearing, coder } = findings
  const venues = levelsOf('venue', findings.venues, ({ venue }) => venue).map((venue) => ({
    ...venue,
    spread: few(venue.authors) ? null : venue.spread,
    spread_change: few(venue.authors) || few(previousOf(tables, 0, venue.venue)) ? null : venue.spread_change,
    series: venue.series.map((at) => (few(venueAuthors(tables, stepOf.get(at.step) ?? -1, venue.venue)) ? { ...at, raw: null } : at)),
  }))
  return {
    ...findings,
    opinion: {
      ...opinion,
      series: opinion.series.map((at) => (few(at.authors) ? { ...at, raw: null } : at)),
      periods: opinion.periods.map((at) => (few(at.authors) ? { ...at, raw: null } : at)),
      raw: few(opinion.authors) ? null : opinion.raw,
      raw_previous: few(previousAuthors) ? null : opinion.raw_previous,
      raw_change: few(opinion.authors) || few(previousAuthors) ? null : opinion.raw_change,
    },
    decomposition: decomposition === null || few(opinion.authors) || few(previousAuthors) ? null : {
      ...decomposition,
      parts: decomposition.parts.map((part) => (part.leading !== null && !shows(part.part.replace(/_mix$/, ''), part.leading.level) ? { ...part, leading: null } : part)),
    },
    venues,
    topics: levelsOf('topic', findings.topics, ({ topic }) => topic),
    posters: levelsOf('poster', findings.posters, ({ poster }) => poster),
    factors: findings.factors.map(({ factor, levels }) => ({ factor, levels: levelsOf(factor, levels, ({ level }) => level) })),
    scales: { ...findings.scales, venue_drift: Object.fromEntries(Object.entries(findings.scales.venue_drift).filter(([venue]) => shows('venue', venue))) },
    speaking: {
      ...speaking,
      concentration: { period: concentrationOf(speaking.concentration.period, smallestGroup), previous: concentrationOf(speaking.concentration.previous, smallestGroup) },
      venues: speaking.venues.filter(({ venue }) => shows('venue', venue)).map(({ venue, concentration }) => ({ venue, concentration: concentrationOf(concentration, smallestGroup) })),
      mix: speaking.mix.filter(({ factor, level }) => shows(factor, level)),
      spread: speaking.spread.filter(({ venue }) => shows('venue', venue)),
    },
    coder: { ...coder, venues: coder.venues.filter(({ venue }) => shows('venue', venue)) },
    hearing: hearing === null ? null : { ...hearing, venues: hearing.venues.filter(({ venue }) => shows('venue', venue)) },
    survey: findings.survey === null ? null : { ...findings.survey, candidates: findings.survey.candidates.filter(({ venue }) => venue === null || shows('venue', venue)) },
  }
}

interface Level {
  readonly authors: number
  readonly raw: number | null
  readonly raw_previous: number | null
}

function maskLevel<T extends Level>(level: T, previousAuthors: number, smallestGroup: number): T {
  return { ...level, raw: level.authors < smallestGroup ? null : level.raw, raw_previous: previousAuthors < smallestGroup ? null : level.raw_previous }
}

/** Levels that had fewer authors in every period: what is said of them could rest on as few. */
function hiddenLevels({ authors, factors, timeline }: IntakeTables, f: number, smallestGroup: number): ReadonlySet<string> {
  const { levels } = factors[f]
  return new Set(levels.filter((_, l) => timeline.periods.every((__, p) => authors.byPeriodLevel[f][p * levels.length + l] < smallestGroup)).map(({ name }) => name))
}

function previousOf({ authors, factors, timeline }: IntakeTables, f: number, name: string): number {
  const { levels } = factors[f]
  const l = levels.findIndex((level) => level.name === name)
  return timeline.current < 1 || l < 0 ? 0 : authors.byPeriodLevel[f][(timeline.current - 1) * levels.length + l]
}

function venueAuthors({ authors, factors }: IntakeTables, step: number, venue: string): number {
  const { levels } = factors[0]
  return step < 0 ? 0 : authors.byStepVenue[step * levels.length + levels.findIndex(({ name }) => name === venue)]
}

function concentrationOf<T extends { readonly authors: number } | null>(concentration: T, smallestGroup: number): T | null {
  return concentration === null || concentration.authors < smallestGroup ? null : concentration
}
