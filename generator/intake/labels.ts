import type { NoLabels } from '../../model/intake/intake-tables.ts'
import type { Account, MentionSource, ScoreReading } from '../account/account.ts'
import { literal } from './database.ts'
import { byText, foldValue } from './level-names.ts'

/** The labels that scores are coded by, alike in every source that has labels. */
export interface LabelSet {
  /** As the first source writes them, in the order of their scores and then of their names; a label's number is its index. */
  readonly names: readonly string[]
  /** In [-1, 1]. */
  readonly scores: readonly number[]
}

/** The labels of an account, or why it has none that could be counted by cell. */
export function labelSet(account: Account): LabelSet | NoLabels {
  if (account.mentions.some((source) => source.kind === 'cells')) return 'ready-made'
  const readings = account.mentions.filter((source): source is MentionSource => source.kind === 'mentions').map((source) => source.score)
  const labelled = readings.filter((reading) => reading.kind === 'labels').map((reading) => reading.labels)
  // a source scored by a range has no labels: its mentions are left as they are
  if (labelled.length === 0) return 'ranges'
  const told = (labels: (typeof labelled)[number]): string => JSON.stringify(labels.map(({ label, score }) => [foldValue(label), score]).sort(([a], [b]) => byText(String(a), String(b))))
  if (new Set(labelled.map(told)).size > 1) return 'labels-differ'
  const sorted = [...labelled[0]!].sort((a, b) => a.score - b.score || byText(a.label, b.label))
  return { names: sorted.map(({ label }) => label), scores: sorted.map(({ score }) => score) }
}

/** SQL of the number of the label that a text is, or NULL; read as its score is. */
export function labelSql(text: string, reading: ScoreReading, { names }: LabelSet): string {
  if (reading.kind === 'range') return 'NULL'
  const numbers = new Map(names.map((name, number) => [foldValue(name), number]))
  const labels = reading.labels.map(({ label }) => label)
  const branches = (spelling: (label: string) => string): string => labels.map((label) => `WHEN ${literal(spelling(label))} THEN ${numbers.get(foldValue(label))!}`).join(' ')
  return `CASE ${text} ${branches((label) => label)} ELSE CASE ${foldedSql(text)} ${branches(foldValue)} END END`
}

/** SQL of a text as `foldValue` has it. */
export function foldedSql(text: string): string {
  return `lower(trim(regexp_replace(${text}, '\\s+', ' ', 'g')))`
}
