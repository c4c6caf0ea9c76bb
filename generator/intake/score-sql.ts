import type { ScoreReading } from '../account/account.ts'
import { literal } from './database.ts'
import { foldedSql } from './labels.ts'
import { foldValue } from './level-names.ts'

/** Scores are summed as whole numbers of this many parts, so that no sum depends on its order. */
export const scorePart = 1e-9
/** How many of them 1 is. */
export const scoreParts = 1e9

export interface ScoreSql {
  /** BIGINT of score parts, in [-1e9, 1e9], or NULL. */
  readonly score: string
  /** BOOLEAN: a number was read and lies outside the range. */
  readonly outside: string
}

/**
 * How the text of a score is read: as one of the labels, or as a number of the range.
 *
 * @param decimalCommas - whether `3,5` is a number: not where commas part the fields
 */
export function scoreSql(text: string, reading: ScoreReading, decimalCommas: boolean): ScoreSql {
  if (reading.kind === 'range') {
    const withPoint = `CASE WHEN regexp_full_match(${text}, '\\s*[-+]?\\d+,\\d+\\s*') THEN replace(${text}, ',', '.') ELSE ${text} END`
    const number = `TRY_CAST(${decimalCommas ? withPoint : text} AS DOUBLE)`
    const inside = `${number} BETWEEN ${Math.min(reading.low, reading.high)} AND ${Math.max(reading.low, reading.high)}`
    const placed = `(${number} - ${signed(reading.low)}) / ${signed(reading.high - reading.low)}`
    return { score: `CASE WHEN ${inside} THEN CAST(round((2 * ${placed} - 1) * ${scoreParts}) AS BIGINT) END`, outside: `(isfinite(${number}) AND NOT ${inside})` }
  }
  const branches = (spelling: (label: string) => string): string =>
    reading.labels.map(({ label, score }) => `WHEN ${literal(spelling(label))} THEN ${Math.round(score * scoreParts)}`).join(' ')
  // Spelled as in the account nearly always: only the others are folded.
  return { score: `CASE ${text} ${branches((label) => label)} ELSE CASE ${foldedSql(text)} ${branches(foldValue)} END END::BIGINT`, outside: 'false' }
}

function signed(value: number): string {
  return `CAST(${value} AS DOUBLE)`
}
