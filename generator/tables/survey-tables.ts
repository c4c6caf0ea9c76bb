import type { Findings } from '../../model/findings/schema.ts'
import { makeTable } from './make-table.ts'
import type { Table } from './table.ts'
import { middleOf, movedMiddle } from './wave-dates.ts'

type Survey = NonNullable<Findings['survey']>
type Reading = Survey['waves'][number]

const when = ({ wave, field_start: start, field_end: end }: { readonly wave: string, readonly field_start: string, readonly field_end: string }) => (
  { wave, field_start: start, field_end: end, middle: middleOf(start, end) }
)

/** What is shown of a figure: nothing of one whose base is too small. */
function figuresOf(at: Reading) {
  const [reading, change] = at.shown === 'hidden' ? [null, null] : [at, at.change]
  return {
    value: reading?.value ?? null, low: reading?.low ?? null, high: reading?.high ?? null,
    change_from: change?.from ?? null, change: change?.difference ?? null, change_low: change?.low ?? null, change_high: change?.high ?? null,
    change_p: change?.p ?? null, adjusted_p: change?.adjusted_p ?? null, movement: change?.movement ?? null,
  }
}

const readingColumns = {
  wave: 'word', field_start: 'date', field_end: 'date', middle: 'date', base: 'count', effective_base: 'count', shown: 'word',
  value: 'measure', low: 'measure', high: 'measure',
  change_from: 'word', change: 'measure-change', change_low: 'measure-change', change_high: 'measure-change', change_p: 'p-value', adjusted_p: 'p-value', movement: 'word',
} as const

/** The survey on its own: every metric, first for everyone, then for each segment, wave by wave. `latest` marks the last wave that has the metric. */
export function trackerTable({ survey }: Findings): Table {
  return makeTable('tracker', { metric: 'text', label: 'text', kind: 'text', segment: 'text', latest: 'word', ...readingColumns },
    byMetric(survey?.metrics ?? []).flatMap(({ metric, label, kind, segment, waves }) => waves.map((at, index) => ({
      metric, label, kind, segment, latest: index === waves.length - 1,
      ...when(at), base: at.base, effective_base: at.effective_base, shown: at.shown, ...figuresOf(at),
    }))))
}

/** Segments of one metric beside each other, everyone first: as people compare them. */
function byMetric(metrics: Survey['metrics']): Survey['metrics'] {
  const names = [...new Set(metrics.map(({ metric }) => metric))]
  return names.flatMap((name) => metrics.filter(({ metric }) => metric === name))
}

/** The metric that is compared with opinion, for everyone, wave by wave; `middle` is the middle of fieldwork, for a time axis. */
export function surveyWavesTable({ survey }: Findings): Table {
  return makeTable('survey-waves', { label: 'text', kind: 'text', ...readingColumns },
    (survey?.waves ?? []).map((at) => ({
      label: survey?.label ?? null, kind: survey?.kind ?? null, ...when(at), base: at.base, effective_base: at.effective_base, shown: at.shown, ...figuresOf(at),
    })))
}

/**
 * Both series on one axis of time, one below the other: opinion at the middle of its steps, moved by the lag at which the two go together
 * best, and the survey's waves at the middle of fieldwork. `kind` is points, share or mean.
 */
export function agreementTable({ survey, opinion, grid }: Findings): Table {
  const lag = adjustedOf(survey)?.best_lag ?? 0
  const posts = survey === null ? [] : opinion.series.map(({ step, adjusted }) => (
    { series: 'adjusted', label: null, kind: 'points', grid, moved_by: lag, date: movedMiddle(step, lag, grid), value: adjusted.mean, low: adjusted.low, high: adjusted.high }
  ))
  const waves = (survey?.waves ?? []).map((at) => {
    const { value, low, high } = figuresOf(at)
    return { series: 'survey', label: survey?.label ?? null, kind: survey?.kind ?? null, grid, moved_by: 0, date: middleOf(at.field_start, at.field_end), value, low, high }
  })
  return makeTable('agreement', { series: 'text', label: 'text', kind: 'text', grid: 'text', moved_by: 'steps', date: 'date', value: 'number', low: 'number', high: 'number' }, [...posts, ...waves])
}

const lagColumns = { lag: 'count', r: 'number', low: 'number', high: 'number', pairs: 'count', effective_pairs: 'count', corrected: 'number' } as const

/** How strongly each series goes with the survey at each lag; `best` marks the lag at which it does most. */
export function surveyLagsTable({ survey, grid }: Findings): Table {
  return makeTable('survey-lags', { series: 'text', venue: 'text', label: 'text', grid: 'text', ...lagColumns, best: 'word' },
    (survey?.candidates ?? []).flatMap(({ series, venue, label, lags, best_lag: best }) => lags.map((at) => ({ series, venue, label, grid, ...at, best: at.lag === best }))))
}

/** Each series at its best lag; all null but its name where it has none. */
export function surveyCandidatesTable({ survey }: Findings): Table {
  return makeTable('survey-candidates', { series: 'text', venue: 'text', label: 'text', ...lagColumns, adjusted_p: 'p-value' },
    (survey?.candidates ?? []).map(({ series, venue, label, best, adjusted_p: p }) => ({
      series, venue, label, lag: best?.lag ?? null, r: best?.r ?? null, low: best?.low ?? null, high: best?.high ?? null,
      pairs: best?.pairs ?? null, effective_pairs: best?.effective_pairs ?? null, corrected: best?.corrected ?? null, adjusted_p: p,
    })))
}

function adjustedOf(survey: Findings['survey']): Survey['candidates'][number] | undefined {
  return survey?.candidates.find(({ series }) => series === 'adjusted')
}
