import { describe, expect, test } from 'vitest'
import type { IntakeTables } from '../../../model/intake/intake-tables.ts'
import { dayNumber } from '../../../generator/calendar/days.ts'
import { readPlainly } from './plain-reading.ts'
import { labelNames, spokenAccount, spokenRows, spokenTables } from './spoken-account.ts'
import { pullPlainly, segmentsPlainly, stayingPlainly, type SpokenRow } from './who-speaks-plainly.ts'

const benchmark = [{ margin: 'segment', levels: ['Islander', 'visitor', 'freight'] }, { margin: 'topic', levels: ['Fares'] }]
const plainly = (rows: ReturnType<typeof spokenRows>, month: string): readonly SpokenRow[] => readPlainly(rows.map(({ row }) => row), month).modelled

/** The review's month has an end within a week, so that a step lies in the month after. */
describe.each([[1, '2025-04'], [2, '2025-03'], [3, '2025-12'], [4, '2025-02']])('of random rows, seed %i, reviewed in %s,', (seed, month) => {
  const given = spokenRows(seed, 420)
  const rows = plainly(given, month)
  const reading = spokenTables(given, spokenAccount(), { period: month, threads: 2, labels: true, margins: benchmark })

  test('authors by step and venue, extremes and staying are as counted plainly', async () => {
    const { authors, extremes, staying, timeline, factors } = await reading
    const venues = factors[0].levels.map(({ name }) => name)
    for (const [step, date] of timeline.steps.entries()) {
      for (const [v, venue] of venues.entries()) {
        const here = rows.filter((row) => row.step === dayNumber(date) && row.venue === venue)
        expect(authors.byStepVenue[step * venues.length + v]).toBe(new Set(here.map((row, index) => row.author || `nobody ${index}`)).size)
      }
      expect(venues.reduce((sum, _, v) => sum + authors.byStepVenue[step * venues.length + v], 0)).toBe(authors.byStep[step])
    }
    expect(extremes.map(({ period, venue, ...counts }) => [timeline.periods[period].name, venues[venue], counts])).toEqual(
      timeline.periods.flatMap(({ name }) => venues.flatMap((venue) => {
        const here = rows.filter((row) => row.month === name && row.venue === venue)
        return here.length === 0 ? [] : [[name, venue, { mentions: here.length, extremes: here.filter(({ score }) => Math.abs(score) === 1).length }]]
      })))
    const table = new Map(staying.map((row) => [`${timeline.periods[row.period].name}|${row.stance}`, [row.authors, row.stayed] as const]))
    expect(table).toEqual(stayingPlainly(rows, month))
    expect([...table.keys()]).toEqual([...table.keys()].sort())
  })

  test('labels of a cell are counted, two of one score apart, and give its mean', async () => {
    const { cells, labels, noLabels, factors, timeline } = await reading
    expect([noLabels, labels!.names, [...labels!.scores]]).toEqual([null, labelNames, [-1, -0.3, 0, 0, 1]])
    for (let cell = 0; cell < cells.count; cell++) {
      const [venue, topic, poster] = factors.map((factor, f) => factor.levels[cells.levels[f][cell]].name)
      const inside = rows.filter((row) => row.step === dayNumber(timeline.steps[cells.step[cell]]) && row.venue === venue && (row.topic || 'none') === topic && row.poster === poster)
      const counts = [...labels!.counts.subarray(cell * labelNames.length, (cell + 1) * labelNames.length)]
      expect(counts).toEqual(labelNames.map((name) => inside.filter(({ tone }) => tone === name).length))
      expect(counts.reduce((sum, count) => sum + count, 0)).toBe(cells.mentions[cell])
      expect(counts.reduce((sum, count, l) => sum + count * labels!.scores[l], 0) / cells.mentions[cell]).toBeCloseTo(cells.mean[cell], 9)
    }
  })

  test('authors by the margins of a benchmark are as counted plainly', async () => {
    const { segments, timeline, authors } = await reading
    const spelled: Readonly<Record<string, string>> = { fares: 'Fares', crew: 'crew' }
    const wanted = segmentsPlainly(rows.filter((row) => row.month === month), [(row) => row.segment || null, (row) => spelled[row.topic] ?? null])
    const found = new Map(segments!.rows.map(({ levels, ...sums }) => [levels.map((level, m) => (level < 0 ? '?' : segments!.levels[m][level])).join('|'), sums]))
    expect([...found.keys()].sort()).toEqual([...wanted.keys()].sort())
    for (const [key, [count, sum, squares]] of wanted) {
      expect(found.get(key)!.authors).toBe(count)
      expect(found.get(key)!.sum).toBeCloseTo(sum, 7)
      expect(found.get(key)!.squares).toBeCloseTo(squares, 7)
    }
    for (const levels of segments!.levels) expect(levels).toEqual([...levels].sort())
    const total = segments!.rows.reduce((sum, row) => sum + row.authors, 0)
    expect(total).toBe(timeline.current < 0 ? 0 : authors.byPeriod[timeline.current])
  })

  test('no author, id or thread is in the tables', async () => {
    expect(JSON.stringify(await reading)).not.toMatch(/handle-|talk-|"p\d+"/)
  })
})

const cellOf = (row: SpokenRow): string => `${row.venue}|${row.topic}|${row.month}`
const pullOf = ({ pull, factors }: IntakeTables) => pull.map((row) => ({ ...row, venue: factors[0].levels[row.venue].name, poster: row.poster < 0 ? null : factors.find(({ name }) => name === 'poster')!.levels[row.poster].name }))

describe('the pull of the thread', () => {
  test.each([
    [5, 700, '', cellOf], [6, 700, 'places', cellOf], [7, 200, 'smallest_group: 12\n', cellOf], [8, 700, 'factors: [venue]\n', (row: SpokenRow) => `${row.venue}|${row.month}`],
  ])('is the regression made plainly, seed %i of %i rows, %j', async (seed, count, more, cell) => {
    const given = spokenRows(seed, count)
    const rows = plainly(given, '2025-12').map((row) => (more.includes('places') ? row : { ...row, place: Number.NaN }))
    const posters = more.includes('factors') ? [null] : [null, 'occasional', 'prolific', 'regular']
    const least = more.includes('smallest') ? 12 : 10
    const all = ['blog', 'boards'].flatMap((venue) => posters.map((poster) => ({ venue, poster, plain: pullPlainly(rows, venue, poster, cell)! }))).filter(({ plain }) => plain !== null)
    const shown = all.filter(({ plain }) => plain.replies >= 50 && plain.authors >= least)
    const found = pullOf(await spokenTables(given, spokenAccount(more), { period: '2025-12' }))
    expect(found.map(({ venue, poster, replies, authors }) => [venue, poster, replies, authors])).toEqual(shown.map(({ venue, poster, plain }) => [venue, poster, plain.replies, plain.authors]))
    expect(shown.length).toBeGreaterThan(0)
    // Fewer rows leave some group out: the mask is seen at work.
    if (count < 300) expect(shown.length).toBeLessThan(all.length)
    for (const [index, { plain }] of shown.entries()) {
      expect(found[index].slope).toBeCloseTo(plain.slope, 5)
      expect(found[index].standardError).toBeCloseTo(plain.standardError, 5)
    }
  })

  test('has a numerator of nothing on average where nobody follows anybody, which leaving the reply out is for', () => {
    const sums = Array.from({ length: 240 }, (_, seed) => {
      const rows = plainly(spokenRows(100 + seed, 160), '2025-12')
      return [true, false].map((leaveOut) => pullPlainly(rows, 'boards', null, cellOf, leaveOut)!.xy)
    })
    const mean = (values: readonly number[]): number => values.reduce((sum, value) => sum + value, 0) / values.length
    const error = (values: readonly number[]): number => Math.sqrt(values.reduce((sum, value) => sum + (value - mean(values)) ** 2, 0) / (values.length - 1) / values.length)
    const fair = sums.map(([xy]) => xy)
    const lower = sums.map(([xy, shared]) => shared - xy)
    expect(Math.abs(mean(fair))).toBeLessThan(3 * error(fair))
    expect(mean(lower)).toBeLessThan(-3 * error(lower))
  })

  test('is not looked for without threads', async () => {
    const account = spokenAccount().replace(', thread: talk', '')
    expect((await spokenTables(spokenRows(5, 300), account, { period: '2025-12' })).pull).toEqual([])
  })
})

test('one, two and four threads give the same tables', async () => {
  for (const seed of [11, 12]) {
    const given = spokenRows(seed, 600)
    const options = { period: '2025-04', labels: true, margins: benchmark }
    const alone = await spokenTables(given, spokenAccount('places'), { ...options, threads: 1 })
    expect(alone.pull.length * alone.staying.length * alone.segments!.rows.length).toBeGreaterThan(0)
    for (const threads of [2, 4]) expect(await spokenTables(given, spokenAccount('places'), { ...options, threads })).toEqual(alone)
  }
})
