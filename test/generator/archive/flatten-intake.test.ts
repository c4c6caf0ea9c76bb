import { mkdtemp, readFile, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import fc from 'fast-check'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { readFacts } from '../../../generator/archive/facts.ts'
import { flattenIntake, unflattenIntake, type FlatIntake, type IntakeFacts } from '../../../generator/archive/flatten-intake.ts'
import { readParquet, writeParquet } from '../../../generator/archive/parquet.ts'
import type { IntakeTables } from '../../../model/intake/intake-tables.ts'
import { createGenerator } from '../../../model/random/generator.ts'
import { simulateCells } from '../../support/simulate-cells.ts'

let folder: string
beforeAll(async () => { folder = await mkdtemp(join(tmpdir(), 'tareline-parquet-')) })
afterAll(() => rm(folder, { recursive: true }))

/** Simulated cells with something in every table that intake can hand over. */
function tablesWith(seed: number, labelled: boolean): IntakeTables {
  const { tables } = simulateCells({
    steps: 9, venues: 2, topics: 3, posters: 2, mentionsPerStep: 40,
    sigmas: { mu: 0.02, venueDrift: [0.01, 0.02], venue: 0.2, topic: 0.2, poster: 0.1, tau: 0.03 },
  }, createGenerator(seed, 0))
  const deff = tables.cells.deff.map((value, i) => (i % 3 === 0 ? Number.NaN : value + 1 / 3))
  return {
    ...tables, cells: { ...tables.cells, deff },
    labels: labelled ? { names: ['bad', 'good'], scores: Float64Array.of(-1, 1), counts: Float64Array.from({ length: 2 * tables.cells.count }, (_, i) => i % 7) } : null,
    noLabels: labelled ? null : 'ranges',
    staying: [{ period: 0, stance: 1, authors: 20, stayed: 11 }, { period: 1, stance: 2, authors: 12, stayed: 0 }],
    extremes: [{ period: 1, venue: 1, mentions: 30, extremes: 4 }],
    pull: [{ venue: 0, poster: -1, replies: 50, authors: 22, slope: 0.1 + 0.2, standardError: 1e-17 }],
    segments: labelled ? { margins: ['age', 'region'], levels: [['old', 'young'], ['north']], rows: [{ levels: [1, -1], authors: 15, sum: -0.7, squares: 3.1 }, { levels: [0, 0], authors: 11, sum: 2 / 3, squares: 1 }] } : null,
  }
}

const throughFiles = async (flat: FlatIntake): Promise<FlatIntake> => {
  await writeParquet(folder, flat.numbers)
  return {
    numbers: await Promise.all(flat.numbers.map(({ name }) => readParquet(folder, name))),
    facts: JSON.parse(JSON.stringify(flat.facts)) as IntakeFacts,
  }
}

test.each([[1, true], [2, false]])('tables come back from Parquet and JSON as they went in, bit for bit (seed %d, labels %s)', async (seed, labelled) => {
  const tables = tablesWith(seed, labelled)
  expect(unflattenIntake(await throughFiles(flattenIntake(tables)))).toStrictEqual(tables)
})

test('any real number survives, not-a-number and the smallest ones too', async () => {
  await fc.assert(fc.asyncProperty(fc.float64Array({ minLength: 1, maxLength: 40 }), fc.array(fc.integer({ min: -1, max: 2 ** 31 - 1 }), { minLength: 1, maxLength: 40 }), async (values, wholes) => {
    const rows = Math.min(values.length, wholes.length)
    const table = { name: 'any', columns: { value: { kind: 'real' as const, values: values.slice(0, rows) }, 'odd "name"': { kind: 'whole' as const, values: wholes.slice(0, rows) } } }
    await writeParquet(folder, [table])
    const found = await readParquet(folder, 'any')
    expect(Array.from(found.columns['value'].values)).toEqual([...table.columns.value.values])
    expect(Array.from(found.columns['odd "name"'].values)).toEqual(table.columns['odd "name"'].values)
  }), { numRuns: 15 })
})

test('the same tables give the same bytes, other ones do not', async () => {
  const bytes = async (seed: number) => {
    await writeParquet(folder, flattenIntake(tablesWith(seed, true)).numbers)
    return readFile(join(folder, 'cells.parquet'))
  }
  const first = await bytes(3)
  expect((await bytes(3)).equals(first)).toBe(true)
  expect((await bytes(4)).equals(first)).toBe(false)
})

test('a table with no row comes back with none', async () => {
  await writeParquet(folder, [{ name: 'empty', columns: { period: { kind: 'whole', values: [] } } }])
  expect((await readParquet(folder, 'empty')).columns['period'].values).toHaveLength(0)
})

test('a missing table is named', () => {
  const flat = flattenIntake(tablesWith(5, true))
  expect(() => unflattenIntake({ ...flat, numbers: flat.numbers.filter(({ name }) => name !== 'pull') })).toThrow('the table pull')
})

test('values that could not be read, which may be the words of a post, do not go into the archive', () => {
  const tables = tablesWith(6, true)
  const unread = [{ column: 'score' as const, value: 'I met the captain yesterday', rows: 3 }]
  const flat = flattenIntake({ ...tables, accounting: { ...tables.accounting, unread } })
  expect(JSON.stringify(flat)).not.toContain('captain')
  expect(unflattenIntake(flat).accounting.unread).toEqual([])
})

test('facts of another make are refused, at the key that is wrong', () => {
  const { facts } = flattenIntake(tablesWith(7, true))
  expect(readFacts(JSON.stringify(facts))).toEqual(facts)
  expect(() => readFacts(JSON.stringify({ ...facts, timeline: { ...facts.timeline, current: 1.5 } }))).toThrow('current')
  expect(() => readFacts(JSON.stringify({ ...facts, author: 'x' }))).toThrow('author')
  expect(() => readFacts('{')).toThrow(SyntaxError)
})
