import type { Words } from './words.ts'

/** A level of a factor, as the findings and the tables name it. */
export interface NamedLevel {
  readonly label: string
  readonly venue?: string
  readonly topic?: string
  readonly poster?: string
  readonly level?: string
}

/**
 * The label of a level. The account's own label is kept; a level that has none but its name (the poster classes,
 * a mention without a topic) is worded by the catalogue, if it knows the name.
 */
export function levelLabel(level: NamedLevel, words: Words): string {
  const name = level.venue ?? level.topic ?? level.poster ?? level.level ?? level.label
  const key = `level-${name}`
  return level.label === name && words.has(key) ? words.say(key) : level.label
}
