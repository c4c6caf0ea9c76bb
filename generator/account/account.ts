import type { DateRange } from '../calendar/timeline.ts'
import type { Grid } from '../calendar/grid.ts'
import type { Reporting } from '../calendar/periods.ts'

/** account.yaml as one value: read once, checked whole, with every default filled in. */
export interface Account {
  /** Absolute path of the account folder, links resolved. */
  readonly folder: string
  readonly account: string
  readonly brand: string
  /** Other brands whose rows the same files hold. */
  readonly competitors: readonly string[]
  readonly locale: string
  readonly timeZone: string
  readonly grid: Grid
  readonly reporting: Reporting
  /** null: the first 12 months of mentions. */
  readonly base: DateRange | null
  readonly interval: number
  readonly mentions: readonly Source[]
  /** `venue` first. */
  readonly factors: readonly string[]
  readonly venues: readonly LevelEntry[]
  readonly topics: readonly LevelEntry[]
  /** Most mentions in 90 days that an `occasional` and a `regular` author may have. */
  readonly posters: { readonly occasional: number; readonly regular: number }
  readonly targetMix: readonly TargetMargin[]
  readonly survey: SurveySource | null
  readonly benchmark: FileSet | null
  /** How many customers the brand has; null where the account does not say. */
  readonly customers: number | null
  readonly codingAudit: FileSet | null
  readonly importance: FileSet | null
  readonly events: FileSet | null
  readonly outcome: FileSet | null
  /** Paths relative to the folder; null for the house's own. */
  readonly template: string | null
  readonly theme: string | null
  readonly notes: string | null
  readonly words: string | null
  readonly preparedBy: string | null
  readonly reviewedBy: string | null
  /** Whether one person may both prepare a review and review it before it is sealed. */
  readonly onePersonSeals: boolean
  /** Fewest authors of a group that may be shown. */
  readonly smallestGroup: number
  /** Place of every key, by its path: `venues.boards` is at `account.yaml:12:3 venues.boards`. */
  readonly places: Readonly<Record<string, string>>
}

/** The files that a pattern matched: relative to the account folder, sorted, at least one. */
export interface FileSet {
  readonly pattern: string
  readonly files: readonly string[]
}

export interface SurveySource extends FileSet {
  /** The metric compared with opinion; null: the only one that the files have. */
  readonly headline: string | null
  /** Smallest and largest lag looked at, in steps; above 0 the posts lead. */
  readonly lags: readonly [number, number]
  /** What a metric is called in the review, by its name in the files. */
  readonly labels: Readonly<Record<string, string>>
  /** null: one usual spacing after the last wave. */
  readonly nextFieldwork: DateRange | null
}

export type Source = MentionSource | CellSource

export interface CellSource extends FileSet {
  readonly kind: 'cells'
  readonly delimiter: string | null
  readonly quote: string | null
}

/** Mentions one a row; `columns` maps our name of a column to the file's. */
export interface MentionSource extends FileSet {
  readonly kind: 'mentions'
  readonly columns: Readonly<Record<string, string>>
  readonly score: ScoreReading
  readonly delimiter: string | null
  readonly quote: string | null
  /** strptime form of `posted_at`; null for ISO 8601 and epochs. */
  readonly timeFormat: string | null
}

export type ScoreReading =
  | { readonly kind: 'labels'; readonly labels: readonly { readonly label: string; readonly score: number }[] }
  /** `low` counts as -1 and `high` as 1. */
  | { readonly kind: 'range'; readonly low: number; readonly high: number }

/** A venue or topic of the account; `values` are the spellings in the data that mean it. */
export interface LevelEntry {
  readonly name: string
  readonly label: string
  readonly values: readonly string[]
  readonly anchor: boolean
  readonly costPerAuthor: number | null
}

export interface TargetMargin {
  readonly factor: string
  readonly shares: readonly { readonly level: string; readonly share: number }[]
}
