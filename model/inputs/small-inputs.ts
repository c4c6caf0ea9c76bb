/**
 * The small inputs beside the mentions, read and placed on the time axis by the caller: the model sees indices and
 * lengths, and ISO dates only as names. Nothing here is dated after the end of the period under review.
 */
export interface SmallInputs {
  readonly survey: SurveyInput | null
  /** In order of time; null where the account has none. */
  readonly events: readonly AccountEvent[] | null
  readonly outcome: OutcomeInput | null
  readonly benchmark: readonly BenchmarkMargin[] | null
  readonly audit: readonly AuditCount[] | null
  readonly importance: ImportanceInput | null
  /** Number of the brand's customers, where the account says. */
  readonly customers: number | null
}

/** Customers by one trait; shares sum to 1. */
export interface BenchmarkMargin {
  readonly margin: string
  readonly levels: readonly { readonly level: string; readonly share: number }[]
}

/** Hand-coded posts of a venue by what people and what the coder called them. */
export interface AuditCount {
  /** Name of the venue in the account. */
  readonly venue: string
  /** Labels as the account writes them. */
  readonly trueLabel: string
  readonly codedLabel: string
  readonly count: number
}

/** How much each topic matters to customers. */
export type ImportanceInput =
  /** Weights sum to 1. */
  | { readonly kind: 'stated'; readonly topics: readonly { readonly topic: string; readonly weight: number }[] }
  /** One answer a respondent: overall opinion, and one of each topic. */
  | { readonly kind: 'respondents'; readonly topics: readonly string[]; readonly overall: Float64Array; readonly ratings: readonly Float64Array[] }

/** A stretch of days on the grid: fieldwork of a wave, or the span of an outcome. */
export interface DayWindow {
  /** First and last day, inclusive, as ISO dates. */
  readonly start: string
  readonly end: string
  /** Index of the step that holds the first day; below 0 or past the last step where it lies outside the grid. */
  readonly startStep: number
  /** Shape (steps from `startStep` on): days of the window in each; they sum to its length. */
  readonly days: Float64Array
}

export interface SurveyInput {
  /** Index into `metrics`: the one that is compared with opinion. */
  readonly headline: number
  /** Smallest and largest lag looked at, in steps; above 0 the posts lead. */
  readonly lags: readonly [number, number]
  /** In the order in which the files name them. */
  readonly metrics: readonly SurveyMetric[]
  /** Names of the segments, in the order of the files, everyone left out. */
  readonly segments: readonly string[]
  /** Waves whose fieldwork ended within the period under review or before, in order of their first and then last day. */
  readonly waves: readonly SurveyWave[]
  /** Names of the waves left out because their fieldwork ended after the period under review. */
  readonly later: readonly string[]
  /** The wave to come; null with fewer than two waves, and where the account gives no dates. */
  readonly next: (DayWindow & { readonly dates: 'given' | 'usual-spacing' }) | null
}

export interface SurveyMetric {
  readonly name: string
  readonly label: string
  /** Shares lie in [0, 1]. */
  readonly kind: 'share' | 'mean'
}

export interface SurveyWave extends DayWindow {
  readonly name: string
  readonly readings: readonly SurveyReading[]
}

/** One figure of one wave. */
export interface SurveyReading {
  /** Index into `metrics`. */
  readonly metric: number
  /** Index into `segments`; -1 for everyone. */
  readonly segment: number
  /** Interviews, unweighted. */
  readonly base: number
  /** Interviews that the weighted ones are worth; `base` where the file gives none. */
  readonly effectiveBase: number
  readonly value: number
  /** Of the answers; null for a share, whose own is known. */
  readonly sd: number | null
}

export interface AccountEvent {
  readonly date: string
  /** Index of the step that holds the date; outside the grid below 0 or past its end. */
  readonly step: number
  readonly label: string
  /** Empty where the file gives none. */
  readonly kind: string
}

/** A series of the client's own, such as sales or enquiries: one value a span, each span from its date to the day before the next. */
export interface OutcomeInput {
  /** In order of time; the last span is as long as the usual one (the median). */
  readonly spans: readonly (DayWindow & { readonly value: number; readonly market: number | null })[]
}
