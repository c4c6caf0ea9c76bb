import type { Root } from 'hast'

/** What compose hands to render: a sanitised tree without a picture in it, and what frames it. */
export interface Document {
  /**
   * Each chart stands as `<figure class="chart" role="group" data-chart="NAME" data-alt="computed text alternative">` with its
   * `<figcaption>`; render draws it in and removes the two data attributes.
   */
  readonly tree: Root
  readonly title: string
  /** BCP 47 tag of the wording, e.g. `en-GB`. */
  readonly lang: string
  readonly headings: readonly Heading[]
}

export interface Heading {
  readonly depth: number
  /** Stable over languages: the name of the section or of the message it is worded by. */
  readonly id: string
  readonly text: string
}
