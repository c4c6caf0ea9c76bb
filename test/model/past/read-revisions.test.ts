import { beforeAll, describe, expect, test } from 'vitest'
import type { Analysis } from '../../../model/analyse.ts'
import { definitionChanges, type Definition } from '../../../model/past/definition.ts'
import { auditOf, type Past, type SealedReview } from '../../../model/past/past.ts'
import type { IntakeTables } from '../../../model/intake/intake-tables.ts'
import { createGenerator } from '../../../model/random/generator.ts'
import { analyseHere } from '../../support/analyse-reference.ts'
import { simulateCells } from '../../support/simulate-cells.ts'
import { tablesUpTo, withoutSome } from './cut-tables.ts'

const simulated = simulateCells({
  steps: 38, venues: 3, topics: 2, posters: 2, mentionsPerStep: 300,
  sigmas: { mu: 0.02, venueDrift: [0.005, 0.005, 0.005], venue: 0.1, topic: 0.1, poster: 0.1, tau: 0.03 },
}, createGenerator(11, 0)).tables
const names = simulated.timeline.periods.slice(0, simulated.timeline.current + 1).map(({ name }) => name)
const [august, september] = [names.at(-2)!, names.at(-1)!]

const definition: Definition = {
  brand: 'Any', grid: 'week', reporting: 'month', base: simulated.timeline.base, factors: ['venue', 'topic', 'poster'],
  levels: { venue: [], topic: [] }, anchors: [], posters: { occasional: 1, regular: 5 }, targetMix: {}, sources: ['one'], major: 0,
}
const madeBy = { version: '0.1.0', model: 'a' }

function sealedAs(period: string, tables: IntakeTables, analysis: Analysis, more: Partial<SealedReview> = {}): SealedReview {
  const { opinion, coder, advice, interval } = analysis
  return {
    name: period, period, revision: 1, reason: null, sealedOn: '2024-10-03', madeBy, manifest: period, definition, tables,
    told: { level: opinion.period, change: opinion.change, interval, audit: auditOf(coder), advice: advice.map((piece) => ({ ...piece, action: 'Do it', success: 'It is done' })) },
    ...more,
  }
}
const pastOf = (reviews: readonly SealedReview[], now: Partial<Definition> = {}, program = madeBy): Past => ({ definition: { ...definition, ...now }, program, reviews })
const revisionsOf = async (past: Past, tables = simulated) => (await analyseHere(tables, { past })).revisions!

let before: Analysis
beforeAll(async () => { before = await analyseHere(tablesUpTo(simulated, august)) })

describe('a period that was sealed, and nothing came in for it', () => {
  test('moves by what came after alone; the parts sum to the whole', async () => {
    const { periods: [revised], typical, late, breaks } = await revisionsOf(pastOf([sealedAs(august, tablesUpTo(simulated, august), before)]))
    expect(revised).toMatchObject({ period: august, late: 0, gone: 0, redefined: [], bridged: true, program_changed: false, revised: null })
    expect(revised.level).toEqual(before.opinion.period)
    expect(Math.abs(revised.moved!)).toBeGreaterThan(0.01)
    expect(revised.moved).toBeCloseTo(revised.level_now!.mean - before.opinion.period.mean, 12)
    expect(revised.parts!.late_posts).toBeCloseTo(0, 9)
    expect(revised.parts!.later_posts).toBeCloseTo(revised.moved!, 9)
    expect([late, breaks]).toEqual([0, []])
    expect(typical).toMatchObject({ periods: 1, level: Math.abs(revised.moved!) })
  })
  test('its last step, which the period’s end had cut, is completed: no lateness', async () => {
    const cut = tablesUpTo(simulated, august, 0.4)
    const { periods: [revised] } = await revisionsOf(pastOf([sealedAs(august, cut, await analyseHere(cut))]))
    expect([revised.late, revised.gone]).toEqual([0, 0])
    expect(revised.parts!.late_posts).toBeCloseTo(0, 9)
  })
  test('without a seal there is nothing to look back at', async () => {
    const found = await analyseHere(simulated)
    expect([found.revisions, found.follow_up, found.opinion.previous_sealed]).toEqual([null, null, null])
  })
  test('the figure of the period before is told as it was sealed last', async () => {
    const first = sealedAs(august, tablesUpTo(simulated, august), before)
    const again = { ...first, name: `${august}.r2`, revision: 2, reason: 'a mistake', told: { ...first.told, level: { mean: 1, low: 0, high: 2, sd: 0.5 } } }
    const found = await analyseHere(simulated, { past: pastOf([first, again]) })
    expect(found.opinion.previous_sealed).toEqual(again.told.level)
    expect(found.revisions!.periods[0]).toMatchObject({ level: first.told.level, revised: { review: `${august}.r2`, revision: 2, reason: 'a mistake', level: again.told.level } })
  })
})

describe('late posts', () => {
  const step = simulated.timeline.periodOf.indexOf(simulated.timeline.current - 1) + 1
  const { tables: short, mentions } = withoutSome(tablesUpTo(simulated, august), step, 0, 0.9)
  test('are counted, and told apart from what came after', async () => {
    expect(mentions).toBeGreaterThan(50)
    const { periods: [revised], late } = await revisionsOf(pastOf([sealedAs(august, short, await analyseHere(short))]))
    expect([revised.late, revised.gone, late]).toEqual([mentions, 0, mentions])
    const { late_posts, account, program, later_posts } = revised.parts!
    expect(Math.abs(late_posts!)).toBeGreaterThan(0.01)
    expect(late_posts! + account + program + later_posts).toBeCloseTo(revised.moved!, 9)
  })
  test('so are those that are gone', async () => {
    const now = withoutSome(simulated, step, 1, 0.5)
    const { periods: [revised] } = await revisionsOf(pastOf([sealedAs(august, tablesUpTo(simulated, august), before)]), now.tables)
    expect([revised.late, revised.gone]).toEqual([0, now.mentions])
  })
})

describe('another program, another account file', () => {
  const sealed = (): SealedReview => sealedAs(august, tablesUpTo(simulated, august), before)
  test('what neither the posts account for is the program’s, if that changed', async () => {
    const { periods: [revised] } = await revisionsOf(pastOf([{ ...sealed(), told: { ...sealed().told, level: { ...before.opinion.period, mean: before.opinion.period.mean + 5 } } }], {}, { version: '0.2.0', model: 'b' }))
    expect(revised.program_changed).toBe(true)
    expect(revised.parts!.program).toBeLessThan(-4)
    expect(revised.parts!.account).toBe(0)
  })
  test('a break is told once, between the last sealed period and this one; joined venues are bridged', async () => {
    const levels = { ...definition.levels, venue: [{ name: 'venue-1', values: ['venue-1', 'venue-2'] }] }
    const { breaks, periods: [revised] } = await revisionsOf(pastOf([sealed()], { levels }), joined())
    expect(breaks).toEqual([{ after: august, before: september, parts: ['venues'], bridged: true }])
    expect(revised).toMatchObject({ redefined: ['venues'], bridged: true, late: 0, gone: 0 })
    expect(revised.parts!.late_posts).toBeCloseTo(0, 9)
    const { late_posts, account, program, later_posts } = revised.parts!
    expect(late_posts! + account + program + later_posts).toBeCloseTo(revised.moved!, 9)
  })
  test('posts that are scored otherwise can’t be read anew: the rest is the account’s, lateness is not told apart', async () => {
    const { breaks, periods: [revised] } = await revisionsOf(pastOf([sealed()], { sources: ['another'] }))
    expect(breaks).toEqual([{ after: august, before: september, parts: ['sources'], bridged: false }])
    expect(revised.parts).toEqual({ late_posts: null, account: revised.moved, program: 0, later_posts: 0 })
  })
})

/** The present tables with the first two venues as one. */
function joined(): IntakeTables {
  const { cells, factors } = simulated
  const groups = new Map<string, number[]>()
  for (let c = 0; c < cells.count; c++) {
    const key = [cells.step[c], Math.max(0, cells.levels[0][c] - 1), cells.levels[1][c], cells.levels[2][c]].join(' ')
    groups.set(key, [...groups.get(key) ?? [], c])
  }
  const sorted = [...groups].map(([key, members]) => ({ place: key.split(' ').map(Number), members })).sort((a, b) => a.place.map((x, i) => x - b.place[i]).find((x) => x !== 0) ?? 0)
  const total = (members: readonly number[], of: (c: number) => number) => members.reduce((sum, c) => sum + of(c), 0)
  const mentions = Float64Array.from(sorted, ({ members }) => total(members, (c) => cells.mentions[c]))
  const mean = Float64Array.from(sorted, ({ members }, g) => total(members, (c) => cells.mentions[c] * cells.mean[c]) / mentions[g])
  return {
    ...simulated, factors: [{ name: 'venue', levels: [factors[0].levels[0], factors[0].levels[2]] }, ...factors.slice(1)],
    variation: [null, null].map((_, v) => (v === 1 ? simulated.variation[2] : sumOf(simulated.variation[0]!, simulated.variation[1]!))),
    accounting: { ...simulated.accounting, withAuthor: Float64Array.of(simulated.accounting.withAuthor[0] + simulated.accounting.withAuthor[1], simulated.accounting.withAuthor[2]) },
    authors: { ...simulated.authors, byStepVenue: pairs(simulated.authors.byStepVenue), byPeriodLevel: [pairs(simulated.authors.byPeriodLevel[0]), ...simulated.authors.byPeriodLevel.slice(1)] },
    concentration: simulated.concentration.map((row) => ({ ...row, venue: row.venue === -1 ? -1 : Math.max(0, row.venue - 1) })),
    cells: {
      count: sorted.length, step: Int32Array.from(sorted, ({ place }) => place[0]), levels: [1, 2, 3].map((i) => Int32Array.from(sorted, ({ place }) => place[i])),
      mentions, authors: mentions.slice(), mean, freedom: mentions.map((n) => n - 1),
      squares: Float64Array.from(sorted, ({ members }, g) => total(members, (c) => cells.squares[c] + cells.mentions[c] * (cells.mean[c] - mean[g]) ** 2)),
      clustering: new Float64Array(sorted.length).fill(1), deff: new Float64Array(sorted.length).fill(NaN),
    },
  }
}

function pairs(counts: Float64Array): Float64Array {
  return Float64Array.from({ length: counts.length / 3 * 2 }, (_, i) => (i % 2 === 0 ? counts[1.5 * i] + counts[1.5 * i + 1] : counts[1.5 * (i - 1) + 2]))
}

function sumOf<T extends object>(a: T, b: T): T {
  return Object.fromEntries(Object.entries(a).map(([key, value]) => [key, (value as number) + (b as Record<string, number>)[key]])) as T
}

describe('definitions', () => {
  const changed = (more: Partial<Definition>) => definitionChanges(definition, { ...definition, ...more })
  test('the same is no change, nor is a level that is named and listed as itself, nor another order', () => {
    expect(changed({})).toEqual([])
    expect(changed({ levels: { ...definition.levels, venue: [{ name: 'venue-1', values: [] }, { name: 'venue-2', values: ['venue-2'] }] } })).toEqual([])
    expect(changed({ factors: ['poster', 'venue', 'topic'] })).toEqual([])
  })
  test.each<[Partial<Definition>, string]>([
    [{ brand: 'Another' }, 'brand'], [{ grid: 'day' }, 'grid'], [{ reporting: 'week' }, 'reporting'], [{ base: { from: '2024-01-01', to: '2024-02-01' } }, 'base'],
    [{ factors: ['venue', 'topic'] }, 'factors'], [{ levels: { venue: [{ name: 'a', values: ['b'] }], topic: [] } }, 'venues'], [{ anchors: ['venue-1'] }, 'venues'],
    [{ levels: { venue: [], topic: [{ name: 'a', values: ['b'] }] } }, 'topics'], [{ posters: { occasional: 2, regular: 5 } }, 'posters'],
    [{ targetMix: { venue: { a: 1 } } }, 'target_mix'], [{ sources: [] }, 'sources'], [{ major: 1 }, 'program'],
  ])('%j is a change of %s', (more, part) => { expect(changed(more)).toEqual([part]) })
})
