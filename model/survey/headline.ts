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

/**
 * Standard error of a reading on its effective base, in the unit of the findings. A share's is that of the share with two successes and two failures
 * added, so that nobody or everybody saying yes does not count as certain (Agresti and Coull 1998, American Statistician 52:119).
 */
export function standardErrorOf({ value, sd, effectiveBase }: SurveyReading): number {
  if (sd !== null) return sd / Math.sqrt(effectiveBase)
  const share = (value * effectiveBase + 2) / (effectiveBase + 4)
  return 100 * Math.sqrt(share * (1 - share) / (effectiveBase + 4))
}

/** Bases below these are not shown, and flagged (common practice, no source); by the effective base, which says better what a figure is worth. */
const hiddenBelow = 30
const flaggedBelow = 75

export function showingOf({ base, effectiveBase }: SurveyReading): 'shown' | 'flagged' | 'hidden' {
  const worth = Math.min(base, effectiveBase)
  if (worth < hiddenBelow) return 'hidden'
  return worth < flaggedBelow ? 'flagged' : 'shown'
}

/** Waves that have the headline metric for everyone on a base that may be shown, in order of time. */
export function headlineWaves(survey: SurveyInput): readonly HeadlineWave[] {
  const unit = unitOf(survey.metrics[survey.headline].kind)
  return survey.waves.flatMap((wave) => wave.readings
    .filter((reading) => reading.metric === survey.headline && reading.segment === -1 && showingOf(reading) !== 'hidden')
    .map((reading) => ({ name: wave.name, start: wave.start, end: wave.end, startStep: wave.startStep, days: wave.days, value: unit * reading.value, standardError: standardErrorOf(reading) })))
}
