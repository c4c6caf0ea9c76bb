import { describe, expect, test } from 'vitest'
import type { CompetitorTables } from '../../../model/competitors/competitor-tables.ts'
import type { IntakeTables } from '../../../model/intake/intake-tables.ts'
import { createGenerator } from '../../../model/random/generator.ts'
import { readAccount } from '../../../generator/account/read-account.ts'
import { readIntakeAndCover, type IntakeOptions } from '../../../generator/intake/read-intake.ts'
import { plainAccount, plainHeader, quotedCsv, withAccount } from './temporary-account.ts'

interface Row { readonly ref: string, readonly day: string, readonly venue?: string, readonly handle?: string, readonly tone?: string, readonly about: string, readonly body?: string }

const csvOf = (rows: readonly Row[]): string => quotedCsv(plainHeader, rows.map(({ ref, day, venue = 'board', handle = `h ${ref}`, tone = 'positive', about, body = '' }) => [ref, `${day}T12:00:00Z`, venue, handle, tone, 'fares', about, body]))

async function readRows(rows: readonly Row[], competitors: string, options: IntakeOptions = {}): Promise<{ readonly tables: IntakeTables, readonly competitors: CompetitorTables | null }> {
  return withAccount({ 'account.yaml': `${plainAccount}competitors: [${competitors}]\n`, 'posts.csv': csvOf(rows) },
    async (folder) => readIntakeAndCover(await readAccount(folder), { period: '2026-02', competitors: true, ...options }))
}

const rows: readonly Row[] = [
  { ref: '1', day: '2026-01-10', about: 'Skerrow Ferries' }, { ref: '2', day: '2026-02-10', about: 'Skerrow Ferries', tone: 'negative' },
  { ref: '3', day: '2026-01-12', about: 'Tarrin Line', venue: 'blog' }, { ref: '3', day: '2026-01-13', about: 'Tarrin Line' }, { ref: '4', day: '2026-02-14', about: ' TARRIN line ', tone: 'neutral', handle: 'z' },
  { ref: '5', day: '2026-02-15', about: 'Tarrin Line', handle: 'z' }, { ref: '6', day: '2026-03-02', about: 'Tarrin Line' },
  { ref: '7', day: '2026-02-15', about: 'Corran Ferries' }, { ref: '8', day: '2026-02-15', about: '' }, { ref: '9', day: '2026-02-20', about: 'Tarrin Line', tone: 'unread' },
]

describe('the rows of a competitor', () => {
  test('are read as the brand’s own, whatever the case and spaces of the name; their accounting adds up', async () => {
    const { competitors } = await readRows(rows, 'Tarrin Line')
    expect(competitors!.told).toBe('all')
    const [{ brand, tables }] = competitors!.brands
    expect(brand).toBe('Tarrin Line')
    // five readable rows: one repeats an id, one is later than the period, one could not be read and is nobody's
    expect(tables!.accounting).toMatchObject({ received: 5, rejected: 0, duplicates: 1, outOfScope: 1, modelled: 3, reasons: { 'after-period': 1, 'same-id': 1 }, inputs: [] })
    expect(tables!.factors[0].levels.map(({ name, label }) => [name, label])).toEqual([['blog', 'blog'], ['boards', 'Discussion boards']])
    expect([...tables!.cells.mentions].reduce((a, b) => a + b, 0)).toBe(3)
    expect(tables!.concentration.filter(({ venue }) => venue >= 0)).toContainEqual(expect.objectContaining({ mentionsPerAuthor: 2, authors: 1 }))
  })

  test('stay out of the brand’s scope: its tables are those of an account without competitors', async () => {
    const without = await withAccount({ 'account.yaml': plainAccount, 'posts.csv': csvOf(rows) }, async (folder) => readIntakeAndCover(await readAccount(folder), { period: '2026-02', competitors: true }))
    const beside = await readRows(rows, 'Tarrin Line, Corran Ferries')
    expect(beside.tables).toEqual(without.tables)
    expect(without.competitors).toBeNull()
    expect(beside.tables.accounting).toMatchObject({ received: 10, rejected: 1, outOfScope: 7, modelled: 2, reasons: { 'other-brand': 6, 'brand-missing': 1 } })
  })

  test('are read over the brand’s base and up to the brand’s period', async () => {
    const { tables, competitors } = await readRows(rows, 'Tarrin Line')
    const { timeline } = competitors!.brands[0].tables!
    expect(timeline.base).toEqual(tables.timeline.base)
    expect(timeline.review).toEqual(tables.timeline.review)
    expect(timeline.steps[0]).toBe('2026-01-12')
  })

  test('a competitor without a row, or with later ones alone, has no tables; nobody asks, nobody reads', async () => {
    const { competitors } = await readRows([...rows, { ref: '10', day: '2026-03-05', about: 'Lowmoor Boats' }], 'Nobody, Lowmoor Boats, Tarrin Line')
    expect(competitors!.brands.map(({ brand, tables }) => [brand, tables === null])).toEqual([['Nobody', true], ['Lowmoor Boats', true], ['Tarrin Line', false]])
    expect((await readRows(rows, 'Tarrin Line', { competitors: false })).competitors).toBeNull()
  })

  test('keep their labels for an audit', async () => {
    const { competitors } = await readRows(rows, 'Tarrin Line', { labels: true })
    const { labels, cells } = competitors!.brands[0].tables!
    expect(labels!.names).toEqual(['negative', 'neutral', 'positive'])
    expect(labels!.counts.reduce((a, b) => a + b, 0)).toBe(cells.mentions.reduce((a, b) => a + b, 0))
  })
})

/** So many rows of three brands by few authors, with ids and texts that repeat. */
function manyRows(seed: number, count: number): readonly Row[] {
  const random = createGenerator(seed, 0)
  const any = <T>(...of: readonly T[]) => of[random.integer(of.length)]
  return Array.from({ length: count }, () => ({
    ref: String(random.integer(count)), day: new Date(Date.UTC(2026, 0, 1 + random.integer(59))).toISOString().slice(0, 10), venue: any('board', 'blog'), handle: any('a', 'b', 'c', 'd', ''),
    tone: any('positive', 'negative'), about: any('Skerrow Ferries', 'Tarrin Line', 'Corran Ferries'), body: any('', 'the same forty characters and more, said by many people at once'),
  }))
}

test.each([1, 2])('a competitor is read as the brand itself would be, had the account its name (seed %d)', async (seed) => {
  const rows = manyRows(seed, 150)
  const { tables: own, competitors } = await readRows(rows, 'Tarrin Line')
  const { accounting: { withAuthor, modelled, duplicates }, ...rest } = competitors!.brands[0].tables!
  const base = `base: { from: ${own.timeline.base.from}, to: ${own.timeline.base.to} }\n`
  const turned = await withAccount({ 'account.yaml': `${plainAccount.replace('Skerrow Ferries', 'Tarrin Line')}${base}`, 'posts.csv': csvOf(rows) }, async (folder) => readIntakeAndCover(await readAccount(folder), { period: '2026-02' }))
  const { accounting, ...turnedRest } = turned.tables
  expect(rest).toEqual(turnedRest)
  expect(duplicates).toBeGreaterThan(5)
  expect({ withAuthor, modelled, duplicates }).toEqual({ withAuthor: accounting.withAuthor, modelled: accounting.modelled, duplicates: accounting.duplicates })
})

describe('sources that do not say which brand a row is about', () => {
  const nameless = "  - files: posts.csv\n    columns: { posted_at: published, venue: source, score: tone }\n    score: { labels: { negative: -1, neutral: 0, positive: 1 } }\n"
  const toldBy = (account: string) => withAccount({ 'account.yaml': account, 'posts.csv': csvOf(rows) }, async (folder) => (await readIntakeAndCover(await readAccount(folder), { period: '2026-02', competitors: true })).competitors!)

  test('where none does, nothing can be read of a competitor', async () => {
    expect(await toldBy(`account: demo\nbrand: Skerrow Ferries\ntime_zone: UTC\nmentions:\n${nameless}competitors: [Tarrin Line]\n`)).toEqual({ told: 'none', brands: [{ brand: 'Tarrin Line', tables: null }] })
  })

  test('where some do, it is said', async () => {
    expect((await toldBy(`${plainAccount.replace('venues:', `${nameless}venues:`)}competitors: [Tarrin Line]\n`)).told).toBe('some')
  })
})
