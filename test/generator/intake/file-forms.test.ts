import { gzipSync } from 'node:zlib'
import { DuckDBInstance } from '@duckdb/node-api'
import { describe, expect, test } from 'vitest'
import type { IntakeTables } from '../../../model/intake/intake-tables.ts'
import { readAccount } from '../../../generator/account/read-account.ts'
import { InputFault, type Fault } from '../../../generator/faults/fault.ts'
import { readIntake, type IntakeOptions } from '../../../generator/intake/read-intake.ts'
import { withAccount } from './temporary-account.ts'

const head = 'account: demo\nbrand: Skerrow Ferries\ntime_zone: Europe/Lisbon\n'
const columns = 'columns: { id: ref, posted_at: published, venue: source, score: tone, topic: theme }'
const labels = 'score: { labels: { negative: -1, neutral: 0, positive: 1 } }'
const account = (file: string, more = '', score = labels): string => `${head}mentions:\n  - files: ${file}\n    ${columns}\n    ${score}\n${more}`

type Files = Readonly<Record<string, string | Uint8Array>>
async function intake(files: Files, options: IntakeOptions = { period: '2025-12' }): Promise<IntakeTables> {
  return withAccount(files, async (folder) => readIntake(await readAccount(folder), options))
}
async function faultsOf(files: Files, options?: IntakeOptions): Promise<readonly Fault[]> {
  const error: unknown = await intake(files, options).then(() => undefined, (reason: unknown) => reason)
  if (!(error instanceof InputFault)) throw error ?? new Error('no fault')
  return error.faults
}
const levels = (tables: IntakeTables, factor: number): readonly string[] => tables.factors[factor]!.levels.map((level) => level.name)
const sum = (values: Iterable<number>): number => [...values].reduce((total, value) => total + value, 0)

const rows = [['1', '2025-03-03T10:00:00', 'forum', 'positive', 'fares'], ['2', '2025-03-04', 'blog; "new"', 'negative', 'cais do Sodré'], ['3', '2025-03-11 12:30:00Z', 'forum', 'neutral', '']]
const header = ['ref', 'published', 'source', 'tone', 'theme']
const separated = (delimiter: string, quote = '"', end = '\n'): string =>
  [header, ...rows].map((row) => row.map((field) => `${quote}${field.replaceAll(quote, quote + quote)}${quote}`).join(delimiter)).join(end) + end

/** What every form of the same three mentions must give. */
function expectThree(tables: IntakeTables): void {
  expect(tables.accounting).toMatchObject({ received: 3, rejected: 0, modelled: 3 })
  expect(levels(tables, 0)).toEqual(['blog; "new"', 'forum'])
  expect(levels(tables, 1)).toEqual(['cais do Sodré', 'fares', 'none'])
  expect([...tables.cells.mean]).toEqual([-1, 1, 0])
}

describe('forms of files', () => {
  test.each([
    ['commas', separated(',')], ['semicolons', separated(';')], ['tabs', separated('\t')], ['bars', separated('|')],
    ['single quotes', separated(';', '\'')], ['line ends of Windows', separated(',', '"', '\r\n')], ['a byte order mark', `\uFEFF${separated(',')}`],
  ])('CSV with %s is recognised', async (_, text) => {
    expectThree(await intake({ 'account.yaml': account('a.csv'), 'a.csv': text }))
  })

  test('a stated delimiter and quote are used', async () => {
    expectThree(await intake({ 'account.yaml': account('a.csv').replace('    columns', '    delimiter: "~"\n    quote: "^"\n    columns'), 'a.csv': separated('~', '^') }))
  })

  test('compressed CSV, and two files of one pattern', async () => {
    const [first, second] = [rows.slice(0, 2), rows.slice(2)].map((some) => [header, ...some].map((row) => row.map((field) => `"${field.replaceAll('"', '""')}"`).join(',')).join('\n'))
    expectThree(await intake({ 'account.yaml': account('in/*.csv.gz'), 'in/a.csv.gz': gzipSync(first!), 'in/b[1].csv.gz': gzipSync(second!) }))
  })

  test('windows-1252 and UTF-16 are read as what they are', async () => {
    const text = separated(';').replace('cais do Sodré', 'cais do Sodré – “2”')
    const bytes: Readonly<Record<string, number>> = { '–': 0x96, '“': 0x93, '”': 0x94 }
    const western = Uint8Array.from(text, (character) => bytes[character] ?? character.charCodeAt(0))
    for (const content of [western, Buffer.from(`\uFEFF${text}`, 'utf16le')]) {
      const tables = await intake({ 'account.yaml': account('a.csv'), 'a.csv': content })
      expect(levels(tables, 1)[0]).toBe('cais do Sodré – “2”')
    }
  })

  test('NDJSON; lines that are none are counted, blank ones are not', async () => {
    const lines = rows.map((row) => JSON.stringify(Object.fromEntries(header.map((name, index) => [name, row[index]]))))
    expectThree(await intake({ 'account.yaml': account('a.ndjson'), 'a.ndjson': `${lines.join('\n\n')}\n` }))
    const broken = await intake({ 'account.yaml': account('a.ndjson'), 'a.ndjson': `${lines[0]}\n{"ref": 1,\n${lines[1]}\nnull\n${lines[2]}` })
    expect(broken.accounting).toMatchObject({ received: 5, rejected: 2, modelled: 3, reasons: { 'row-malformed': 1, 'time-unreadable': 1 } })
  })

  test('Parquet, with typed columns', async () => {
    const tables = await withAccount({ 'account.yaml': account('a.parquet', '', 'score: { range: [1, 5] }') }, async (folder) => {
      const connection = await (await DuckDBInstance.create(':memory:')).connect()
      await connection.run(`COPY (SELECT * FROM (VALUES (1, TIMESTAMPTZ '2025-03-03 10:00:00+00', 'forum', 5, 'fares'), (2, TIMESTAMPTZ '2025-03-30 23:30:00+00', 'forum', 3, NULL), (2, NULL, 'forum', 3, NULL)) AS t(ref, published, source, tone, theme)) TO '${folder}/a.parquet'`)
      return readIntake(await readAccount(folder), { period: '2025-12' })
    })
    expect(tables.accounting).toMatchObject({ received: 3, rejected: 1, modelled: 2, reasons: { 'time-unreadable': 1 } })
    // Half past eleven in the evening of Sunday by Greenwich is Monday in Lisbon's summer.
    expect([tables.timeline.steps[0], tables.timeline.steps.at(-1), ...tables.cells.mean]).toEqual(['2025-03-03', '2025-03-31', 1, 0])
  })

  test('sources with mappings of their own meet in one table, and ids are each source\'s own', async () => {
    const second = '  - files: b.csv\n    columns: { id: n, posted_at: when, venue: site, score: stars }\n    score: { range: [5, 1] }\n'
    const tables = await intake({ 'account.yaml': account('a.csv', second), 'a.csv': separated(','), 'b.csv': 'n,when,site,stars\n1,2025-03-03,reviews,5\n1,2025-03-03,reviews,1\n9,2025-03-04,reviews,2\n' })
    expect(tables.accounting).toMatchObject({ received: 6, modelled: 5, reasons: { 'same-id': 1 } })
    const reviews = tables.cells.mean.filter((_, cell) => tables.cells.levels[0]![cell] === levels(tables, 0).indexOf('reviews'))
    expect([...reviews]).toEqual([-0.25])
    expect(tables.accounting.inputs.map(({ path, rows: count, sha256 }) => [path, count, sha256.length])).toEqual([['a.csv', 3, 64], ['b.csv', 3, 64]])
  })

  test('ids whose hashes agree in their upper half alone are two', async () => {
    const connection = await (await DuckDBInstance.create(':memory:')).connect()
    const pairs = await connection.runAndReadAll("SELECT min(id), max(id) FROM (SELECT 'p' || i AS id FROM range(200000) AS t(i)) GROUP BY hash(id) >> 32 HAVING count(DISTINCT hash(id)) > 1 ORDER BY ALL LIMIT 1")
    const [one, other] = pairs.getRows()[0] as [string, string]
    const text = [one, other, one].map((id) => `${id},2025-03-03,forum,positive,\n`).join('')
    expect(one).not.toBe(other)
    expect((await intake({ 'account.yaml': account('a.csv'), 'a.csv': `ref,published,source,tone,theme\n${text}` })).accounting).toMatchObject({ modelled: 2, reasons: { 'same-id': 1 } })
  })

  test('time_format reads other forms of time', async () => {
    const yaml = account('a.csv').replace('    columns', '    time_format: "%b %d %Y"\n    columns')
    const tables = await intake({ 'account.yaml': yaml, 'a.csv': 'ref,published,source,tone,theme\n1,Jun 12 2025,forum,positive,\n2,2025-06-12,forum,positive,\n3,infinity,forum,positive,\n' })
    expect(tables.accounting).toMatchObject({ modelled: 1, reasons: { 'time-unreadable': 2 } })
    expect(tables.timeline.steps).toEqual(['2025-06-09'])
  })

  test('a zero is no time, a written-out 1970 is one', async () => {
    const times = ['0', '0.0', '-0', '00000000', '1970-01-01', '1970-01-01T00:00:00Z', '1000']
    const tables = await intake({ 'account.yaml': account('a.csv'), 'a.csv': `ref,published,source,tone,theme\n${times.map((time, index) => `${index},${time},forum,positive,\n`).join('')}` })
    expect(tables.accounting).toMatchObject({ modelled: 3, reasons: { 'time-unreadable': 4 } })
  })

  test('decimal commas are read where commas do not part the fields', async () => {
    const text = 'ref;published;source;tone;theme\n1;2025-03-03;forum;3,5;\n2;2025-03-10;forum; +5,0 ;\n3;2025-03-17;forum;4.5;\n4;2025-03-24;forum;1,2,3;\n5;2025-03-24;forum;7,5;\n'
    const tables = await intake({ 'account.yaml': account('a.csv', '', 'score: { range: [1, 5] }'), 'a.csv': text })
    expect([...tables.cells.mean]).toEqual([0.25, 1, 0.75])
    expect(tables.accounting.reasons).toEqual({ 'score-unreadable': 1, 'score-outside-range': 1 })
    const commas = await intake({ 'account.yaml': account('a.csv', '', 'score: { range: [1, 5] }'), 'a.csv': 'ref,published,source,tone,theme\n1,2025-03-03,forum,"3,5",\n2,2025-03-03,forum,3.5,\n' })
    expect(commas.accounting).toMatchObject({ modelled: 1, reasons: { 'score-unreadable': 1 } })
  })

  test.each(["it's [a].csv", 'b{1}.csv', 'c?.csv', 'd*.csv', 'e "f", g.csv', '[a-c]/h.ndjson'])('a file may be named %s', async (file) => {
    const content = file.endsWith('.csv') ? separated(',') : rows.map((row) => JSON.stringify(Object.fromEntries(header.map((name, index) => [name, row[index]])))).join('\n')
    const tables = await intake({ 'account.yaml': account(JSON.stringify(file)), [file]: content })
    expectThree(tables)
    expect(tables.accounting.inputs.map(({ path }) => path)).toEqual([file])
  })

  test('further factors are any mapped column; an empty field is none', async () => {
    const yaml = account('a.csv', 'factors: [venue, language]\n').replace('columns: {', 'columns: { language: lang,')
    const tables = await intake({ 'account.yaml': yaml, 'a.csv': 'ref,published,source,tone,theme,lang\n1,2025-03-03,forum,positive,,pt\n2,2025-03-03,forum,positive,,\n' })
    expect(tables.factors.map(({ name }) => name)).toEqual(['venue', 'language'])
    expect(levels(tables, 1)).toEqual(['none', 'pt'])
  })
})

describe('venues and topics', () => {
  test('are mapped to the account\'s names, the others kept and counted', async () => {
    const yaml = account('a.csv', 'venues:\n  boards: { label: Discussion boards, values: [Forum, board], cost_per_author: 3 }\n  panel: { drift: none }\n')
    const tables = await intake({ 'account.yaml': yaml, 'a.csv': 'ref,published,source,tone,theme\n1,2025-03-03, FORUM ,positive,\n2,2025-03-03,board,positive,\n3,2025-03-03,panel,positive,\n4,2025-03-03,blog,positive,fares\n' })
    expect(tables.factors[0]!.levels).toEqual([{ name: 'blog', label: 'blog' }, { name: 'boards', label: 'Discussion boards', costPerAuthor: 3 }, { name: 'panel', label: 'panel', anchor: true }])
    expect(tables.accounting.unmapped).toEqual([{ factor: 'venue', value: 'blog', mentions: 1 }])
    expect(sum(tables.cells.mentions)).toBe(4)
  })

  test('control characters are spacing, and a venue of nothing else is missing', async () => {
    const yaml = account('a.csv', 'venues: { boards: { values: [old forum] } }\n')
    const tables = await intake({ 'account.yaml': yaml, 'a.csv': 'ref,published,source,tone,theme\n1,2025-03-03,old\0forum,positive,fa\0res\n2,2025-03-03,\0 \x01,positive,\n3,2025-03-03,boards\0,positive,\0\n' })
    expect(tables.accounting).toMatchObject({ modelled: 2, rejected: 1, reasons: { 'venue-missing': 1 }, unmapped: [] })
    expect([levels(tables, 0), levels(tables, 1)]).toEqual([['boards'], ['fa res', 'none']])
  })

  test.each([['venue', 60], ['topic', 400]] as const)('%s may have %i levels and no more', async (factor, most) => {
    const rowsOf = (count: number): string => Array.from({ length: count }, (_, index) => `${index},2025-03-03,${factor === 'venue' ? `v${index}` : 'forum'},positive,${factor === 'topic' ? `t${index}` : ''}\n`).join('')
    const files = (count: number): Files => ({ 'account.yaml': account('a.csv'), 'a.csv': `ref,published,source,tone,theme\n${rowsOf(count)}` })
    expect((await intake(files(most))).factors.find(({ name }) => name === factor)!.levels.length).toBe(most)
    const [fault] = await faultsOf(files(most + 1))
    expect(fault).toMatchObject({ code: 'too-many-levels', place: `mentions ${factor}` })
    expect(fault!.message).toContain(`more than ${most} values`)
    expect(fault!.mend).toContain('fewer names')
  })

  test('a column with too many values is no factor', async () => {
    const many = Array.from({ length: 2100 }, (_, index) => `${index},2025-03-03,forum,positive,words ${index}`).join('\n')
    expect((await faultsOf({ 'account.yaml': account('a.csv'), 'a.csv': `ref,published,source,tone,theme\n${many}\n` }))[0]).toMatchObject({ code: 'too-many-levels', place: 'mentions topic' })
  })
})

describe('what is wrong with the whole', () => {
  test('columns that are not there, with the nearest', async () => {
    const [fault] = await faultsOf({ 'account.yaml': account('a.csv'), 'a.csv': 'ref,publshed,source,tone,theme\n1,2,3,4,5\n' })
    expect(fault).toMatchObject({ code: 'columns-absent', place: 'a.csv:1' })
    expect(fault!.mend).toContain('`publshed`')
  })

  test('keys that no line of NDJSON has, with the nearest; a line may lack any', async () => {
    const line = (keys: readonly string[]): string => JSON.stringify(Object.fromEntries(keys.map((key, index) => [key, rows[0]![index]])))
    const yaml = account('a.ndjson')
    const [fault] = await faultsOf({ 'account.yaml': yaml, 'a.ndjson': `${line(['ref', 'publshed', 'source', 'tone', 'theme'])}\nnull\nno json\n` })
    expect(fault).toMatchObject({ code: 'columns-absent', place: 'a.ndjson:1' })
    expect(fault!.message).toMatch(/expected the columns `published`\./)
    expect(fault!.mend).toContain('`publshed`')
    const late = `${`${line(['ref', 'published', 'source', 'tone'])}\n`.repeat(1200)}${line(header)}\n`
    expect((await intake({ 'account.yaml': yaml, 'a.ndjson': late })).accounting).toMatchObject({ received: 1201 })
  })

  test('a column twice', async () => {
    expect((await faultsOf({ 'account.yaml': account('a.csv'), 'a.csv': 'ref,published,source,tone,theme,tone\n' }))[0]).toMatchObject({ code: 'header-twice', place: 'a.csv:1' })
  })

  test('files that are not what their name says', async () => {
    expect((await faultsOf({ 'account.yaml': account('a.parquet'), 'a.parquet': 'text' }))[0]).toMatchObject({ code: 'file-unreadable', place: 'a.parquet' })
    expect((await faultsOf({ 'account.yaml': account('a.csv.gz'), 'a.csv.gz': 'text' }))[0]).toMatchObject({ code: 'file-unreadable', place: 'a.csv.gz' })
    expect((await faultsOf({ 'account.yaml': account('a.csv'), 'a.csv': '' }))[0]).toMatchObject({ code: 'columns-absent', place: 'a.csv:1' })
  })

  test('no mention to model, with the reasons', async () => {
    const [fault] = await faultsOf({ 'account.yaml': account('a.csv'), 'a.csv': 'ref,published,source,tone,theme\n1,never,forum,positive,\n' }, {})
    expect(fault).toMatchObject({ code: 'no-mentions' })
    expect(fault!.message).toContain('rows 1, time-unreadable 1')
  })

  test('no whole period, and a period that is none', async () => {
    const files = { 'account.yaml': account('a.csv'), 'a.csv': separated(',') }
    expect((await faultsOf(files, {}))[0]).toMatchObject({ code: 'no-whole-period' })
    expect((await faultsOf(files, { period: '2025-Q1' }))[0]).toMatchObject({ code: 'period-unknown' })
  })

  test('a target for a level that nobody posted in', async () => {
    const [fault] = await faultsOf({ 'account.yaml': account('a.csv', 'target_mix: { venue: { forum: 0.5, panel: 0.5 } }\n'), 'a.csv': separated(',') })
    expect(fault).toMatchObject({ code: 'target-mix-level', place: 'account.yaml:8:36 target_mix.venue.panel' })
  })
})
