import type { DayWindow, SurveyInput, SurveyReading } from '../inputs/small-inputs.ts'

/** A wave's figure of the metric that is compared with opinion: a share in percent, a mean in its own unit. */
export interface HeadlineWave extends DayWindow {
  readonly name: string
  readonly value: number
  /** Standard error on the effective base. */
  readonly standardError: number
}

/** Percent per share; a mean keeps its unit. */
export function unitOf(kind: 'share' | 'mean'): number {
  return kind === 'share' ? 100 : 1
}

/** Standard error of a reading on its effective base, in the unit of the findings. */
export function standardErrorOf({ value, sd, effectiveBase }: SurveyReading): number {
  return sd === null ? 100 * Math.sqrt(value * (1 - value) / effectiveBase) : sd / Math.sqrt(effectiveBase)
}

/** Waves that have the headline metric for everyone, in order of time. */
export function headlineWaves(survey: SurveyInput): readonly HeadlineWave[] {
  const unit = unitOf(survey.metrics[survey.headline].kind)
  return survey.waves.flatMap((wave) => wave.readings
    .filter(({ metric, segment }) => metric === survey.headline && segment === -1)
    .map((reading) => ({ name: wave.name, start: wave.start, end: wave.end, startStep: wave.startStep, days: wave.days, value: unit * reading.value, standardError: standardErrorOf(reading) })))
}
