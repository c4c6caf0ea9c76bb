import type { Findings } from '../../model/findings/schema.ts'
import { accountingTable, checksTable, inputsTable, scalesTable, targetMixTable } from './method-tables.ts'
import { decompositionTable, opinionTable, periodsTable, spansTable } from './opinion-tables.ts'
import { concentrationTable, mixTable, offsetsTable } from './speaking-tables.ts'
import { departuresTable, eventsTable, lagWeightsTable, nextWaveTable, outcomeLagsTable, surveyForecastsTable, surveyRivalsTable } from './survey-forecast-tables.ts'
import { agreementTable, surveyCandidatesTable, surveyLagsTable, surveyWavesTable, trackerTable } from './survey-tables.ts'
import { adviceTable, hearingTable } from './advice-tables.ts'
import { competitorSeriesTable, competitorsTable, competitorVenuesTable, mentionSharesTable } from './competitor-tables.ts'
import { benchmarkMarginsTable, benchmarkTable, coderTable, importanceTable, tippingTable } from './customer-tables.ts'
import { inOrder, levelOrder } from './level-order.ts'
import { breaksTable, followUpTable, revisionsTable } from './past-tables.ts'
import { pullTable, spreadSeriesTable, spreadTable, stayingTable } from './staying-tables.ts'
import type { Table } from './table.ts'
import { venueSeriesTable, venuesBeforeTable, venuesTable } from './venue-tables.ts'

const makers = [
  opinionTable, periodsTable, spansTable, decompositionTable, venuesTable, venueSeriesTable, venuesBeforeTable, mixTable, offsetsTable, concentrationTable,
  accountingTable, scalesTable, targetMixTable, checksTable, inputsTable,
  trackerTable, surveyWavesTable, agreementTable, surveyLagsTable, surveyCandidatesTable, surveyForecastsTable, nextWaveTable, surveyRivalsTable, lagWeightsTable, departuresTable,
  outcomeLagsTable, eventsTable,
  stayingTable, spreadTable, spreadSeriesTable, pullTable, benchmarkTable, benchmarkMarginsTable, tippingTable, coderTable, importanceTable, hearingTable, adviceTable,
  competitorsTable, competitorSeriesTable, mentionSharesTable, competitorVenuesTable,
  revisionsTable, breaksTable, followUpTable,
] as const

/** Tables list venues as they find them: in the one order of the document. */
function withVenuesInOrder(findings: Findings): Findings {
  const order = levelOrder(findings)
  const sorted = <T extends { readonly venue: string }>(list: readonly T[]) => [...inOrder(list, 'venue', order, ({ venue }) => venue)]
  const candidates = findings.survey === null ? [] : [...inOrder(findings.survey.candidates, 'venue', order, ({ venue }) => venue ?? '')]
  const first = (series: string) => candidates.filter((of) => of.series === series)
  return {
    ...findings, venues: sorted(findings.venues), speaking: withSpeakingInOrder(findings.speaking, sorted),
    coder: { ...findings.coder, venues: sorted(findings.coder.venues) }, hearing: findings.hearing && { ...findings.hearing, venues: sorted(findings.hearing.venues) },
    competitors: findings.competitors && { ...findings.competitors, venues: sorted(findings.competitors.venues) },
    survey: findings.survey && { ...findings.survey, candidates: [...first('adjusted'), ...first('raw'), ...first('venue')] },
  }
}

type Sorted = <T extends { readonly venue: string }>(list: readonly T[]) => T[]

function withSpeakingInOrder(speaking: Findings['speaking'], sorted: Sorted): Findings['speaking'] {
  return { ...speaking, venues: sorted(speaking.venues), spread: sorted(speaking.spread), pull: sorted(speaking.pull) }
}

/**
 * Every table of a review: what charts draw, what the document prints and what `tables/NAME.csv` holds.
 * No figure is computed here: they are chosen, laid out, and withheld where the group is too small.
 */
export function tablesOf(findings: Findings): readonly Table[] {
  const ordered = withVenuesInOrder(findings)
  const tables = makers.map((make) => make(ordered))
  return findings.accounting.authors === 'unknown' ? tables.map(withoutAuthors) : tables
}

/** What is counted in authors. */
const ofAuthors = ['authors', 'top_share', 'gini', 'effective_authors']

/** Where nobody's name is known, every mention is taken for an author's only one: no count of authors to be shown. */
function withoutAuthors(table: Table): Table {
  const unknown = Object.fromEntries(table.columns.filter(({ key }) => ofAuthors.includes(key)).map(({ key }) => [key, null]))
  return { ...table, rows: table.rows.map((row) => ({ ...row, ...unknown })) }
}
