import { closest } from 'fastest-levenshtein'
import type { Account } from '../account/account.ts'
import { dataDates, dayNumber } from '../calendar/days.ts'
import { placeOf } from '../account/yaml-places.ts'
import { faultOf } from '../faults/catalogue.ts'
import type { Fault } from '../faults/fault.ts'
import { foldValue } from '../intake/level-names.ts'
import { hasHeadline, type RawSurvey, type RawWave } from './raw-inputs.ts'
import { longestFieldwork } from './survey-row.ts'

type Waves = Omit<RawSurvey, 'headline'>

/** Index of the metric that the account compares with opinion, the only one if it names none; -1 where there is no telling. */
export function headlineOf({ metrics }: Waves, account: Account): number {
  const asked = account.survey?.headline ?? null
  if (asked === null) return metrics.length === 1 ? 0 : -1
  return metrics.findIndex(({ name }) => foldValue(name) === foldValue(asked))
}

/** What the account says of the survey and the survey does not bear out. */
export function surveyKeyFaults(survey: Waves, headline: number, account: Account): readonly Fault[] {
  const known = survey.metrics.map(({ name }) => name)
  const place = (...path: readonly string[]): string => placeOf(account.places, ['survey', ...path])
  const folded = known.map(foldValue)
  const unknown = Object.keys(account.survey?.labels ?? {}).filter((metric) => !folded.includes(foldValue(metric)))
  return [
    ...headlineFaults(survey, headline, account.survey?.headline ?? null, place),
    ...unknown.map((metric) => faultOf('survey-label-unknown', place('labels', metric), { metric, nearest: closest(metric, known), known })),
    ...nextFieldworkFaults(survey.waves, account.survey?.nextFieldwork ?? null, place('next_fieldwork')),
  ]
}

function headlineFaults({ metrics, segments, waves }: Waves, headline: number, asked: string | null, place: (...path: readonly string[]) => string): readonly Fault[] {
  const known = metrics.map(({ name }) => name)
  if (headline < 0) {
    return [asked === null ? faultOf('survey-headline-open', place(), { known })
      : faultOf('survey-headline-unknown', place('headline'), { headline: asked, nearest: closest(asked, known), known })]
  }
  if (waves.some((wave) => hasHeadline(wave, headline))) return []
  const only = segments.filter((_, segment) => waves.some(({ readings }) => readings.some((reading) => reading.metric === headline && reading.segment === segment)))
  return [faultOf('survey-headline-everyone', place(...(asked === null ? [] : ['headline'])), { headline: known[headline]!, segments: only })]
}

/** The wave to come lies after the last one; it may overlap that only where the waves of this survey do overlap. */
function nextFieldworkFaults(waves: readonly RawWave[], next: { readonly from: string; readonly to: string } | null, place: string): readonly Fault[] {
  if (next === null) return []
  const dates = `${next.from} to ${next.to}`
  if (dayNumber(next.to) - dayNumber(next.from) + 1 > longestFieldwork || next.to > dataDates.last) return [faultOf('survey-next-fieldwork-long', place, { dates, most: longestFieldwork })]
  const last = waves.reduce((latest, wave) => (wave.end > latest.end ? wave : latest))
  const rolling = waves.some((wave, index) => index > 0 && wave.start <= waves[index - 1]!.end)
  if (rolling ? next.from > last.start && next.to > last.end : next.from > last.end) return []
  return [faultOf('survey-next-fieldwork', place, { dates, wave: last.name, last: `${last.start} to ${last.end}` })]
}
