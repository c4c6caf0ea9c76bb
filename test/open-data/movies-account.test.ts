import { mkdtemp, readFile, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, describe, expect, test } from 'vitest'
import { parse } from 'yaml'
import { pairedDifference, readFilms, scales, writeMoviesAccount } from './movies-account.ts'

const difference = pairedDifference()

describe('critics less audience, the same films judged by both', () => {
  test('is -0.178 with standard error 0.010 on 1,499 films', () => {
    expect(difference.films).toBe(1499)
    expect(difference.mean).toBeCloseTo(-0.178, 3)
    expect(difference.standardError).toBeCloseTo(0.01, 3)
  })

  test('grows from about -0.09 in 1998 to about -0.20 in the later years', () => {
    expect(difference.byYear[0].year).toBe(1998)
    expect(Math.abs(difference.byYear[0].mean + 0.09)).toBeLessThan(0.02)
    const later = difference.byYear.filter(({ year }) => year >= 2005)
    const films = later.reduce((sum, each) => sum + each.films, 0)
    expect(Math.abs(later.reduce((sum, each) => sum + each.mean * each.films, 0) / films + 0.2)).toBeLessThan(0.02)
  })

  test('years add up to the whole', () => {
    expect(difference.byYear).toHaveLength(12)
    expect(difference.byYear.reduce((sum, { films }) => sum + films, 0)).toBe(1499)
    expect(difference.byYear.reduce((sum, { mean, films }) => sum + mean * films, 0) / 1499).toBeCloseTo(difference.mean, 10)
  })

  test('it can fail: were 0 the lowest audience mark, the difference would be another', () => {
    const paired = readFilms().filter(({ critics, audience }) => critics !== null && audience !== null)
    const fromZero = paired.reduce((sum, { critics, audience }) => sum + critics! / 50 - audience! / 5, 0) / paired.length
    expect(Math.abs(fromZero - difference.mean)).toBeGreaterThan(0.05)
  })
})

describe('the account', async () => {
  const folder = await mkdtemp(join(tmpdir(), 'movies-'))
  afterAll(() => rm(folder, { recursive: true }))
  const rows = async (name: string) => (await readFile(join(folder, name), 'utf8')).trimEnd().split('\n').slice(1).map((line) => line.split(','))

  test.each([[true, 1499, 1499], [false, 1545, 1992]])('paired only %s: one row per rating, inside its scale', async (pairedOnly, byCritics, byAudience) => {
    await writeMoviesAccount(folder, { pairedOnly })
    const [critics, audience] = [await rows('ratings/critics.csv'), await rows('ratings/audience.csv')]
    expect([critics.length, audience.length]).toEqual([byCritics, byAudience])
    if (pairedOnly) expect(critics.map(([film]) => film)).toEqual(audience.map(([film]) => film))
    for (const [part, name] of [[critics, 'critics'], [audience, 'audience']] as const) {
      expect(new Set(part.map(([film]) => film)).size).toBe(part.length)
      for (const [, released, rater, rating] of part) {
        expect(released).toMatch(/^[A-Z][a-z]{2} \d{2} (199[89]|200\d)$/)
        expect(rater).toBe(name)
        expect(Number(rating)).toBeGreaterThanOrEqual(scales[name][0])
        expect(Number(rating)).toBeLessThanOrEqual(scales[name][1])
      }
    }
  })

  test('its file names every genre, months and quarters', async () => {
    await writeMoviesAccount(folder)
    const account = parse(await readFile(join(folder, 'account.yaml'), 'utf8')) as Record<string, unknown> & { topics: Record<string, { values: string[] }> }
    expect(account).toMatchObject({ grid: 'month', reporting: 'quarter' })
    const named = Object.values(account.topics).flatMap(({ values }) => values)
    const used = (await rows('ratings/audience.csv')).map((fields) => fields[4]).filter((genre) => genre !== '')
    expect(new Set(used)).toEqual(new Set(named))
  })
})
