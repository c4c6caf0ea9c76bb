import { describe, expect, test } from 'vitest'
import { readMentionShares, venueWeights } from '../../../model/competitors/mention-shares.ts'
import { drawCount, venueCounts } from '../../../model/competitors/venue-counts.ts'
import type { ConcentrationRow, IntakeTables } from '../../../model/intake/intake-tables.ts'
import { createGenerator } from '../../../model/random/generator.ts'
import { mean, sampleVariance } from '../../../model/statistics/moments.ts'
import { simulateCells } from '../../support/simulate-cells.ts'

const venues = ['blogs', 'boards']
const { timeline } = simulateCells({
  steps: 26, venues: 2, topics: 1, posters: 1, mentionsPerStep: 10, sigmas: { mu: 0.01, venueDrift: [0.01, 0.01], venue: 0.1, topic: 0.1, poster: 0.1, tau: 0.1 },
}, createGenerator(1, 0)).tables
const baseSteps = timeline.steps.flatMap((_, t) => (timeline.inBase[t] === 1 ? [t] : []))
const stepIn = (period: number) => timeline.periodOf.indexOf(period)

interface Counts { readonly base: readonly number[], readonly previous: readonly number[], readonly now: readonly number[] }

/** Tables of a brand with so many mentions by venue in one step of the base, the period before and the one under review; each author posts `each` times. */
function brandOf({ base, previous, now }: Counts, each = 1): IntakeTables {
  const rows = ([[baseSteps[0], base], [stepIn(timeline.current - 1), previous], [stepIn(timeline.current), now]] as const)
    .flatMap(([step, counts]) => counts.map((mentions, venue) => ({ step, venue, mentions }))).filter(({ mentions }) => mentions > 0)
  const column = (of: (row: (typeof rows)[number]) => number) => Float64Array.from(rows, of)
  const concentration = rows.map(({ step, venue, mentions }): ConcentrationRow => ({ period: timeline.periodOf[step], venue, mentionsPerAuthor: each, authors: mentions / each }))
  return {
    timeline, concentration, factors: [{ name: 'venue', levels: venues.map((name) => ({ name, label: name })) }],
    cells: {
      count: rows.length, step: Int32Array.from(rows, ({ step }) => step), levels: [Int32Array.from(rows, ({ venue }) => venue)], mentions: column(({ mentions }) => mentions),
      authors: column(({ mentions }) => mentions / each), mean: column(() => 0), squares: column(() => 0), freedom: column(() => 0), clustering: column(() => each), deff: column(() => NaN),
    },
  } as Partial<IntakeTables> as IntakeTables
}

const sharesOf = (brands: readonly [IntakeTables, ...(IntakeTables | null)[]], seed = 1) => readMentionShares(brands, venues, venueWeights(brands, venues), 0.9, createGenerator(seed, 0))

describe('as counted', () => {
  const own = brandOf({ base: [50, 50], previous: [30, 30], now: [40, 80] })
  const other = brandOf({ base: [50, 50], previous: [20, 20], now: [20, 60] })
  const { raw, differences } = sharesOf([own, other])

  test('shares are those of the counts, exactly, and sum to a hundred', () => {
    expect(raw.map((share) => share!.now.mean)).toEqual([60, 40])
    expect(raw.map((share) => share!.previous!.mean)).toEqual([60, 40])
    expect(raw.map((share) => share!.base)).toEqual([50, 50])
    expect(raw[0]!.change!.mean).toBeCloseTo(0, 12)
    expect(differences[1].raw!.mean).toBeCloseTo(20, 12)
    expect(differences[0]).toEqual({ raw: null, raw_movement: null, equal: null, equal_movement: null })
  })

  test('the interval is that of two compound counts: sd^2 = p^2 (1 - p)^2 (b_1 / n_1 + b_2 / n_2) to first order', () => {
    const sdOf = (each: number) => sharesOf([brandOf({ base: [50, 50], previous: [30, 30], now: [400, 800] }, each), brandOf({ base: [50, 50], previous: [20, 20], now: [200, 600] }, each)]).raw[0]!.now.sd
    const expected = (each: number) => 100 * 0.6 * 0.4 * Math.sqrt(each / 1200 + each / 800)
    // 4,000 draws know a standard deviation to 1.1 %
    for (const each of [1, 5]) expect(sdOf(each) / expected(each)).toBeCloseTo(1, 1)
    expect(sdOf(5) / sdOf(1)).toBeCloseTo(Math.sqrt(5), 1)
  })

  test('a brand without any mention has the share 0; of nothing at all nobody has a share', () => {
    expect(sharesOf([own, null]).raw.map((share) => share!.now.mean)).toEqual([100, 0])
    const silent = brandOf({ base: [10, 10], previous: [0, 0], now: [0, 0] })
    expect(sharesOf([silent, null])).toMatchObject({ raw: [null, null], equal: [null, null] })
  })
})

describe('at one mix of venues', () => {
  const base = [100, 300] as const
  const own = brandOf({ base, previous: [60, 60], now: [60, 60] })
  const other = brandOf({ base, previous: [20, 180], now: [20, 180] })

  test('it is the weighted sum of the brand’s parts of each venue', () => {
    // blogs weigh 1/4, boards 3/4; the brand has 3/4 and 1/4 of their mentions
    expect(sharesOf([own, other]).equal[0]!.now.mean).toBeCloseTo(100 * (0.25 * 0.75 + 0.75 * 0.25), 10)
  })

  test('a venue that grows tenfold for all brands moves it not at all, and the raw share by much', () => {
    const grown = ({ previous, now }: Counts) => brandOf({ base, previous, now: [10 * now[0], now[1]] })
    const { raw, equal } = sharesOf([grown({ base, previous: [60, 60], now: [60, 60] }), grown({ base, previous: [20, 180], now: [20, 180] })])
    expect(equal[0]!.change!.mean).toBeCloseTo(0, 10)
    expect(equal[0]!.movement).toBe('not-established')
    expect(raw[0]!.change!.mean).toBeGreaterThan(20)
    expect(raw[0]!.movement).toBe('up')
  })

  test('it can fail: what one brand gains in a venue shows', () => {
    expect(sharesOf([brandOf({ base, previous: [60, 60], now: [600, 60] }), other]).equal[0]!.change!.mean).toBeGreaterThan(3)
  })

  test('a venue without a mention of any brand drops out, and the others are scaled up', () => {
    const quiet = sharesOf([brandOf({ base, previous: [60, 60], now: [0, 60] }), brandOf({ base, previous: [20, 180], now: [0, 180] })])
    expect(quiet.equal[0]!.now.mean).toBeCloseTo(25, 10)
  })

  test('the same seed gives the same to the last bit, another one another interval about the same count', () => {
    const [one, again, another] = [1, 1, 2].map((seed) => sharesOf([own, other], seed).equal[0]!.now)
    expect(again).toEqual(one)
    expect(another.low).not.toBe(one.low)
    expect(another.mean).toBe(one.mean)
  })
})

describe('counts', () => {
  test('b is that of Kish, an unknown author one for each mention', () => {
    const tables = brandOf({ base: [1, 1], previous: [1, 1], now: [40, 6] }, 4)
    const partlyKnown = { ...tables, concentration: [{ period: timeline.current, venue: 0, mentionsPerAuthor: 4, authors: 5 }, { period: timeline.current, venue: -1, mentionsPerAuthor: 9, authors: 9 }] }
    // 20 mentions by five authors of four each, 20 by nobody known: (5 x 16 + 20) / 40
    expect(venueCounts(partlyKnown, venues, timeline.periods[timeline.current].name)).toEqual([{ mentions: 40, clustering: 2.5 }, { mentions: 6, clustering: 1 }])
    expect(venueCounts(null, venues, '2024-06')).toEqual(venueCounts(tables, venues, '1999-01'))
  })

  test('drawn counts have mean n and variance n b', () => {
    const generator = createGenerator(5, 0)
    const drawn = Float64Array.from({ length: 20_000 }, () => drawCount({ mentions: 300, clustering: 3 }, generator))
    expect(mean(drawn) / 300).toBeCloseTo(1, 2)
    expect(sampleVariance(drawn) / 900).toBeCloseTo(1, 1)
    expect(drawCount({ mentions: 0, clustering: 1 }, generator)).toBe(0)
  })
})
