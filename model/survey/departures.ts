import type { Findings } from '../findings/schema.ts'
import type { AccountEvent } from '../inputs/small-inputs.ts'
import { forecastEstimate, type Limits } from './forecast-estimate.ts'
import type { ForecastWave } from './evaluate-forecasts.ts'

type Survey = NonNullable<Findings['survey']>

/** Survey and posts part where a wave lies outside this interval of its forecast. */
const parting = 0.95
/** Events that began so many days before the fieldwork, or in it, may have to do with it. */
const nearDays = 91

/** Waves that lie outside the 95 % interval of their forecast, with the account's events of the three months before. */
export function readDepartures(waves: readonly ForecastWave[], events: readonly AccountEvent[], stepDays: number, limits: Limits): Pick<Survey, 'departures' | 'departures_expected'> {
  return {
    departures: waves.flatMap(({ wave, forecast }) => {
      const estimate = forecastEstimate(forecast.components, parting, limits)
      if (wave.value >= estimate.low && wave.value <= estimate.high) return []
      const from = wave.startStep - Math.round(nearDays / stepDays)
      return [{
        wave: wave.name, field_start: wave.start, field_end: wave.end, observed: wave.value, forecast: estimate,
        direction: wave.value > estimate.high ? 'above' as const : 'below' as const,
        events: events.filter(({ date, step }) => step >= from && date <= wave.end).map(({ date, label, kind }) => ({ date, label, kind })),
      }]
    }),
    departures_expected: (1 - parting) * waves.length,
  }
}
