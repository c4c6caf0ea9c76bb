import type { Account } from '../account/account.ts'
import { faultOf } from '../faults/catalogue.ts'
import type { Fault } from '../faults/fault.ts'
import type { CsvTable } from './csv-table.ts'
import type { RawImportance } from './raw-inputs.ts'
import { notGiven, readTables, soundRows, type Input } from './read-rows.ts'
import { ratedTopics, respondentColumnFaults, respondentFaults, respondentImportance, respondentRowOf, topicColumns } from './respondent-importance.ts'
import { statedImportance, weightFaults, weightRowOf } from './stated-importance.ts'

type Form = 'stated' | 'respondents'
type Topics = ReadonlyMap<string, string>
type Reading = Pick<Input<RawImportance>, 'value' | 'faults'>

/**
 * Read how much each topic matters: as weights that somebody states (`topic`, `weight`), or as answers of respondents
 * (`overall`, and a column a topic), from which the model works weights out. The header tells which.
 */
export async function readImportance(account: Account): Promise<Input<RawImportance>> {
  if (account.importance === null) return notGiven
  const topics = topicColumns(account)
  const { value: tables, files, faults } = await readTables(account, account.importance, { needed: [], optional: ['topic', 'weight', 'overall', ...topics.keys()] })
  const wrong = [...faults, ...formFaults(tables, topics)]
  if (wrong.length > 0 || tables.length === 0) return { value: null, files, faults: wrong }
  const read = formOf(tables[0]!) === 'stated' ? readStated(account, tables) : readRespondents(tables, topics)
  return { ...read, files }
}

function formOf({ header: { columns } }: CsvTable): Form | null {
  if (columns.includes('topic') && columns.includes('weight')) return 'stated'
  return columns.includes('overall') ? 'respondents' : null
}

function formFaults(tables: readonly CsvTable[], topics: Topics): readonly Fault[] {
  return tables.flatMap((table) => {
    const form = formOf(table)
    const { place, names } = table.header
    const other = tables.find((first) => formOf(first) !== null && formOf(first) !== form)
    if (form === null) return [faultOf('importance-columns', place, { header: names, topics: [...new Set(topics.values())] })]
    if (other !== undefined && tables.indexOf(other) < tables.indexOf(table)) return [faultOf('importance-forms', place, { first: other.header.place })]
    return form === 'respondents' ? respondentColumnFaults(table.header, topics) : []
  })
}

function readStated(account: Account, tables: readonly CsvTable[]): Reading {
  const sound = tables.map((table) => soundRows(table, weightRowOf(account)))
  const rows = sound.flatMap((each) => each.rows)
  const place = tables[0]!.path
  const faults = [...sound.flatMap((each) => each.faults), ...weightFaults(rows, place)]
  if (faults.length > 0) return { value: null, faults }
  if (rows.length === 0) return { value: null, faults: [faultOf('input-empty', place, { needed: ['topic', 'weight'] })] }
  return { value: { input: statedImportance(rows), incomplete: 0 }, faults }
}

function readRespondents(tables: readonly CsvTable[], topics: Topics): Reading {
  const rated = tables.map(({ header }) => ratedTopics(header, topics))
  const names = rated.map((columns) => columns.map(({ topic }) => topic))
  const order = names[0]!
  const others = tables.filter((_, index) => !sameNames(names[index]!, order))
  if (others.length > 0) return { value: null, faults: others.map((table) => faultOf('importance-differ', table.header.place, { topics: names[tables.indexOf(table)]!, others: order, first: tables[0]!.header.place })) }
  // Files may hold the topics in an order of their own.
  const sound = tables.map((table, index) => soundRows(table, respondentRowOf(order.map((topic) => rated[index]!.find((each) => each.topic === topic)!))))
  const rows = sound.flatMap((each) => each.rows)
  const faults = sound.flatMap((each) => each.faults)
  const wrong = faults.length > 0 ? faults : respondentFaults(rows, tables[0]!.path)
  return { value: wrong.length > 0 ? null : respondentImportance(rows, order), faults: wrong }
}

function sameNames(one: readonly string[], other: readonly string[]): boolean {
  return one.length === other.length && one.every((name) => other.includes(name))
}
