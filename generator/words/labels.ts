import type { Words } from './words.ts'

/** A level of a factor, as the findings and the tables name it. */
export interface NamedLevel {
  readonly label: string
  readonly venue?: string
  readonly topic?: string
  readonly poster?: string
  readonly level?: string
  /** A series compared with the survey; of a venue's own the label tells which. */
  readonly series?: string
}

/**
 * The label of a level. The account's own label is kept; a level that has none but its name (the poster classes,
 * a mention without a topic) is worded by the catalogue, if it knows the name, and else begins with a capital where the data have none.
 */
export function levelLabel(level: NamedLevel, words: Words): string {
  if (level.series !== undefined && words.has(`series-${level.series}`)) return words.say(`series-${level.series}`)
  const name = level.venue ?? level.topic ?? level.poster ?? level.level ?? level.label
  const key = `level-${name}`
  if (level.label !== name) return level.label
  return words.has(key) ? words.say(key) : capitalised(level.label, words.locale)
}

/** For display only: `lost property` reads `Lost property`; a name with capitals of its own (`iPhone`) stays. */
function capitalised(label: string, locale: string): string {
  const [first = '', ...rest] = label
  return label === label.toLocaleLowerCase(locale) ? [first.toLocaleUpperCase(locale), ...rest].join('') : label
}

/** A factor's name: `venue` is worded, one that the account adds stays as it is. */
export function factorName(factor: string, words: Words): string {
  return words.has(`factor-${factor}`) ? words.say(`factor-${factor}`) : factor
}

/** A part of a decomposition in words; the mix of a factor that the account adds is worded by the factor's name. */
export function partName(part: string, words: Words): string {
  if (words.has(`part-${part}`)) return words.say(`part-${part}`)
  return part.endsWith('_mix') ? words.say('part-factor_mix', { factor: factorName(part.slice(0, -'_mix'.length), words) }) : part
}
