import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import type { IntakeTables } from '../../../model/intake/intake-tables.ts'
import { readAccount } from '../../../generator/account/read-account.ts'
import { dayNumber } from '../../../generator/calendar/days.ts'
import { readIntake } from '../../../generator/intake/read-intake.ts'
import { readPlainly, variationOf, type PlainRow } from './plain-reading.ts'
import { plainAccount, plainHeader, quotedCsv, withAccount } from './temporary-account.ts'

const start = Date.UTC(2025, 0, 1) / 3_600_000
const long = 'The evening crossing was late again and nobody told us why'
/** What a field says in the file, and what it means. */
interface Said<T> { readonly said: string; readonly meant: T }

const said = <T>(text: string, meant: T): Said<T> => ({ said: text, meant })
const hour = fc.oneof(
  { weight: 12, arbitrary: fc.integer({ min: 0, max: 24 * 220 }).map((offset) => said(new Date((start + offset) * 3_600_000).toISOString(), start + offset)) },
  { weight: 3, arbitrary: fc.integer({ min: 0, max: 40 }).map((offset) => said(String((start + offset * 6) * 3600), start + offset * 6)) },
  { weight: 1, arbitrary: fc.constantFrom('', 'yesterday', '2025-02-30', 'infinity', '0000-00-00').map((text) => said(text, Number.NaN)) },
)
const score = fc.oneof(
  { weight: 9, arbitrary: fc.constantFrom(said('negative', -1), said('Positive', 1), said(' neutral ', 0), said('POSITIVE', 1)) },
  { weight: 1, arbitrary: fc.constantFrom('', 'meh', '7').map((text) => said(text, Number.NaN)) },
)
const venue = fc.oneof({ weight: 9, arbitrary: fc.constantFrom(said('Forum', 'boards'), said(' board', 'boards'), said('blog', 'blog'), said('it\'s, "quoted"', 'it\'s, "quoted"')) },
  { weight: 1, arbitrary: fc.constantFrom(said('', ''), said('  ', '')) })
const brand = fc.oneof({ weight: 9, arbitrary: fc.constant(said('Skerrow Ferries', 'Skerrow Ferries')) }, { weight: 1, arbitrary: fc.constantFrom(said('Tarrin Line', 'Tarrin Line'), said('', '')) })
const text = fc.constantFrom(said('', ''), said('short', 'short'), said(long, long), said(`${long.toUpperCase()}\nhttps://example.org/a @ann`, long), said(`${long}!`, `${long}!`))
const topic = fc.constantFrom(said('fares', 'fares'), said(' fares', 'fares'), said('', ''))
const author = fc.constantFrom(...['ann', 'bob', 'cat', 'ann', 'ann', ''].map((name) => said(name, name)))
const id = fc.oneof(fc.integer({ min: 1, max: 30 }).map((number) => said(`p${number}`, `p${number}`)), fc.constant(said('', '')))
const row = fc.record({ id, hour, venue, author, score, topic, brand, text })
type SaidRow = typeof row extends fc.Arbitrary<infer R> ? R : never

function meant(given: SaidRow): PlainRow {
  return { id: given.id.meant, hour: given.hour.meant, venue: given.venue.meant, author: given.author.meant, score: given.score.meant, topic: given.topic.meant, brand: given.brand.meant, text: given.text.meant }
}

async function intake(rows: readonly SaidRow[], period: string, threads: number): Promise<IntakeTables> {
  const fields = rows.map((given) => [given.id, given.hour, given.venue, given.author, given.score, given.topic, given.brand, given.text].map((field) => field.said))
  return withAccount({ 'account.yaml': plainAccount, 'posts.csv': quotedCsv(plainHeader, fields) }, async (folder) => readIntake(await readAccount(folder), { period, threads }))
}

function cellsByName(tables: IntakeTables): ReadonlyMap<string, Readonly<Record<string, number>>> {
  const { cells, factors, timeline } = tables
  return new Map(Array.from({ length: cells.count }, (_, cell) => {
    const levels = factors.map((factor, index) => factor.levels[cells.levels[index]![cell]!]!.name)
    const key = [dayNumber(timeline.steps[cells.step[cell]!]!), ...levels].join('|')
    return [key, { mentions: cells.mentions[cell]!, authors: cells.authors[cell]!, mean: cells.mean[cell]!, squares: cells.squares[cell]!, clustering: cells.clustering[cell]! }]
  }))
}

const files = fc.array(row, { minLength: 1, maxLength: 70 })
const period = fc.constantFrom('2025-04', '2025-12')

describe('messy files', () => {
  test('are read as the model says, whatever is in them', async () => {
    await fc.assert(fc.asyncProperty(files, period, async (rows, name) => {
      const plain = readPlainly(rows.map(meant), name)
      fc.pre(plain.modelled.length > 0)
      const tables = await intake(rows, name, 2)
      const { received, rejected, duplicates, outOfScope, modelled, reasons } = tables.accounting
      expect(received).toBe(rejected + duplicates + outOfScope + modelled)
      expect({ received, rejected, outOfScope, sameId: reasons['same-id'] ?? 0, repost: reasons.repost ?? 0, modelled }).toEqual({
        received: plain.received, rejected: plain.rejected, outOfScope: plain.outOfScope, sameId: plain.sameId, repost: plain.repost, modelled: plain.modelled.length,
      })
      const cells = cellsByName(tables)
      expect([...cells.keys()].sort()).toEqual([...plain.cells.keys()].sort())
      for (const [key, cell] of plain.cells) for (const [part, value] of Object.entries(cell)) expect(cells.get(key)![part]).toBeCloseTo(value as number, 8)
      checkAuthors(tables, plain.modelled)
    }), { numRuns: 60 })
  })

  test('give the same tables on one, two and four threads', async () => {
    await fc.assert(fc.asyncProperty(fc.array(row, { minLength: 30, maxLength: 70 }), async (rows) => {
      fc.pre(readPlainly(rows.map(meant), '2025-12').modelled.length > 0)
      const alone = await intake(rows, '2025-12', 1)
      for (const threads of [2, 4]) expect(await intake(rows, '2025-12', threads)).toEqual(alone)
    }), { numRuns: 6 })
  })
})

/** Distinct authors, counts of counts and author variation, each counted the plain way. */
function checkAuthors(tables: IntakeTables, rows: ReturnType<typeof readPlainly>['modelled']): void {
  const { authors, factors, timeline, concentration, variation, accounting } = tables
  const voices = (some: typeof rows): number => new Set(some.map((given, index) => (given.author === '' ? `nobody ${index}` : `${given.venue}|${given.author}`))).size
  expect(authors.exact).toBe(true)
  for (const [step, date] of timeline.steps.entries()) expect(authors.byStep[step]).toBe(voices(rows.filter((given) => given.step === dayNumber(date))))
  for (const [index, { name }] of timeline.periods.entries()) {
    const inside = rows.filter((given) => given.month === name)
    expect(authors.byPeriod[index]).toBe(voices(inside))
    for (const [factor, { name: column, levels }] of factors.entries()) {
      for (const [level, { name: value }] of levels.entries()) {
        const here = inside.filter((given) => (column === 'venue' ? given.venue : column === 'topic' ? given.topic || 'none' : given.poster) === value)
        expect(authors.byPeriodLevel[factor]![index * levels.length + level]).toBe(voices(here))
      }
    }
    const known = inside.filter((given) => given.author !== '')
    const counts = concentration.filter((given) => given.period === index && given.venue === -1)
    expect(counts.reduce((sum, given) => sum + given.authors, 0)).toBe(voices(known))
    expect(counts.reduce((sum, given) => sum + given.authors * given.mentionsPerAuthor, 0)).toBe(known.length)
  }
  for (const [venueIndex, { name }] of factors[0]!.levels.entries()) {
    const plain = variationOf(rows, name)
    const row = variation[venueIndex]
    expect(accounting.withAuthor[venueIndex]).toBe(plain.mentions)
    if (plain.mentions === 0) { expect(row).toBeNull(); continue }
    expect([row!.authors, row!.mentions]).toEqual([plain.authors, plain.mentions])
    expect(row!.betweenSquares).toBeCloseTo(plain.between, 6)
    expect(row!.withinSquares).toBeCloseTo(plain.within, 6)
  }
}
