import { beforeAll, describe, expect, test } from 'vitest'
import type { CompetitorTables } from '../../../model/competitors/competitor-tables.ts'
import type { Findings } from '../../../model/findings/schema.ts'
import { analyse } from '../../../model/analyse.ts'
import { localExecutor } from '../../../model/fit/executor.ts'
import { meanPath } from '../../../model/fit/mean-path.ts'
import type { IntakeTables } from '../../../model/intake/intake-tables.ts'
import { startFitThreads } from '../../../generator/threads/fit-threads.ts'
import { analyseHere, noInputs } from '../../support/analyse-reference.ts'
import { compareHere, twoBrands } from '../../support/two-brands.ts'

type Competitors = NonNullable<Findings['competitors']>

const given = (tables: IntakeTables | null, told: CompetitorTables['told'] = 'all'): CompetitorTables => ({ told, brands: [{ brand: 'Tarrin Line', tables }] })

/** Opinion of the brand rises by two points a week; the competitor's stands still. A kink would be followed too slowly: that is a limit of the model, told elsewhere. */
const riseAt = (t: number) => 0.02 + 0.02 * t
const steps = Array.from({ length: 26 }, (_, t) => t)
const even = { mu: 0.01, venueDrift: [0.003, 0.003, 0.003], venue: 0.1, topic: 0.1, poster: 0.1, tau: 0.03 }
const rising = twoBrands(3, { sigmas: { ...even, venue: 1e-9, topic: 1e-9, poster: 1e-9 }, mentionsPerStep: 600, paths: { mu: steps.map(riseAt) } })
const still = twoBrands(4, { sigmas: { ...even, venue: 1e-9, topic: 1e-9, poster: 1e-9 }, mentionsPerStep: 600, paths: { mu: steps.map(() => 0) } })

let found: Competitors
beforeAll(async () => { found = await compareHere(rising.own.tables, given(still.other.tables)) })

describe('a difference that is there', () => {
  test('is found, in level, change and since the base', () => {
    const [brand] = found.brands
    expect(brand).toMatchObject({ status: 'compared', covered: 1, left_out: [], converged: true })
    expect(brand.difference.movement).toBe('up')
    expect(brand.probability_above).toBeGreaterThan(0.99)
    expect(brand.change).toMatchObject({ movement: 'not-established', difference_movement: 'up' })
    expect(brand.since_base.difference_movement).toBe('up')
  })

  test('is the difference of the two levels, which the series ends with', () => {
    const [{ level, own_level: own, difference, series }] = found.brands
    expect(difference.level!.mean).toBeCloseTo(own!.mean - level!.mean, 9)
    expect(series.at(-1)).toEqual({ period: rising.own.tables.timeline.review.name, own, level })
    // separate fits are independent: variances add
    expect(difference.level!.sd ** 2 / (own!.sd ** 2 + level!.sd ** 2)).toBeCloseTo(1, 1)
  })
})

test('brands drawn from the priors: nine in ten 90 % intervals of level and of change hold the truth', async () => {
  let [levels, changes] = [0, 0]
  const runs = 6
  for (let seed = 1; seed <= runs; seed++) {
    const { own, other, difference, changeDifference } = twoBrands(seed)
    const [brand] = (await compareHere(own.tables, given(other.tables), seed)).brands
    const holds = (of: { readonly low: number; readonly high: number } | null, truth: number) => Number(of !== null && of.low <= truth && truth <= of.high)
    levels += holds(brand.difference.level, difference)
    changes += holds(brand.change.difference, changeDifference)
  }
  // of six at nine in ten, three or fewer come about once in sixty
  expect(levels).toBeGreaterThan(3)
  expect(changes).toBeGreaterThan(3)
}, 240_000)

describe('what is not told', () => {
  const silent = { level: null, own_level: null, difference: { level: null, movement: null }, probability_above: null, converged: null, covered: null, series: [] }
  const other = still.other.tables
  const withAuthors = (period: number, count: number): IntakeTables => ({ ...other, authors: { ...other.authors, byPeriod: other.authors.byPeriod.map((n, p) => (p === period ? count : n)) } })

  test('of fewer authors than may be shown nothing but counts', async () => {
    const { current } = other.timeline
    const [brand] = (await compareHere(rising.own.tables, given(withAuthors(current, 9)))).brands
    expect(brand).toMatchObject({ ...silent, status: 'thin', authors: 9 })
    expect(brand.mentions).toBeGreaterThan(100)
    expect(brand.share!.now.mean).toBe(found.brands[0].share!.now.mean)
  })

  test('ten are enough; a change wants ten before as well, and a period of the series its own', async () => {
    const { current } = other.timeline
    const [brand] = (await compareHere(rising.own.tables, given(withAuthors(current - 1, 9)))).brands
    expect(brand.status).toBe('compared')
    expect(brand.change).toEqual({ own: null, level: null, movement: null, difference: null, difference_movement: null })
    expect(brand.series.map(({ level }) => level === null)).toEqual(brand.series.map((_, p) => p === brand.series.length - 2))
    expect(brand.series.at(-2)!.own).not.toBeNull()
    expect((await compareHere(rising.own.tables, given(withAuthors(current, 10)))).brands[0].status).toBe('compared')
  })

  test('a competitor nobody writes of, or that no source tells apart, stands there with nothing', async () => {
    const absent = await compareHere(rising.own.tables, given(null))
    expect(absent.brands).toMatchObject([{ ...silent, status: 'absent', mentions: 0, rows: 0, share: { now: { mean: 0 } } }])
    const unread = await compareHere(rising.own.tables, given(null, 'none'))
    expect(unread).toMatchObject({ own: { share: null, equal_share: null }, brands: [{ ...silent, status: 'unread', share: null, share_difference: { raw: null } }], weight_heard: null })
  })

  test('shares are not told where only some sources tell brands apart; opinion is', async () => {
    const some = await compareHere(rising.own.tables, given(other, 'some'))
    expect(some).toMatchObject({ told: 'some', own: { share: null }, brands: [{ status: 'compared', share: null, equal_share: null }] })
  })

  test('where no venue is shared the two stand apart; where one is missing the rest is compared and told', async () => {
    const renamed = (from: number): IntakeTables => ({ ...other, factors: other.factors.map((factor, f) => (f > 0 ? factor : { ...factor, levels: factor.levels.map((level, l) => (l >= from ? { name: `x-${l}`, label: `X ${l}` } : level)) })) })
    expect((await compareHere(rising.own.tables, given(renamed(0)))).brands[0]).toMatchObject({ ...silent, status: 'apart' })
    const [partly] = (await compareHere(rising.own.tables, given(renamed(2)))).brands
    expect(partly).toMatchObject({ status: 'compared', left_out: [{ factor: 'venue', label: 'venue-3' }] })
    expect(partly.covered).toBeCloseTo(2 / 3, 1)
  })
})

test('the findings of the brand itself are the same to the last bit with a competitor and without', async () => {
  const apart = { competitors: null, caveats: null }
  const beside = await analyseHere(still.own.tables, { competitors: given(still.other.tables) })
  expect({ ...beside, ...apart }).toEqual({ ...await analyseHere(still.own.tables), ...apart })
  expect(beside.competitors!.brands[0].difference.level).not.toBeNull()
})

test('the same with any number of threads, to the last bit; another seed draws otherwise', async () => {
  const spec = { interval: 0.9, seed: 1, targetMix: {}, past: null, competitors: given(still.other.tables), facts: { smallestGroup: 10, labelScores: null, posterBounds: { occasional: 1, regular: 5 }, preparedBy: null, reviewedBy: null, timeZone: 'UTC', reporting: 'month' as const } }
  const started: { close(): Promise<void> }[] = []
  const threaded = await analyse(still.own.tables, noInputs, spec, {
    executorFor: (problem) => { const fit = startFitThreads(problem, 3); started.push(fit); return fit.executor }, refit: meanPath,
  })
  await Promise.all(started.map((fit) => fit.close()))
  const here = await analyse(still.own.tables, noInputs, spec, { executorFor: localExecutor, refit: meanPath })
  expect(JSON.stringify(threaded.competitors)).toBe(JSON.stringify(here.competitors))
  const other = await analyse(still.own.tables, noInputs, { ...spec, seed: 2 }, { executorFor: localExecutor, refit: meanPath })
  expect(JSON.stringify(other.competitors)).not.toBe(JSON.stringify(here.competitors))
})
