import { h } from 'hastscript'
import type { Element } from 'hast'
import type { Findings } from '../../model/findings/schema.ts'
import type { Logo, Theme } from '../theme/theme.ts'
import { period } from '../words/dates.ts'
import type { Words } from '../words/words.ts'

/** Whose review it is, of when, and by whom: what a cover and running heads may say. */
export interface Imprint {
  readonly brand: string
  /** As people say it: `October 2026`. */
  readonly period: string
  readonly preparedBy: string | null
  readonly reviewedBy: string | null
}

export function imprintOf({ brand, period: reviewed, method }: Findings, words: Words): Imprint {
  return { brand, period: period(reviewed.name, words), preparedBy: method.prepared_by, reviewedBy: method.reviewed_by }
}

/**
 * What stands before the document: the cover, on paper only, and the logo on the first page.
 *
 * @returns nothing where the theme asks for neither
 */
export function frontOf({ cover, logo }: Theme, imprint: Imprint, words: Words): readonly Element[] {
  return [...(cover ? [coverOf(logo, imprint, words)] : []), ...(logo === null ? [] : [h('p.logo', [pictureOf(logo)])])]
}

/** No finding stands here: whoever sees only the cover learns nothing of the brand. */
function coverOf(logo: Logo | null, imprint: Imprint, words: Words): Element {
  const people = words.say('cover-people', {
    preparing: imprint.preparedBy === null ? 'none' : 'given', prepared: imprint.preparedBy ?? '',
    reviewing: imprint.reviewedBy === null ? 'none' : 'given', reviewed: imprint.reviewedBy ?? '',
  })
  return h('div.cover', [
    ...(logo === null ? [] : [h('p', [pictureOf(logo)])]),
    h('p.cover-brand', imprint.brand), h('p.cover-title', words.say('overline')), h('p.cover-period', imprint.period), h('p.cover-people', people),
  ])
}

function pictureOf({ address, alt }: Logo): Element {
  return h('img', { src: address, alt })
}
