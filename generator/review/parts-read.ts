import type { Account } from '../account/account.ts'
import { isRead } from '../compose/own-file.ts'
import { ownPlace } from '../render/charts/chart-spec.ts'
import type { House } from './house.ts'

/** A part of a review that an account may have of its own. */
export interface PartRead {
  readonly part: 'template' | 'sections' | 'charts' | 'words' | 'theme' | 'notes'
  /** Relative to the account's folder, sorted; empty where the house's is taken, and of notes where there are none. */
  readonly files: readonly string[]
}

/** What was read of an account for how its review is made, part by part. */
export function partsRead({ template: accountTemplate }: Pick<Account, 'template'>, { template, charts, ownCharts, words, theme }: House): readonly PartRead[] {
  const { review, sections, ownSections, included, notes } = template
  const parts: readonly PartRead[] = [
    { part: 'template', files: accountTemplate === null ? [] : [review.place, ...Object.values(included).filter(isRead).map(({ place }) => place)] },
    { part: 'sections', files: ownSections.map((name) => sections[name].place) },
    { part: 'charts', files: ownCharts.flatMap((name) => charts.get(name)?.[ownPlace] ?? []) },
    { part: 'words', files: words.own === undefined ? [] : [words.own.place] },
    { part: 'theme', files: theme.files },
    { part: 'notes', files: Object.values(notes).map(({ place }) => place) },
  ]
  return parts.map(({ part, files }) => ({ part, files: [...new Set(files)].sort() }))
}
