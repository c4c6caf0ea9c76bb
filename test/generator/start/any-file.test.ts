import fc from 'fast-check'
import { expect, test } from 'vitest'
import { readAccount } from '../../../generator/account/read-account.ts'
import { readPlacedYaml } from '../../../generator/account/yaml-places.ts'
import { InputFault } from '../../../generator/faults/fault.ts'
import { furtherKeys } from '../../../generator/start/further-keys.ts'
import { proposeLevels } from '../../../generator/start/propose-account.ts'
import { skeletonText } from '../../../generator/start/skeleton.ts'
import { inComment, yamlText } from '../../../generator/start/yaml-text.ts'
import { withAccount } from '../intake/temporary-account.ts'
import { separated, startedFrom } from './export-files.ts'

const hostile = [
  ': {', '__proto__', 'constructor', 'a\nb', '- x', '# no', '"', "'", '*a', '&a', '!t', '%d', '@x', '`', '|', '>', 'null', 'true', '1', '1e3', 'no', '~', '[a', '{a: b}', 'a: b', 'a #b', '\t', 'x\ty', '\\', '\u2028', '\u202e', '\ufeffx', '\u0007',
  '💡', 'é', '日付', 'date', 'source', 'sentiment', 'author', 'topic', 'id', '${x}', '<b>', '=cmd', '...', '---', '? a', 'y', '$."a"', 'a.b', '_', '__', 'x'.repeat(300),
]
const name = fc.oneof(fc.constantFrom(...hostile), fc.string({ unit: 'grapheme', maxLength: 12 }))
const value = fc.oneof(
  { weight: 4, arbitrary: fc.constantFrom('2026-01-03T10:00:00Z', '2026-02-03', 'negative', 'positive', 'forum', 'blog', 'ann', 'bob', '3', '5', '') },
  { weight: 2, arbitrary: name },
)
/** A table whose columns each draw from few values, as columns of kinds do. */
const table = fc.record({ header: fc.uniqueArray(name, { minLength: 2, maxLength: 7 }), rows: fc.integer({ min: 0, max: 25 }) }).chain(({ header, rows }) =>
  fc.tuple(...header.map(() => fc.array(value, { minLength: 1, maxLength: 4 }).chain((some) => fc.array(fc.constantFrom(...some), { minLength: rows, maxLength: rows })))).map((columns) =>
    ({ header, rows: Array.from({ length: rows }, (_, row) => columns.map((column) => column[row]!)) })))

/** What an account from a file that says too little may lack, and nothing else. */
const lacks = /without score|columns without|Unexpected nothing|expected a map|expected text/

async function isSound(file: string, content: string, header: readonly string[]): Promise<void> {
  try {
    await startedFrom(file, content, async ({ text, folder }) => {
      const { value: read, faults } = readPlacedYaml(text)
      expect(faults).toEqual([])
      const [source] = (read as { mentions: readonly { columns: Readonly<Record<string, string>> | null }[] }).mentions
      for (const theirs of Object.values(source!.columns ?? {})) expect(header).toContain(theirs)
      const wrong = await readAccount(folder).then(() => [], (error: unknown) => (error as InputFault).faults)
      for (const fault of wrong) expect(fault.message).toMatch(lacks)
    })
  } catch (error) {
    // a file may be refused, for what it is
    if (!(error instanceof InputFault) || !error.faults.every(({ code }) => ['start-no-table', 'start-no-header'].includes(code))) throw error
  }
}

test('whatever a CSV holds, the account is YAML that maps columns which are there', async () => {
  await fc.assert(fc.asyncProperty(table, fc.constantFrom(',', ';', '\t'), ({ header, rows }, delimiter) => isSound('any.csv', separated(delimiter, header, rows), header.map((cell) => cell.trim()))), { numRuns: 15 })
}, 120_000)

test('whatever lines of JSON hold, too', async () => {
  await fc.assert(fc.asyncProperty(table, ({ header, rows }) => {
    const lines = rows.map((row) => `{${header.map((key, index) => `${JSON.stringify(key)}:${JSON.stringify(row[index])}`).join(',')}}\n`)
    return isSound('any.ndjson', lines.join(''), header)
  }), { numRuns: 15 })
}, 120_000)

test('any text comes back from YAML as it was, and in a comment stays on its line', () => {
  fc.assert(fc.property(fc.oneof(name, fc.string({ unit: 'binary' })), (text) => {
    const { value: read, faults } = readPlacedYaml(`a: { b: ${yamlText(text)}, ${yamlText(text === '__proto__' ? 'x' : text)}: [${yamlText(text)}] }   # ${inComment(text)}\nc: 1`)
    expect(faults).toEqual([])
    expect(read).toMatchObject({ a: { [text === '__proto__' ? 'x' : text]: [text] }, c: 1 })
    if (text !== 'b') expect((read as { a: { b: string } }).a.b).toBe(text)
  }), { numRuns: 500 })
})

test('it can fail: written plainly, such a text is another one or none', () => {
  expect(readPlacedYaml('a: { b: : { }').faults).not.toEqual([])
  expect(readPlacedYaml('a: 1e3').value).not.toEqual({ a: '1e3' })
})

test('names of levels are each one\'s own, and no other\'s value', () => {
  const level = fc.oneof(fc.constantFrom('a b', 'a-b', 'A B', 'a  b', 'a.b', 'level-1', 'level-2', '日', '本', '!'), fc.string({ maxLength: 4 }))
  fc.assert(fc.property(fc.uniqueArray(level, { maxLength: 12 }), (values) => {
    const levels = proposeLevels(values.map((spelling) => ({ value: spelling, rows: 1 })))
    const claims = levels.flatMap(({ name: ours, values: spellings }) => [...new Set([ours, ...spellings].map((spelling) => spelling.trim().toLowerCase().replace(/\s+/g, ' ')))])
    expect(new Set(claims).size).toBe(claims.length)
    for (const { name: ours } of levels) expect(ours).toMatch(/^[a-z0-9]+(-[a-z0-9]+)*$/)
  }))
})

const posts = 'date,site,sentiment\n2026-01-01,forum,positive\n2026-03-01,blog,negative\n'
const source = 'account: a\nbrand: B\nmentions:\n  - files: posts.csv\n    columns: { posted_at: date, venue: site, score: sentiment }\n    score: { labels: { negative: -1, positive: 1 } }\n'
const files = {
  'posts.csv': posts, 'survey/a.csv': 'x', 'benchmark/a.csv': 'x', 'audit/a.csv': 'x', 'importance/a.csv': 'x', 'events/a.csv': 'x', 'outcome/a.csv': 'x', 'template.md': '', 'theme.yaml': '', 'words.yaml': '', 'notes/2026-10.md': '',
}

test('every optional key that is shown as a comment is valid once its hash is taken away', async () => {
  const keys = furtherKeys.split('\n').filter((line) => /^# [a-z_]+: /.test(line)).map((line) => line.slice(2))
  expect(keys.length).toBeGreaterThan(12)
  await withAccount({ 'account.yaml': `${source}${keys.join('\n')}\n`, ...files }, async (folder) => {
    expect(await readAccount(folder)).toMatchObject({ customers: 310000, survey: { headline: 'favourability' }, codingAudit: { pattern: 'audit/*.csv' }, notes: 'notes' })
  })
})

test('a skeleton lacks what its reader has to say, and names it', async () => {
  await withAccount({ 'account.yaml': skeletonText('mine', 'Mine') }, async (folder) => {
    const failure = await readAccount(folder).catch((error: unknown) => error)
    expect((failure as InputFault).faults.map(({ place }) => place.split(' ')[1])).toEqual(expect.arrayContaining(['mentions.0.columns.posted_at', 'mentions.0.columns.venue', 'mentions.0.columns.score']))
  })
})
