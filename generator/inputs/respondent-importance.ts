import { distance } from 'fastest-levenshtein'
import type { Account } from '../account/account.ts'
import { inputExpectations as expected } from '../faults/catalogue-inputs.ts'
import { faultOf } from '../faults/catalogue.ts'
import type { Fault } from '../faults/fault.ts'
import { spellingsOf } from './account-names.ts'
import { columnName, type CsvHeader, type CsvRow } from './csv-table.ts'
import type { RawImportance } from './raw-inputs.ts'
import { rowReader } from './row-reader.ts'

/** Topics by the columns that may hold their ratings: their names, spellings and labels. */
export function topicColumns(account: Account): ReadonlyMap<string, string> {
  const columns = new Map<string, string>()
  for (const [spelling, topic] of spellingsOf(account.topics)) if (!columns.has(columnName(spelling))) columns.set(columnName(spelling), topic)
  for (const reserved of ['overall', 'topic', 'weight']) columns.delete(reserved)
  return columns
}

/** A column that holds the ratings of a topic. */
export interface RatedTopic {
  readonly column: string
  readonly topic: string
}

/** The columns of a file that rate topics, in the order of the file. */
export function ratedTopics(header: CsvHeader, topics: ReadonlyMap<string, string>): readonly RatedTopic[] {
  return header.names.map(columnName).flatMap((column) => {
    const topic = topics.get(column)
    return topic === undefined ? [] : [{ column, topic }]
  })
}

/** Fewer topics would not compete for what they explain. */
const fewestTopics = 2

/** What is wrong with the columns of a file of respondents. */
export function respondentColumnFaults(header: CsvHeader, topics: ReadonlyMap<string, string>): readonly Fault[] {
  const rated = ratedTopics(header, topics)
  const misspelled = misspelledTopics(header, topics, new Set(rated.map(({ topic }) => topic)))
  if (misspelled.length > 0) return misspelled
  const twice = rated.filter(({ topic }, index) => rated.findIndex((other) => other.topic === topic) < index)
  if (twice.length > 0) return twice.map(({ topic }) => faultOf('header-twice', header.place, { column: topic }))
  return rated.length >= fewestTopics ? [] : [faultOf('importance-topics', header.place, { header: header.names, topics: [...new Set(topics.values())] })]
}

/** Columns that mean nothing are passed over, but one that is a letter in four away from a topic without column would be missed. */
function misspelledTopics(header: CsvHeader, topics: ReadonlyMap<string, string>, rated: ReadonlySet<string>): readonly Fault[] {
  const absent = [...topics].filter(([, topic]) => !rated.has(topic))
  const other = header.names.filter((name) => !header.columns.includes(columnName(name)))
  return other.flatMap((name) => {
    const near = absent.find(([column]) => distance(columnName(name), column) <= Math.floor(column.length / 4))
    return near === undefined ? [] : [faultOf('importance-misspelled', `${header.place} ${name}`, { column: name, nearest: near[0] })]
  })
}

/** Answers of one respondent: overall first, then by topic; NaN where there is none. */
export interface RespondentRow {
  readonly answers: readonly number[]
}

/** Reads a row of answers, or tells everything that is wrong with it. */
export function respondentRowOf(rated: readonly RatedTopic[]): (row: CsvRow) => RespondentRow | readonly Fault[] {
  return (row) => {
    const read = rowReader(row)
    const answers = ['overall', ...rated.map(({ column }) => column)]
      .map((column) => (row.field(column) === '' ? Number.NaN : read.number(column, () => true, expected.answer)))
    return read.faults.length > 0 ? read.faults : { answers }
  }
}

/** Relative weights of fewer respondents would be mostly chance. */
const fewestRespondents = 30

const isComplete = ({ answers }: RespondentRow): boolean => !answers.some(Number.isNaN)

/** Too few respondents. @param place - of the whole */
export function respondentFaults(rows: readonly RespondentRow[], place: string): readonly Fault[] {
  const complete = rows.filter(isComplete).length
  if (complete >= fewestRespondents) return []
  return [faultOf('importance-short', place, { complete, incomplete: rows.length - complete, needed: fewestRespondents })]
}

/** Those who answered everything. @param topics - in the order of the answers after the first */
export function respondentImportance(rows: readonly RespondentRow[], topics: readonly string[]): RawImportance {
  const complete = rows.filter(isComplete)
  const answersAt = (index: number): Float64Array => Float64Array.from(complete, ({ answers }) => answers[index]!)
  return {
    input: { kind: 'respondents', topics, overall: answersAt(0), ratings: topics.map((_, index) => answersAt(index + 1)) },
    incomplete: rows.length - complete.length,
  }
}
