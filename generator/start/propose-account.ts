import type { Grid } from '../calendar/grid.ts'
import { dayNumber } from '../calendar/days.ts'
import { lastWholePeriod, type Reporting } from '../calendar/periods.ts'
import { timeline, type DateRange } from '../calendar/timeline.ts'
import { foldValue, tidyValue } from '../intake/level-names.ts'
import { numbersOf } from './column-profile.ts'
import { proposeLocale, type LocaleProposal } from './language.ts'
import type { ColumnProposals } from './propose-columns.ts'
import { counted } from './role-rules.ts'
import { readLabels, readRange, type LabelReading, type RangeReading, type Tally } from './score-forms.ts'
import type { FileTally, ValueTally } from './tally-columns.ts'

/** An account as proposed for one file of mentions. */
export interface AccountProposal {
  readonly columns: ColumnProposals
  readonly tally: FileTally
  /** null where no column of scores is proposed or its values are on no usual scale. */
  readonly score: LabelReading | RangeReading | null
  /** The brand, and whose name it is. */
  readonly brand: { readonly name: string; readonly rows: number; readonly others: Tally } | null
  readonly venues: readonly LevelProposal[]
  /** Empty also where there are too many to be listed. */
  readonly topics: readonly LevelProposal[]
  readonly axis: AxisProposal
  /** What the program takes where the account says nothing; null where no whole period is there yet. */
  readonly base: DateRange | null
  readonly locale: LocaleProposal
}

/** A venue or topic: the spellings that differ in case and spacing alone are one. */
export interface LevelProposal {
  readonly name: string
  readonly label: string
  readonly values: readonly string[]
  readonly rows: number
}

export interface AxisProposal {
  readonly grid: Grid
  readonly reporting: Reporting
  /** In words, for the account file. */
  readonly reason: string
}

/** Names of a column with more of them are not listed. */
const mostListed = { venue: 60, topic: 40 } as const

/** Everything that the file says about its account, once it has been counted whole. */
export function proposeAccount(columns: ColumnProposals, tally: FileTally, decimalCommas: boolean): AccountProposal {
  const { values, times, rows } = tally
  const score = scoreOf(values.get('score'), decimalCommas)
  const axis = chooseAxis(times === null ? null : { first: dayNumber(times.most.first), last: dayNumber(times.most.last) }, rows)
  const names = [...columns.columns.map(({ column }) => column.name), ...columns.unused.map(({ name }) => name)]
  return {
    columns, tally, score, brand: brandOf(values.get('brand')),
    venues: listed(values.get('venue'), mostListed.venue), topics: listed(values.get('topic'), mostListed.topic),
    axis, base: times === null ? null : baseOf(axis, dayNumber(times.first), dayNumber(times.last)),
    locale: proposeLocale(names, score?.kind === 'labels' ? score.labels.map(({ label }) => label) : [], times?.format ?? null),
  }
}

function baseOf({ grid, reporting }: AxisProposal, firstDay: number, last: number): DateRange | null {
  const review = lastWholePeriod(reporting, last)
  const end = dayNumber(review.end)
  return end < firstDay ? null : timeline({ grid, reporting, base: null, firstDay, lastDay: Math.min(last, end), review }).base
}

function scoreOf(values: ValueTally | undefined, decimalCommas: boolean): LabelReading | RangeReading | null {
  if (values === undefined) return null
  const labels = readLabels(values.tally)
  if (labels !== null) return labels
  const numbers = numbersOf(values.tally, values.tally.reduce((sum, { rows }) => sum + rows, 0), decimalCommas)
  return numbers === null ? null : readRange(numbers)
}

function brandOf(values: ValueTally | undefined): AccountProposal['brand'] {
  const [most, ...others] = values?.tally ?? []
  return most === undefined ? null : { name: most.value, rows: most.rows, others }
}

function listed(values: ValueTally | undefined, most: number): readonly LevelProposal[] {
  return values === undefined || values.distinct > most ? [] : proposeLevels(values.tally)
}

/**
 * A name of our own for each value, the most frequent first; no name is another's value.
 *
 * @example proposeLevels([{ value: 'Island board', rows: 2 }])[0].name // => 'island-board'
 */
export function proposeLevels(tally: Tally): readonly LevelProposal[] {
  const byValue = new Map<string, { values: string[]; rows: number }>()
  for (const { value, rows } of tally) {
    const tidy = tidyValue(value).trim()
    if (tidy === '') continue
    const folded = foldValue(tidy)
    const entry = byValue.get(folded) ?? { values: [], rows: 0 }
    if (!entry.values.includes(tidy)) entry.values.push(tidy)
    entry.rows += rows
    byValue.set(folded, entry)
  }
  const taken = new Set(byValue.keys())
  return [...byValue].map(([folded, { values, rows }], index) => {
    const plain = slug(values[0]!) || `level-${index + 1}`
    let name = plain
    for (let number = 2; name !== folded && taken.has(name); number++) name = `${plain}-${number}`
    taken.add(name)
    return { name, label: labelOf(values[0]!), values, rows }
  })
}

/** Letters, digits and hyphens of a text, in lower case. @example slug('Île-de-France!') // => 'ile-de-france' */
export function slug(text: string): string {
  return text.normalize('NFKD').replace(/\p{M}/gu, '').toLowerCase().replace(/[^a-z0-9]+/g, '-').replace(/^-+|-+$/g, '').slice(0, 60).replace(/-+$/, '')
}

function labelOf(value: string): string {
  const [first = '', ...rest] = value
  return first.toUpperCase() + rest.join('')
}

/** Mentions a week below which months are steadier, and above which days can be told apart. */
const [thin, thick] = [10, 200]
const twoYears = 730

/**
 * The step of the time axis and what a review covers, by how long and how thick the mentions are.
 *
 * @param span - day numbers between which all but a few of the mentions lie; null where no time could be read
 */
export function chooseAxis(span: { readonly first: number; readonly last: number } | null, rows: number): AxisProposal {
  if (span === null) return { grid: 'week', reporting: 'month', reason: 'the usual: no time could be read' }
  const days = span.last - span.first + 1
  const perWeek = Math.round(7 * rows / Math.max(7, days))
  const reason = `about ${counted(perWeek, 'mention')} a week over ${counted(days, 'day')}`
  // a review of a month wants one that is there whole
  const reporting = dayNumber(lastWholePeriod('month', span.last).start) >= span.first ? 'month' : 'week'
  if (perWeek < thin && days >= twoYears) return { grid: 'month', reporting: 'quarter', reason: `${reason}: few, and months are steadier` }
  return { grid: days < 28 && perWeek >= thick ? 'day' : 'week', reporting, reason: reporting === 'month' ? reason : `${reason}: no whole month yet` }
}
