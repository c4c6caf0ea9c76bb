/** A file of a template: its text, and how faults name it (`templates/sections/opinion.md`). */
export interface Source {
  readonly place: string
  readonly text: string
}

/** A template as it was read: sources only, so that it can be written down, and compose stays pure. */
export interface Template {
  /** The list of sections, and whatever stands between them. */
  readonly review: Source
  /** By name; those that `review` may call. */
  readonly sections: Readonly<Record<string, Source>>
  /** Which figures each worded sentence is given. */
  readonly sentences: Source
}
