import type { Timeline } from '../../model/intake/intake-tables.ts'
import type { AccountEvent, OutcomeInput, SmallInputs, SurveyInput } from '../../model/inputs/small-inputs.ts'
import type { Account, SurveySource } from '../account/account.ts'
import { dayWindow } from '../calendar/day-window.ts'
import { dayNumber, isoDate } from '../calendar/days.ts'
import { stepIndex } from '../calendar/grid.ts'
import { nextFieldwork } from './next-fieldwork.ts'
import { outcomeSpans } from './outcome-spans.ts'
import { hasHeadline, type RawEvent, type RawInputs, type RawOutcome, type RawSurvey, type RawWave } from './raw-inputs.ts'

/** Put the small inputs on the time axis of a review, and leave out what ends after the period under review. */
export function placeInputs(raw: RawInputs, account: Account, timeline: Timeline): SmallInputs {
  return {
    survey: raw.survey === null || account.survey === null ? null : placeSurvey(raw.survey, account.survey, timeline),
    events: raw.events === null ? null : placeEvents(raw.events, timeline),
    outcome: raw.outcome === null ? null : placeOutcome(raw.outcome, timeline),
    // Nothing of these has a date.
    benchmark: raw.benchmark, audit: raw.audit, importance: raw.importance?.input ?? null, customers: account.customers,
  }
}

/** A forecast of a survey wave from the posts needs so many waves before it. */
const wavesBefore = 8

/** The day on which the fieldwork begins that is the first to be forecast: of the 9th wave that has the headline metric for everyone; null with fewer. */
export function firstForecast({ survey }: RawInputs): string | null {
  return survey?.waves.filter((wave) => hasHeadline(wave, survey.headline))[wavesBefore]?.start ?? null
}

/** Traits of authors that the benchmark asks intake for. */
export function marginsAsked({ benchmark }: RawInputs): readonly { readonly margin: string; readonly levels: readonly string[] }[] {
  return (benchmark ?? []).map(({ margin, levels }) => ({ margin, levels: levels.map(({ level }) => level) }))
}

function placeSurvey(survey: RawSurvey, keys: SurveySource, timeline: Timeline): SurveyInput {
  const place = placing(timeline)
  const within = survey.waves.filter(({ end }) => end <= timeline.review.end)
  const later = survey.waves.filter(({ end }) => end > timeline.review.end)
  const { headline, metrics, segments, waves } = restricted(survey, within)
  // The account gives the dates of the wave after all of its waves: seen from before a later one they are not the next.
  const next = nextFieldwork(waves.filter((wave) => hasHeadline(wave, headline)), later.length === 0 ? keys.nextFieldwork : null)
  return {
    headline, metrics, segments, lags: keys.lags,
    waves: waves.map(({ name, start, end, readings }) => ({ name, readings, ...place(start, end) })),
    later: later.map(({ name }) => name),
    next: next === null ? null : { ...place(next.from, next.to), dates: next.dates },
  }
}

/** The survey as if it had these waves only: with the metrics and segments that they name, and the headline in any case. */
function restricted({ headline, metrics, segments }: RawSurvey, waves: readonly RawWave[]): RawSurvey {
  const readings = waves.flatMap((wave) => wave.readings)
  const keptMetrics = [...metrics.keys()].filter((metric) => metric === headline || readings.some((reading) => reading.metric === metric))
  const keptSegments = [...segments.keys()].filter((segment) => readings.some((reading) => reading.segment === segment))
  return {
    headline: keptMetrics.indexOf(headline),
    metrics: keptMetrics.map((metric) => metrics[metric]!),
    segments: keptSegments.map((segment) => segments[segment]!),
    waves: waves.map((wave) => ({
      ...wave, readings: wave.readings.map((reading) => ({ ...reading, metric: keptMetrics.indexOf(reading.metric), segment: keptSegments.indexOf(reading.segment) })),
    })),
  }
}

function placeEvents(events: readonly RawEvent[], timeline: Timeline): readonly AccountEvent[] {
  const first = dayNumber(timeline.steps[0]!)
  return events.filter(({ date }) => date <= timeline.review.end).map((event) => ({ ...event, step: stepIndex(timeline.grid, first, dayNumber(event.date)) }))
}

function placeOutcome(outcome: readonly RawOutcome[], timeline: Timeline): OutcomeInput {
  const place = placing(timeline)
  const spans = outcomeSpans(outcome.map(({ date }) => dayNumber(date)))
  return {
    spans: outcome.map(({ value, market }, index) => ({ ...place(isoDate(spans[index]!.first), isoDate(spans[index]!.last)), value, market }))
      .filter(({ end }) => end <= timeline.review.end),
  }
}

/** Puts a stretch of days on the grid of a timeline. */
function placing({ grid, steps }: Timeline): (start: string, end: string) => ReturnType<typeof dayWindow> {
  const first = dayNumber(steps[0]!)
  return (start, end) => dayWindow(grid, first, start, end)
}
