/** A file of a template: its text, and how faults name it (`templates/sections/opinion.md`). */
export interface Source {
  readonly place: string
  readonly text: string
}

/** A file of the account that is not to be had, and why. */
export interface Unread {
  readonly place: string
  readonly unread: 'absent' | 'outside' | 'large' | 'no-text' | 'nested' | 'kind'
}

/** A template as it was read: sources only, so that it can be written down, and compose stays pure. */
export interface Template {
  /** The list of sections, and whatever stands between them. */
  readonly review: Source
  /** The house's own review, whose order `::house` keeps to; the same as `review` where the account has none. */
  readonly house: Source
  /** By name; those that `review` may call. */
  readonly sections: Readonly<Record<string, Source>>
  /** Names of the sections that are files of the account: each must be called. */
  readonly ownSections: readonly string[]
  /** Which figures each worded sentence is given. */
  readonly sentences: Source
  /** The files that `::include` names, by what it names them. */
  readonly included: Readonly<Record<string, Source | Unread>>
  /** The analyst's notes, by the name of their period. */
  readonly notes: Readonly<Record<string, Source>>
}
