import { describe, expect, test } from 'vitest'
import { readAccount } from '../../../generator/account/read-account.ts'
import { InputFault } from '../../../generator/faults/fault.ts'
import { sampleForAudit, type AuditPost } from '../../../generator/intake/audit-sample.ts'
import { readPlainly } from './plain-reading.ts'
import { spokenAccount, spokenHeader, spokenRows } from './spoken-account.ts'
import { quotedCsv, withAccount } from './temporary-account.ts'

const rows = spokenRows(21, 2500)
const stars = '2025-03-05,reviews,5,star-1\n'
const yaml = spokenAccount().replace('posts.csv', '"posts-*.csv"').replace('venues:', '  - files: stars.csv\n    columns: { posted_at: t, venue: v, score: s, id: ref }\n    score: { range: [1, 5] }\nvenues:')
const files = (fields: readonly (readonly string[])[], account = yaml) => ({
  'account.yaml': account, 'posts-1.csv': quotedCsv(spokenHeader, fields.slice(0, 1500)), 'posts-2.csv': quotedCsv(spokenHeader, fields.slice(1500)), 'stars.csv': `t,v,s,ref\n${stars}`,
})
const sample = (size: number, seed: number, { fields = rows.map((row) => row.fields), threads = 2, period = '2025-03', account = yaml } = {}): Promise<readonly AuditPost[]> =>
  withAccount(files(fields, account), async (folder) => sampleForAudit(await readAccount(folder), { size, seed, threads, period }))
const modelled = readPlainly(rows.map(({ row }) => row), '2025-03').modelled.filter((row) => row.month === '2025-03')
const faultOf = async (drawing: Promise<unknown>) => {
  const error: unknown = await drawing.catch((reason: unknown) => reason)
  if (!(error instanceof InputFault)) throw new Error('no fault')
  return error.faults[0]!
}

describe('a sample for a coding audit', () => {
  test('is of posts of the period under review, each once, with their venue and file, from every venue by size and spread', async () => {
    const posts = await sample(150, 1)
    expect(new Set(posts.map(({ id }) => id)).size).toBe(150)
    for (const { id, venue, file } of posts) {
      expect(modelled.find((row) => row.id === id)).toMatchObject({ venue })
      expect(file).toBe(Number(id.slice(1)) < 1500 ? 'posts-1.csv' : 'posts-2.csv')
    }
    // Twice as many on boards, equally spread: by a post or two, since spread is estimated.
    const boards = posts.filter(({ venue }) => venue === 'boards').length
    expect(Math.abs(boards - 100)).toBeLessThanOrEqual(3)
  })

  test('is the same for a seed on any number of threads, and another for another', async () => {
    const drawn = await sample(120, 7)
    for (const threads of [1, 4]) expect(await sample(120, 7, { threads })).toEqual(drawn)
    expect(new Set((await sample(120, 8)).map(({ id }) => id))).not.toEqual(new Set(drawn.map(({ id }) => id)))
  })

  test('favours no part of the files: drawn are as many of every tenth of a venue, and of two seeds half are the same', async () => {
    const boards = modelled.filter(({ venue }) => venue === 'boards').map(({ id }) => id)
    const draws: (readonly string[])[] = []
    for (const seed of [1, 2, 3, 4]) draws.push((await sample(Math.round(modelled.length / 2), seed)).filter(({ venue }) => venue === 'boards').map(({ id }) => id))
    const statistic = draws.reduce((sum, drawn) => {
      const part = drawn.length / boards.length
      return sum + Array.from({ length: 10 }, (_, bin) => boards.filter((_id, index) => Math.floor((10 * index) / boards.length) === bin))
        .reduce((inner, tenth) => inner + (tenth.filter((id) => drawn.includes(id)).length - part * tenth.length) ** 2 / (part * (1 - part) * tenth.length), 0)
    }, 0)
    // Chi-square of 4 times 9 degrees: 15.3 and 68.0 leave a thousandth at either end (scipy.stats.chi2.ppf).
    expect(statistic).toBeGreaterThan(15.3)
    expect(statistic).toBeLessThan(68)
    const both = draws[0]!.filter((id) => draws[1]!.includes(id)).length
    const [drawn, of] = [draws[0]!.length, boards.length]
    const expected = drawn ** 2 / of
    // Hypergeometric, three and a half standard deviations.
    expect(Math.abs(both - expected)).toBeLessThan(3.5 * Math.sqrt((expected * (1 - drawn / of) ** 2 * of) / (of - 1)))
  })

  test('has all posts where fewer are there than asked for, and none without an id or with a score that is no label', async () => {
    const fields = rows.map((row, index) => (index % 2 === 0 ? ['', ...row.fields.slice(1)] : row.fields))
    const posts = await sample(100_000, 1, { fields })
    expect(new Set(posts.map(({ id }) => id))).toEqual(new Set(modelled.filter(({ id }) => Number(id.slice(1)) % 2 === 1).map(({ id }) => id)))
    expect(posts.map(({ venue }) => venue)).not.toContain('reviews')
  })

  test('of less than 50 a venue is refused; where nothing can be named too', async () => {
    expect(await faultOf(sample(99, 1))).toMatchObject({ code: 'audit-sample-small', place: '--audit-sample', message: expect.stringContaining('100') as string })
    expect(await faultOf(sample(100, 1, { account: yaml.replace('id: ref, posted_at: published', 'posted_at: published') }))).toMatchObject({ code: 'audit-sample-ids' })
  })
})
