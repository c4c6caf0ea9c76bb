import { readdirSync, readFileSync, statSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, test } from 'vitest'
import { makePellwick } from '../../sample-data/make-pellwick-cycles.ts'
import { opinionOver, tellStory, weeks } from '../../sample-data/making-pellwick/story.ts'

const folder = join(import.meta.dirname, '../../sample-data/pellwick-cycles')
const made = makePellwick()

interface Cell { readonly step: string; readonly venue: string; readonly topic: string; readonly poster: string; readonly mentions: number; readonly authors: number; readonly mean: number; readonly variance: string; readonly deff: number }
const lines = (path: string, files = made) => Buffer.from(files.find((file) => file.path === path)!.bytes).toString().trim().split('\n').slice(1).map((line) => line.split(','))
const cells: readonly Cell[] = lines('cells/wochen.csv').map(([step, venue, topic, poster, mentions, authors, mean, variance, deff]) =>
  ({ step, venue, topic, poster, mentions: Number(mentions), authors: Number(authors), mean: Number(mean), variance, deff: Number(deff) }))
const sum = (values: readonly number[]) => values.reduce((total, value) => total + value, 0)
const mentionsOf = (part: readonly Cell[]) => sum(part.map((cell) => cell.mentions))
/** A week counts in the month that holds its Thursday. */
const monthOf = ({ step }: { step: string }) => new Date(Date.parse(step) + 3 * 86_400_000).toISOString().slice(0, 7)
const rawOf = (part: readonly Cell[]) => (100 * sum(part.map((cell) => cell.mentions * cell.mean))) / mentionsOf(part)
const inMonth = (month: string) => cells.filter((cell) => monthOf(cell) === month)

describe('the committed files', () => {
  test('are what the program makes, byte for byte', () => {
    for (const { path, bytes } of made) expect(readFileSync(join(folder, path)).equals(Buffer.from(bytes)), path).toBe(true)
  })

  test('it can fail, and each stream of draws is its own: another seed of one changes one file', () => {
    const changed = (other: typeof made) => other.filter(({ bytes }, i) => !Buffer.from(bytes).equals(Buffer.from(made[i].bytes))).map(({ path }) => path)
    expect(changed(makePellwick(2))).toEqual(['cells/wochen.csv'])
    expect(changed(makePellwick(1, 2))).toEqual(['survey/wellen.csv'])
  })

  test('stay small', () => {
    const own = readdirSync(folder, { recursive: true, encoding: 'utf8' }).filter((path) => !/^(cache|drafts)(\/|$)/.test(path))
    expect(sum(own.map((path) => statSync(join(folder, path))).filter((stat) => stat.isFile()).map(({ size }) => size))).toBeLessThan(120_000)
  })
})

describe('the data are as TRUTH.md says', () => {
  test('thin, week by week, over eighteen months', () => {
    const perWeek = [...new Set(cells.map(({ step }) => step))].map((step) => mentionsOf(cells.filter((cell) => cell.step === step)))
    expect(perWeek).toHaveLength(weeks)
    expect([Math.min(...perWeek), Math.max(...perWeek), sum(perWeek), cells.length]).toEqual([12, 43, 2099, 1021])
    expect(['2026-09', '2026-10'].map((month) => mentionsOf(inMonth(month)))).toEqual([97, 92])
    expect(cells.filter(({ mentions }) => mentions === 1).length / cells.length).toBeCloseTo(0.48, 2)
    expect(sum(inMonth('2026-10').filter(({ poster }) => poster === 'prolific').map(({ authors }) => authors))).toBe(8)
  })

  test('opinion falls by eight points in the spring of 2026 and comes back half way', () => {
    const opinion = (month: string) => {
      const part = tellStory().filter(({ monday }) => monthOf({ step: monday }) === month)
      return (100 * sum(part.map((week) => week.opinion))) / part.length
    }
    expect(['2026-08', '2026-09', '2026-10'].map((month) => Number(opinion(month).toFixed(1)))).toEqual([1.4, 2.7, 4.2])
    expect(opinion('2026-03') - opinion('2026-05')).toBeCloseTo(8, 0)
    expect(opinionOver(Date.UTC(2026, 2, 16), Date.UTC(2026, 2, 16))).toBeCloseTo(7, 0)
  })

  test('the raw average jumps about', () => {
    expect(['2026-08', '2026-09', '2026-10'].map((month) => Number(rawOf(inMonth(month)).toFixed(1)))).toEqual([7.7, -8.8, -1.6])
  })

  test('offsets show in the raw averages over all months', () => {
    /** In standard errors, single scores having a standard deviation of 58 points: how far two groups' difference lies from the truth. */
    const off = (one: readonly Cell[], other: readonly Cell[], truth: number) =>
      Math.abs(rawOf(one) - rawOf(other) - truth) / (58 * Math.sqrt(1 / mentionsOf(one) + 1 / mentionsOf(other)))
    const where = (key: 'venue' | 'topic', level: string) => cells.filter((cell) => cell[key] === level)
    expect(off(where('venue', 'fachhandel'), where('venue', 'forum'), 24)).toBeLessThan(2.6)
    expect(off(where('topic', 'rad'), where('topic', 'lieferung'), 28)).toBeLessThan(2.6)
    // it can fail
    expect(off(where('venue', 'fachhandel'), where('venue', 'forum'), 10)).toBeGreaterThan(2.6)
  })

  test('a single post has no variance, several have one, and design effects begin at 1', () => {
    for (const cell of cells) {
      expect(cell.variance === '', cell.step).toBe(cell.mentions === 1)
      expect(cell.deff).toBeGreaterThanOrEqual(1)
      expect(cell.deff === 1).toBe(cell.authors === cell.mentions)
    }
  })

  test('four waves, of which only the last has enough owners to be shown', () => {
    const rows = lines('survey/wellen.csv')
    expect([...new Set(rows.map(([wave]) => wave))]).toEqual(['2025-Q4', '2026-Q1', '2026-Q2', '2026-Q3'])
    const owners = rows.filter(([, , , metric, segment]) => metric === 'sympathy' && segment === 'Besitzer').map((row) => Number(row[6]))
    expect(owners.map((effective) => effective >= 30)).toEqual([false, false, false, true])
  })
})
