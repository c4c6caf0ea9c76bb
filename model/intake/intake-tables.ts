/**
 * What intake hands to the model: everything the figures rest on, and no person in it.
 *
 * There is no author, text or id below this line of the program. All of `model/` can be redone from these
 * tables alone, so they are what an archive keeps and what a warehouse can supply.
 */

/** The time axis. Calendar arithmetic is done by the caller: the model sees only indices and lengths. */
export interface Timeline {
  readonly grid: 'day' | 'week' | 'month'
  /** Length of one step in days: 1, 7 or 30.4375. */
  readonly stepDays: number
  /** ISO date on which each step begins, every step from the first to the last that holds a mention. */
  readonly steps: readonly string[]
  /** ISO date of each step's last day, the last one cut at the end of the period under review: a review reads nothing later. */
  readonly lastDays: readonly string[]
  /** ISO date of the last mention; where only its step is known, a day of that. */
  readonly lastMention: string
  /** Days from the last mention to the end of the period under review. */
  readonly quietDays: number
  /** Every period that holds the midpoint of a step, in order of time. */
  readonly periods: readonly Period[]
  /** Shape (steps): index into `periods` of the period that holds the step's midpoint. */
  readonly periodOf: Int32Array
  /** Shape (steps): 1 where the step's midpoint lies in the base. */
  readonly inBase: Uint8Array
  readonly base: { readonly from: string; readonly to: string }
  /** Index into `periods` of the period under review; -1 if no step belongs to it. */
  readonly current: number
  /** The period under review, also when no step belongs to it. */
  readonly review: Period
}

/** First and last day, inclusive, as ISO dates; named 2026-10, 2026-Q4 or 2026-W44. */
export interface Period {
  readonly name: string
  readonly start: string
  readonly end: string
}

/** A thing that mentions differ in: venue, topic, poster, or one the account adds. */
export interface Factor {
  readonly name: string
  /** Sorted by name: the order of every array over levels. */
  readonly levels: readonly Level[]
}

export interface Level {
  readonly name: string
  readonly label: string
  /** Venues only: declared to stand still (`drift: none`). */
  readonly anchor?: boolean
  /** Venues only: cost of hearing one more author, any unit. */
  readonly costPerAuthor?: number
}

/** Cells as columns, shape (cells) each, sorted by step and then by the levels of each factor. */
export interface CellColumns {
  readonly count: number
  /** Index into `timeline.steps`. */
  readonly step: Int32Array
  /** One column per factor, in the order of `factors`; index into its levels. */
  readonly levels: readonly Int32Array[]
  /** n_c, at least 1. */
  readonly mentions: Float64Array
  /** a_c, at least 1; a mention without an author counts as one author. */
  readonly authors: Float64Array
  /** y_c, in [-1, 1]. */
  readonly mean: Float64Array
  /** Sum of squared deviations from y_c inside the cell; 0 where `freedom` is 0. */
  readonly squares: Float64Array
  /** Degrees of freedom of `squares`: n_c - 1, or 0 where the variance is not known. */
  readonly freedom: Float64Array
  /** b_c = sum m_a^2 / sum m_a over the authors of the cell; 1 where authors are unknown. */
  readonly clustering: Float64Array
  /** A design effect given ready-made; NaN where it is to be computed from `clustering`. */
  readonly deff: Float64Array
}

/** Sums for the one-way analysis of variance by author inside a venue, of scores less their venue-and-step mean. */
export interface AuthorVariation {
  /** Known authors. */
  readonly authors: number
  /** Their mentions. */
  readonly mentions: number
  /** Sum over authors of the squared number of mentions. */
  readonly squaredSizes: number
  readonly betweenSquares: number
  readonly withinSquares: number
}

/** How many authors wrote how often: a count of counts, in which nobody can be found. */
export interface ConcentrationRow {
  /** Index into `timeline.periods`. */
  readonly period: number
  /** Index into the levels of `venue`; -1 for all venues together. */
  readonly venue: number
  readonly mentionsPerAuthor: number
  readonly authors: number
}

/** Distinct authors; a mention without one counts as one. */
export interface AuthorCounts {
  /** False where ready-made cells were summed, so that an author in two cells counts twice. */
  readonly exact: boolean
  /** Shape (steps). */
  readonly byStep: Float64Array
  /** Shape (periods). */
  readonly byPeriod: Float64Array
  /** Row-major of shape (steps x venues). */
  readonly byStepVenue: Float64Array
  /** One entry per factor, each row-major of shape (periods x levels). */
  readonly byPeriodLevel: readonly Float64Array[]
}

/** Coded labels of the mentions of every cell: for correcting the coder. */
export interface CellLabels {
  /** As the account writes them, in the order of their scores. */
  readonly names: readonly string[]
  /** Shape (labels), in [-1, 1]. */
  readonly scores: Float64Array
  /** Row-major of shape (cells x labels): mentions; a row sums to the cell's mentions, or to less where some are scored by a range. */
  readonly counts: Float64Array
}

/** Why cells have no labels: scores come from ranges in every source, sources label differently, or cells came ready-made. */
export type NoLabels = 'ranges' | 'labels-differ' | 'ready-made'

/** Known authors of a period by stance, and how many of them posted in the period after it as well. */
export interface StayingRow {
  /** Index into `timeline.periods`, of every period up to the one under review. */
  readonly period: number
  /** Third of [-1, 1] that holds the author's mean score in the period: 0 below -1/3, 1 to 1/3, 2 above. */
  readonly stance: 0 | 1 | 2
  readonly authors: number
  /** 0 for the period under review, which has none after it. */
  readonly stayed: number
}

/** Mentions whose score lies at either end, -1 or 1. */
export interface ExtremeRow {
  readonly period: number
  /** Index into the levels of `venue`. */
  readonly venue: number
  readonly mentions: number
  readonly extremes: number
}

/**
 * Regression, through the origin, of a reply's score on the mean of the thread before it, in one venue and poster class: both less the mean of their venue,
 * topic and period; the author's own posts left out of the thread. Standard errors are clustered by author.
 */
export interface PullRow {
  readonly venue: number
  /** Index into the levels of `poster`; -1 for all of them together. */
  readonly poster: number
  readonly replies: number
  readonly authors: number
  readonly slope: number
  readonly standardError: number
}

/** Authors of the period under review by the margins of the benchmark. */
export interface SegmentTable {
  readonly margins: readonly string[]
  /** One row per combination that holds an author, in any order; -1 where the level of a margin is not known. */
  readonly rows: readonly {
    /** Index into `levels` of each margin. */
    readonly levels: readonly number[]
    readonly authors: number
    /** Sum and sum of squares over authors of their mean score, on [-1, 1]. */
    readonly sum: number
    readonly squares: number
  }[]
  /** Names of the levels seen, by margin, sorted. */
  readonly levels: readonly (readonly string[])[]
}

/** received = rejected + duplicates + outOfScope + modelled, of all data rows of all sources. */
export interface Accounting {
  readonly received: number
  readonly rejected: number
  readonly duplicates: number
  readonly outOfScope: number
  readonly modelled: number
  /** Rows by reason: of rejection, of duplication, of being out of scope; and times read by a rule. */
  readonly reasons: Readonly<Record<string, number>>
  /** The most frequent values of time and score that could not be read; empty where they are few. */
  readonly unread: readonly { readonly column: 'posted_at' | 'score'; readonly value: string; readonly rows: number }[]
  /** Values that the account maps to no level of its own, kept under their own name. */
  readonly unmapped: readonly { readonly factor: string; readonly value: string; readonly mentions: number }[]
  readonly inputs: readonly { readonly path: string; readonly sha256: string; readonly rows: number }[]
  /** Shape (venues): mentions with a known author. */
  readonly withAuthor: Float64Array
  /** True where cells came ready-made, so that rows stand for more than one mention. */
  readonly readyMade: boolean
}

/** What the tables know that was not known earlier: for forecasts that are made as of an earlier day. */
export interface Hindsight {
  /** Shape (venues): the sums over the mentions before the step `before` alone; null as in `variation`. */
  readonly variation: readonly (AuthorVariation | null)[]
  readonly before: number
  /**
   * Steps `from` to `to` (inclusive) of a venue lie in the first 90 days of a source, whose poster classes look at those days whole:
   * as they stand they are known from the step `settled` on.
   */
  readonly settling: readonly { readonly venue: number; readonly from: number; readonly to: number; readonly settled: number }[]
}

export interface IntakeTables {
  readonly timeline: Timeline
  /** `venue` first, then the account's other factors in its order. */
  readonly factors: readonly Factor[]
  readonly cells: CellColumns
  /** Shape (venues); null where no author of the venue is known or cells came ready-made. */
  readonly variation: readonly (AuthorVariation | null)[]
  /** null where no survey asks for it, and where cells came ready-made. */
  readonly hindsight: Hindsight | null
  /** null, with the reason, where no coding audit asks for it or it can't be had. */
  readonly labels: CellLabels | null
  readonly noLabels: NoLabels | null
  /** Of known authors; empty where cells came ready-made. So with the three after it. */
  readonly staying: readonly StayingRow[]
  readonly extremes: readonly ExtremeRow[]
  /** Empty where no thread is mapped. */
  readonly pull: readonly PullRow[]
  /** null where no benchmark asks for it. */
  readonly segments: SegmentTable | null
  readonly concentration: readonly ConcentrationRow[]
  readonly authors: AuthorCounts
  readonly accounting: Accounting
}

/** What a fit needs of them. */
export type FitTables = Pick<IntakeTables, 'factors' | 'cells' | 'variation'> & { readonly timeline: Pick<Timeline, 'steps' | 'stepDays'> }
