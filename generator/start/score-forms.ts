import { foldValue } from '../intake/level-names.ts'

/** How many rows have a value, the most frequent first. */
export type Tally = readonly { readonly value: string; readonly rows: number }[]

export interface LabelReading {
  readonly kind: 'labels'
  /** As the file spells them, the most frequent spelling of each, by score. */
  readonly labels: readonly { readonly label: string; readonly score: number; readonly rows: number }[]
  /** Values that are no known label: an analyst says what they count. */
  readonly unknown: Tally
}

export interface RangeReading {
  readonly kind: 'range'
  readonly low: number
  readonly high: number
  /** How surely these are the ends of the scale, in [0, 1]. */
  readonly weight: number
}

/** Words of praise and blame in the seven languages of column-names.ts. */
const polarities: readonly (readonly [number, RegExp])[] = [
  [-1, /^(neg|negativ[eoa]?|negatie?f|bad|schlecht|minus|-)$/],
  [0, /^(neu|neut|neutral|neutre|neutr[oa]|neutrale|neutraal|0)$/],
  [1, /^(pos|positiv[eoa]?|positie?f|good|gut|plus|\+)$/],
]
const stronger = /^(very|strongly|sehr|stark|tres|muy|muito|molto|zeer) /

/** The score of a label, and whether it is a strong one; null for no known label. @example labelMeaning('sehr négatif') // => { sign: -1, strong: true } */
export function labelMeaning(value: string): { readonly sign: number; readonly strong: boolean } | null {
  const folded = foldValue(value).normalize('NFKD').replace(/\p{M}/gu, '').replace(/[_-]+(?=\p{L})/gu, ' ').trim()
  const strong = stronger.test(folded)
  const sign = polarities.find(([, words]) => words.test(folded.replace(stronger, '')))?.[0]
  return sign === undefined || (strong && sign === 0) ? null : { sign, strong }
}

/** The labels among the values of a column: words, or -1, 0 and 1; null where there are not two of them. */
export function readLabels(tally: Tally): LabelReading | null {
  const folded = new Map<string, { value: string; rows: number }>()
  for (const { value, rows } of tally) {
    const known = folded.get(foldValue(value))
    if (known === undefined) folded.set(foldValue(value), { value: value.trim(), rows })
    else known.rows += rows
  }
  const values = [...folded.values()].filter(({ value }) => value !== '')
  const signs = values.every(({ value }) => /^[+-]?[01]$/.test(value)) && values.some(({ value }) => value === '-1')
  const meanings = values.map(({ value }) => (signs ? { sign: Number(value), strong: false } : labelMeaning(value)))
  // where some labels are strong ones, the others count half
  const half = meanings.some((meaning) => meaning?.strong === true)
  const labels = values.flatMap(({ value, rows }, index) => {
    const meaning = meanings[index]!
    return meaning === null ? [] : [{ label: value, score: half && !meaning.strong ? meaning.sign / 2 : meaning.sign, rows }]
  }).sort((a, b) => a.score - b.score)
  const unknown = values.filter((_, index) => meanings[index] === null)
  return new Set(labels.map(({ score }) => score)).size < 2 ? null : { kind: 'labels', labels, unknown }
}

export interface NumberSummary {
  readonly low: number
  readonly high: number
  readonly whole: boolean
  readonly distinct: number
}

/** The scale that numbers are likely to be on, by the smallest and the largest of them; null where it is none of the usual ones. */
export function readRange({ low, high, whole, distinct }: NumberSummary): RangeReading | null {
  const range = (from: number, to: number, weight: number): RangeReading => ({ kind: 'range', low: from, high: to, weight })
  if (distinct < 2) return null
  if (low < 0) return low >= -1 && high <= 1 ? range(-1, 1, whole ? 0.7 : 0.8) : low >= -100 && high <= 100 && high > 1 ? range(-100, 100, 0.7) : null
  if (low >= 1 && high <= 5 && high > 2) return range(1, 5, distinct <= 9 ? 0.75 : 0.6)
  if (high <= 1) return range(0, 1, whole ? 0.4 : 0.5)
  return high <= 5 ? range(0, 5, 0.5) : high <= 10 ? range(low >= 1 ? 1 : 0, 10, 0.5) : high <= 100 ? range(0, 100, 0.5) : null
}
