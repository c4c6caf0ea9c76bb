import type { Findings } from '../../model/findings/schema.ts'
import { makeTable } from './make-table.ts'
import type { Table } from './table.ts'
import { middleOf } from './wave-dates.ts'

/** Each wave as it was forecast before its fieldwork began, and as it came out. */
export function surveyForecastsTable({ survey }: Findings): Table {
  return makeTable('survey-forecasts', {
    wave: 'word', field_start: 'date', field_end: 'date', middle: 'date', kind: 'text',
    forecast: 'measure', low: 'measure', high: 'measure', observed: 'measure', carried: 'measure', past_mean: 'measure', inside: 'word',
  }, (survey?.forecast?.waves ?? []).map((at) => ({
    wave: at.wave, field_start: at.field_start, field_end: at.field_end, middle: middleOf(at.field_start, at.field_end), kind: survey?.kind ?? null,
    forecast: at.forecast.mean, low: at.forecast.low, high: at.forecast.high, observed: at.observed, carried: at.carried, past_mean: at.past_mean, inside: at.inside,
  })))
}

/** The next wave as it is forecast, beside those of which it can be told how they came out; no row where there is no forecast. */
export function nextWaveTable({ survey }: Findings): Table {
  const next = survey?.next_wave ?? null
  return makeTable('next-wave', { field_start: 'date', field_end: 'date', middle: 'date', kind: 'text', forecast: 'measure', low: 'measure', high: 'measure', last: 'measure' }, next === null ? [] : [{
    field_start: next.field_start, field_end: next.field_end, middle: middleOf(next.field_start, next.field_end), kind: survey?.kind ?? null,
    forecast: next.forecast.mean, low: next.forecast.low, high: next.forecast.high, last: next.last,
  }])
}

/** Forecasts from the posts and from their rivals, a row each; empty where nothing was forecast. */
export function surveyRivalsTable({ survey }: Findings): Table {
  const forecast = survey?.forecast ?? null
  const posts = forecast === null ? [] : [{ ...forecast, rival: 'posts', rmse_ratio: null, crps_ratio: null, dm_p: null }]
  return makeTable('survey-rivals', {
    rival: 'text', kind: 'text', rmse: 'measure-size', crps: 'measure-size', coverage: 'share', rmse_ratio: 'number', crps_ratio: 'number', dm_p: 'p-value',
  }, [...posts, ...forecast?.rivals ?? []].map((of) => ({
    rival: of.rival, kind: survey?.kind ?? null, rmse: of.rmse, crps: of.crps, coverage: of.coverage, rmse_ratio: of.rmse_ratio, crps_ratio: of.crps_ratio, dm_p: of.dm_p,
  })))
}

/** How much each lag counts in a forecast. */
export function lagWeightsTable({ survey, grid }: Findings): Table {
  const weights = survey?.lag_weights ?? []
  const largest = Math.max(...weights.map(({ weight }) => weight))
  return makeTable('lag-weights', { grid: 'text', lag: 'count', weight: 'share', largest: 'word' }, weights.map(({ lag, weight }) => ({ grid, lag, weight, largest: weight === largest })))
}

/** Waves that came out far from their forecast, a row for each event beside one and one row where there is none. */
export function departuresTable({ survey }: Findings): Table {
  return makeTable('departures', {
    wave: 'word', field_start: 'date', field_end: 'date', kind: 'text', observed: 'measure', forecast: 'measure', low: 'measure', high: 'measure', direction: 'word', event_date: 'date', event: 'text',
  }, (survey?.departures ?? []).flatMap((at) => (at.events.length === 0 ? [null] : at.events).map((event) => ({
    wave: at.wave, field_start: at.field_start, field_end: at.field_end, kind: survey?.kind ?? null, observed: at.observed,
    forecast: at.forecast.mean, low: at.forecast.low, high: at.forecast.high, direction: at.direction, event_date: event?.date ?? null, event: event?.label ?? null,
  }))))
}

/** Growth of the outcome that goes with a rise of opinion by 1 point, at each lag; in percentage points. */
export function outcomeLagsTable({ outcome }: Findings): Table {
  return makeTable('outcome-lags', { span_lag: 'word', effect: 'number', low: 'number', high: 'number', effect_p: 'p-value', adjusted_p: 'p-value', observations: 'count', best: 'word' },
    (outcome?.lags ?? []).map(({ lag, effect, p, adjusted_p: adjusted, observations }) => (
      { span_lag: String(lag), effect: effect.mean / 10, low: effect.low / 10, high: effect.high / 10, effect_p: p, adjusted_p: adjusted, observations, best: lag === outcome?.best_lag }
    )))
}

/** What the account says happened, and when. */
export function eventsTable({ events }: Findings): Table {
  return makeTable('events', { date: 'date', label: 'text', event_kind: 'text' }, (events ?? []).map(({ date, label, kind }) => ({ date, label, event_kind: kind === '' ? null : kind })))
}
