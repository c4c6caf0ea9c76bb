import type { AuditCount, BenchmarkMargin, ImportanceInput, SurveyMetric, SurveyReading } from '../../model/inputs/small-inputs.ts'

/** The small inputs as their files have them, every value checked, before a period is chosen; dates are ISO dates. */
export interface RawInputs {
  readonly survey: RawSurvey | null
  /** In order of time. */
  readonly events: readonly RawEvent[] | null
  /** In order of time, every date once, at least two. */
  readonly outcome: readonly RawOutcome[] | null
  /** In the order of the files. */
  readonly benchmark: readonly BenchmarkMargin[] | null
  /** Venue, true and coded label once each. */
  readonly audit: readonly AuditCount[] | null
  readonly importance: RawImportance | null
  /** What was read. */
  readonly files: readonly ReadFile[]
}

export interface RawSurvey {
  /** Index into `metrics`. */
  readonly headline: number
  /** Metrics and segments in the order in which the files name them. */
  readonly metrics: readonly SurveyMetric[]
  readonly segments: readonly string[]
  /** In order of their first and then last day. */
  readonly waves: readonly RawWave[]
}

export interface RawWave {
  readonly name: string
  /** First and last day of fieldwork. */
  readonly start: string
  readonly end: string
  readonly readings: readonly SurveyReading[]
}

export interface RawImportance {
  readonly input: ImportanceInput
  /** Respondents left out because an answer is missing. */
  readonly incomplete: number
}

export interface RawEvent {
  readonly date: string
  readonly label: string
  /** Empty where the file gives none. */
  readonly kind: string
}

export interface RawOutcome {
  readonly date: string
  readonly value: number
  readonly market: number | null
}

/** A file by its path inside the account folder; `rows` are its data rows. */
export interface ReadFile {
  readonly path: string
  readonly sha256: string
  readonly rows: number
}

/** Whether a wave has the headline metric for everyone: only such waves can be compared with opinion. */
export function hasHeadline(wave: RawWave, headline: number): boolean {
  return wave.readings.some(({ metric, segment }) => metric === headline && segment === -1)
}
