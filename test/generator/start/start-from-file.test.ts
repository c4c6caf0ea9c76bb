import { mkdtemp, readFile, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { gzipSync } from 'node:zlib'
import { DuckDBInstance } from '@duckdb/node-api'
import { describe, expect, test } from 'vitest'
import { readAccount } from '../../../generator/account/read-account.ts'
import { InputFault } from '../../../generator/faults/fault.ts'
import { readIntake } from '../../../generator/intake/read-intake.ts'
import { exportedPosts, firstPost, separated, startedFrom } from './export-files.ts'

const posts = exportedPosts()
const iso = (at: number): string => new Date(at).toISOString()
const header = ['ref', 'posted', 'site', 'user', 'sentiment', 'theme', 'body'] as const
const rows = posts.map((post) => [`p${post.number}`, iso(post.at), post.venue, post.user, post.tone, post.theme, post.body])
const mapping = { posted_at: 'posted', venue: 'site', score: 'sentiment', author: 'user', topic: 'theme', id: 'ref', text: 'body' }
/** The last six posts are of May, of which there is no whole month yet. */
const allRead = { received: 400, rejected: 0, duplicates: 0, outOfScope: 6, modelled: 394 }
const labels = { negative: -1, neutral: 0, positive: 1 }

const german = (delimiter: string): string => separated(delimiter, ['Nummer', 'Datum', 'Quelle', 'Autor', 'Stimmung', 'Thema', 'Beitrag'], posts.map((post) => {
  const [, month, day] = iso(post.at).slice(0, 10).split('-')
  return [`p${post.number}`, `${day}.${month}.2025 ${iso(post.at).slice(11, 16)}`, post.venue, post.user, { negative: 'negativ', neutral: 'neutral', positive: 'positiv' }[post.tone], post.theme, post.body]
}))
const germanMapping = { posted_at: 'Datum', venue: 'Quelle', score: 'Stimmung', author: 'Autor', topic: 'Thema', id: 'Nummer', text: 'Beitrag' }

describe('what is proposed from', () => {
  test.each([
    ['commas', 'x.csv', separated(',', header, rows)],
    ['semicolons', 'x.csv', separated(';', header, rows)],
    ['tabs, under another ending', 'x.TSV', separated('\t', header, rows)],
    ['bars, quoted line breaks and quotes in texts', 'x.txt', separated('|', header, rows.map((row) => [...row.slice(0, 6), `${row[6]!}\nsaid "Ann" | and left`]))],
    ['single quotes', 'x.csv', [header, ...rows].map((row) => `${row.map((field) => `'${field}'`).join(',')}\n`).join('')],
    ['gzip', 'x.csv.gz', gzipSync(separated(',', header, rows))],
    ['UTF-16', 'x.csv', Buffer.from(`\uFEFF${separated(';', header, rows)}`, 'utf16le')],
    ['lines of JSON', 'x.jsonl', rows.map((row) => `${JSON.stringify(Object.fromEntries(header.map((name, index) => [name, row[index]])))}\n`).join('')],
    ['gzipped lines of JSON', 'x.ndjson.gz', gzipSync(rows.map((row) => `${JSON.stringify(Object.fromEntries(header.map((name, index) => [name, row[index]])))}\n`).join(''))],
  ])('%s', async (_, name, content) => {
    await startedFrom(name, content, async ({ yaml, folder }) => {
      expect(yaml.mentions[0]!.columns).toEqual(mapping)
      expect(yaml.mentions[0]!.score).toEqual({ labels })
      expect(Object.keys(yaml.venues as object)).toEqual(['island-forum', 'blog', 'microblog'].sort((a, b) => Number(b === 'island-forum') - Number(a === 'island-forum')))
      const tables = await readIntake(await readAccount(folder))
      expect(tables.accounting).toMatchObject(allRead)
    })
  })

  test('Parquet', async () => {
    const scratch = await mkdtemp(path.join(tmpdir(), 'parquet-'))
    const instance = await DuckDBInstance.create(':memory:')
    const connection = await instance.connect()
    const file = path.join(scratch, 'made.parquet')
    try {
      const values = posts.map((post) => `(${post.number}, TIMESTAMP '${iso(post.at).slice(0, 19).replace('T', ' ')}', '${post.venue}', '${post.user}', ${post.stars})`).join(', ')
      await connection.run(`COPY (SELECT * FROM (VALUES ${values}) AS v("1", "when", channel, member, stars)) TO '${file}' (FORMAT parquet)`)
      const content = await readFile(file)
      await startedFrom('Made.parquet', content, async ({ yaml, folder }) => {
        expect(yaml.mentions[0]).toMatchObject({ files: 'mentions/*.parquet', columns: { id: '1', posted_at: 'when', venue: 'channel', author: 'member', score: 'stars' }, score: { range: [1, 5] } })
        expect((await readIntake(await readAccount(folder))).accounting).toMatchObject(allRead)
      })
    } finally {
      connection.closeSync()
      instance.closeSync()
      await rm(scratch, { recursive: true, force: true })
    }
  })

  test.each([[';'], [',']])('German names, labels and dates, parted by %s', async (delimiter) => {
    await startedFrom('Export März.csv', german(delimiter), async ({ yaml, folder, mentions }) => {
      expect(mentions).toBe('mentions/Export März.csv')
      expect(yaml.mentions[0]).toMatchObject({ columns: germanMapping, time_format: '%d.%m.%Y %H:%M', score: { labels: { negativ: -1, neutral: 0, positiv: 1 } } })
      expect((await readIntake(await readAccount(folder))).accounting).toMatchObject(allRead)
    })
  })

  test('the language of the file is proposed, and the base is what the program takes by itself', async () => {
    await startedFrom('x.csv', german(';'), async ({ text, yaml, folder }) => {
      expect(yaml.locale).toBe('de-DE')
      const { timeline: { base } } = await readIntake(await readAccount(folder))
      expect(text).toContain(`# base: { from: ${base.from}, to: ${base.to} }`)
      expect(base.to < iso(posts.at(-1)!.at)).toBe(true)
    })
  })

  test('columns that are not used say why', async () => {
    const columns = ['posted', 'site', 'sentiment', 'country', 'collected', 'empty', 'stuff']
    const rows = posts.map((post) => [iso(post.at), post.venue, post.tone, ['Portugal', 'Norway'][post.number % 2]!, iso(post.at + 86_400_000), '', `${(post.number * 7919) % 1000}.25 x y z`])
    await startedFrom('x.csv', separated(',', columns, rows), ({ text }) => {
      expect(text).toContain('# not used: `country`, none of ours; to adjust for it')
      expect(text).toContain('# not used: `collected`, times of something else than posting')
      expect(text).toContain('# not used: `empty`, without any value')
      expect(text).toMatch(/# not used: `stuff`, \w/)
    })
  })

  test('windows-1252', async () => {
    await startedFrom('x.csv', Buffer.from(german(';').replaceAll('fares', 'Gebühren'), 'latin1'), ({ yaml }) => {
      expect(yaml.mentions[0]!.columns).toEqual(germanMapping)
      expect(yaml.topics).toMatchObject({ gebuhren: { label: 'Gebühren', values: ['Gebühren'] } })
    })
  })

  test.each([['seconds', 1000], ['milliseconds', 1]])('times in %s since 1970', async (_, divisor) => {
    const table = separated(',', ['key', 'moment', 'site', 'user', 'stars'], posts.map((post) => [`k${post.number}`, Math.floor(post.at / divisor), post.venue, post.user, post.stars]))
    await startedFrom('x.csv', table, ({ yaml, proposal }) => {
      expect(yaml.mentions[0]).toMatchObject({ columns: { posted_at: 'moment', score: 'stars' }, score: { range: [1, 5] } })
      expect(yaml.mentions[0]!.time_format).toBeUndefined()
      expect(proposal!.tally.times).toMatchObject({ read: 400, first: iso(firstPost).slice(0, 10) })
    })
  })

  test('a file without author, topic and id: none is made up', async () => {
    await startedFrom('x.csv', separated(',', ['posted', 'site', 'sentiment'], posts.map((post) => [iso(post.at), post.venue, post.tone])), ({ yaml }) => {
      expect(yaml.mentions[0]!.columns).toEqual({ posted_at: 'posted', venue: 'site', score: 'sentiment' })
    })
  })

  test('two columns of times: the one that tells of collecting is not taken, and without a name that says so the earlier one is', async () => {
    const two = (first: string, second: string): string => separated(',', [first, second, 'site', 'sentiment'], posts.map((post) => [iso(post.at + 86_400_000), iso(post.at), post.venue, post.tone]))
    await startedFrom('x.csv', two('collected', 'written'), ({ yaml }) => { expect(yaml.mentions[0]!.columns.posted_at).toBe('written') })
    await startedFrom('x.csv', two('date_a', 'date_b'), ({ yaml, text }) => {
      expect(yaml.mentions[0]!.columns.posted_at).toBe('date_b')
      expect(text).toMatch(/posted_at: date_b +# .*earlier than `date_a` in 100 % of 400 rows; or `date_a`/)
    })
  })

  test('days and months: told apart by the whole file; where nothing tells, the account asks', async () => {
    const american = (count: number): string => separated(',', ['date', 'site', 'sentiment'], exportedPosts(count).map((post) => {
      const [, month, day] = iso(firstPost + (post.at - firstPost) / 60).slice(0, 10).split('-')
      return [`${month}/${day}/2025`, post.venue, post.tone]
    }))
    // the first 2,000 rows are of the first twelve days
    await startedFrom('x.csv', american(3500), ({ yaml, text }) => {
      expect(yaml.mentions[0]!.time_format).toBe('%m/%d/%Y')
      expect(text).not.toContain('tells days and months apart')
    })
    await startedFrom('x.csv', american(100), ({ yaml, text, proposal }) => {
      expect(yaml.mentions[0]!.time_format).toBe('%d/%m/%Y')
      expect(text).toContain("No day above 12 tells days and months apart: is it '%m/%d/%Y'?")
      expect(proposal!.tally.times!.rival).toBe('%m/%d/%Y')
    })
  })

  test('300 columns, of which five matter', async () => {
    const extra = Array.from({ length: 295 }, (_, index) => `x${index}`)
    const table = separated(',', [...extra, 'ref', 'posted', 'site', 'user', 'sentiment'], posts.map((post) => [...extra.map((_, index) => (post.number * (index + 3)) % 1013), `p${post.number}`, iso(post.at), post.venue, post.user, post.tone]))
    await startedFrom('x.csv', table, ({ yaml }) => {
      expect(yaml.mentions[0]!.columns).toEqual({ posted_at: 'posted', venue: 'site', score: 'sentiment', author: 'user', id: 'ref' })
    })
  })

  test('replies, threads, segments and brands: by what their values are to each other', async () => {
    const table = separated(',', ['ref', 'posted', 'site', 'user', 'sentiment', 'conversation', 'reply to', 'customer group', 'about'], posts.map((post) => [
      `p${post.number}`, iso(post.at), post.venue, post.user, post.tone, `p${post.number - post.number % 5}`, post.number % 5 === 0 ? '' : `p${post.number - 1}`,
      ['commuter', 'islander', ''][post.number % 3]!, post.number % 10 === 0 ? 'Tarrin Line' : 'Skerrow Ferries',
    ]))
    await startedFrom('x.csv', table, ({ yaml, text }) => {
      expect(yaml.mentions[0]!.columns).toMatchObject({ thread: 'conversation', reply_to: 'reply to', segment: 'customer group', brand: 'about' })
      expect(yaml.brand).toBe('Skerrow Ferries')
      expect(text).toContain('# competitors: [Tarrin Line]')
    })
  })

  test('a label that is not known is told, not scored', async () => {
    await startedFrom('x.csv', separated(',', header, rows.map((row, index) => (index % 20 === 0 ? row.with(4, 'sarcastic') : row))), ({ yaml, text }) => {
      expect(yaml.mentions[0]!.score).toEqual({ labels })
      expect(text).toContain('# without a score, so their rows are rejected: sarcastic (20)')
    })
  })

  test('one mistyped year does not stretch the time axis', async () => {
    await startedFrom('x.csv', separated(',', header, rows.with(7, rows[7]!.with(1, '1905-01-01'))), ({ yaml, proposal }) => {
      expect(proposal!.tally.times!.first).toBe('1905-01-01')
      expect([yaml.grid, yaml.reporting]).toEqual(['week', 'month'])
    })
  })

  test('columns that nothing tells apart are left to the analyst, with those that may be meant', async () => {
    await startedFrom('x.csv', separated(',', ['a', 'b', 'c', 'd'], posts.map((post) => [iso(post.at), ['red', 'green'][post.number % 2]!, ['up', 'down', 'left'][post.number % 3]!, post.tone])), async ({ text, yaml, folder, proposal }) => {
      expect(proposal!.columns.undecided).toEqual([{ role: 'venue', candidates: ['b', 'c'] }])
      expect(yaml.mentions[0]!.columns).toEqual({ posted_at: 'a', score: 'd' })
      expect(text).toMatch(/# venue: +# needed, and can't be told from the file; it may be `b`, `c`/)
      await expect(readAccount(folder)).rejects.toThrow('columns without `venue`')
    })
  })

  test('a header without rows: by names alone', async () => {
    await startedFrom('x.csv', 'date,source,sentiment,anything\n', ({ yaml, text }) => {
      expect(yaml.mentions[0]!.columns).toEqual({ posted_at: 'date', venue: 'source', score: 'sentiment' })
      expect(text).toContain('by its name alone')
      expect(yaml.mentions[0]!.score).toBeUndefined()
    })
  })
})

describe('nothing is laid out from', () => {
  test.each([
    ['an empty file', 'x.csv', '', 'start-no-table'], ['bytes', 'x.csv', Buffer.from([0, 1, 2, 0, 255, 0]), 'start-no-table'], ['one column', 'x.csv', 'a\n1\n', 'start-no-table'],
    ['a first row of data', 'x.csv', `${rows[0]!.join(',')}\n`, 'start-no-header'], ['a workbook', 'x.xlsx', 'PK', 'start-file-kind'], ['no Parquet', 'x.parquet', 'no', 'file-unreadable'],
    ['no gzip', 'x.csv.gz', 'no', 'file-unreadable'], ['no gzip of lines', 'x.jsonl.gz', 'no', 'file-unreadable'], ['lines of arrays', 'x.ndjson', '[1]\n[2]\n', 'start-no-table'],
  ])('%s', async (_, name, content, code) => {
    const failure = await startedFrom(name, content, () => null).catch((error: unknown) => error)
    expect(failure).toBeInstanceOf(InputFault)
    const [fault] = (failure as InputFault).faults
    expect(fault!.code).toBe(code)
    // the file that was named, not its copy
    expect(fault!.place).toContain(name)
    expect(fault!.place).not.toContain('mentions/')
  })
})

describe('the demo\'s own files: the demo\'s own mapping', () => {
  const demo = path.join(import.meta.dirname, '../../../sample-data/skerrow-ferries')
  test.each([['posts/2024-Q2.csv.gz', 0], ['posts/2026-Q4.csv.gz', 0], ['reviews/2026.ndjson', 1]] as const)('%s', async (file, source) => {
    const account = await readAccount(demo)
    const mentions = account.mentions[source]!
    const theirs = mentions.kind === 'mentions' ? mentions.columns : {}
    await startedFrom(path.basename(file), await readFile(path.join(demo, file)), ({ yaml }) => {
      const { columns, score } = yaml.mentions[0]!
      const needed = ['posted_at', 'venue', 'author', 'score', 'topic', 'id', 'brand']
      expect(needed.map((ours) => columns[ours])).toEqual(needed.map((ours) => theirs[ours]))
      expect(score).toEqual(source === 0 ? { labels } : { range: [1, 5] })
      expect(yaml.brand).toBe('Skerrow Ferries')
    })
  })
})
