import { closest } from 'fastest-levenshtein'
import type { Account, MentionSource } from '../account/account.ts'
import { placeOf } from '../account/yaml-places.ts'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault } from '../faults/fault.ts'

/** A trait by which authors are to be counted, with the names of its levels. */
export interface MarginWish {
  /** A factor of the account, or one of its mapped columns. */
  readonly margin: string
  /** Values that are spelled like one of these, but for case and spacing, take its name. */
  readonly levels: readonly string[]
}

/** Columns that say something of one post or person: nobody is counted by these. */
const single: readonly string[] = ['id', 'posted_at', 'score', 'author', 'text', 'brand', 'thread', 'reply_to', 'thread_position']

/**
 * The columns that are read for margins alone, not being factors.
 *
 * @throws {InputFault} `benchmark-margin-unmapped`, for every margin that no source has a column for; not where all
 *   cells come ready-made, of which nobody can be counted anyway
 */
export function traitsOf(account: Account, margins: readonly MarginWish[]): readonly string[] {
  const sources = account.mentions.filter((source): source is MentionSource => source.kind === 'mentions')
  if (sources.length === 0) return []
  const known = [...new Set([...account.factors, ...sources.flatMap((source) => Object.keys(source.columns))])].filter((column) => !single.includes(column))
  const unmapped = margins.filter(({ margin }) => !known.includes(margin))
  if (unmapped.length > 0) {
    throw new InputFault(unmapped.map(({ margin }) =>
      faultOf('benchmark-margin-unmapped', placeOf(account.places, ['benchmark', 'files']), { margin, known, nearest: closest(margin, known) })))
  }
  return [...new Set(margins.map(({ margin }) => margin))].filter((margin) => !account.factors.includes(margin))
}
