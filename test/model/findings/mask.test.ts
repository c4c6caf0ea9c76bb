import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import type { Analysis } from '../../../model/analyse.ts'
import type { IntakeTables } from '../../../model/intake/intake-tables.ts'
import { createGenerator } from '../../../model/random/generator.ts'
import { analyseHere } from '../../support/analyse-reference.ts'
import { simulateCells } from '../../support/simulate-cells.ts'

const bound = 10
/** What people said, or how they did: told of no fewer than the bound. */
const telling = ['raw', 'spread', 'spread_change', 'top_share', 'gini', 'effective_authors', 'stayed', 'heard', 'talk', 'gap'] as const

/** Every object of the findings that counts its authors. */
function counted(value: unknown, path: string): readonly { readonly path: string; readonly object: Readonly<Record<string, unknown>> }[] {
  if (Array.isArray(value)) return value.flatMap((item, i) => counted(item, `${path}[${i}]`))
  if (typeof value !== 'object' || value === null) return []
  const object = value as Readonly<Record<string, unknown>>
  const own = typeof object['authors'] === 'number' ? [{ path, object }] : []
  return [...own, ...Object.entries(object).flatMap(([key, part]) => counted(part, `${path}.${key}`))]
}

const shape = fc.record({ seed: fc.integer({ min: 0, max: 1e6 }), venues: fc.integer({ min: 2, max: 5 }), topics: fc.integer({ min: 1, max: 4 }), mentions: fc.integer({ min: 6, max: 60 }) })

async function analysed({ seed, venues, topics, mentions }: { seed: number; venues: number; topics: number; mentions: number }): Promise<{ readonly tables: IntakeTables; readonly analysis: Analysis }> {
  const { tables } = simulateCells({
    steps: 12, venues, topics, posters: 2, mentionsPerStep: mentions, sigmas: { mu: 0.02, venueDrift: Array.from({ length: venues }, () => 0.01), venue: 0.2, topic: 0.2, poster: 0.1, tau: 0.05 },
    mix: { venue: { from: Array.from({ length: venues }, (_, v) => 1 / (v + 1) ** 3), to: Array.from({ length: venues }, (_, v) => 1 / (v + 1) ** 3) } },
  }, createGenerator(seed, 0))
  return { tables, analysis: await analyseHere(tables, { seed: 1 }) }
}

describe('small groups', () => {
  test('no figure of what people said rests on fewer authors than may be shown', async () => {
    await fc.assert(fc.asyncProperty(shape, async (given) => {
      const { tables, analysis } = await analysed(given)
      for (const { path, object } of counted(analysis, 'findings')) {
        if ((object['authors'] as number) >= bound) continue
        for (const key of telling) expect([path, key, object[key] ?? null]).toEqual([path, key, null])
      }
      expect(analysis.speaking.pull.every(({ authors }) => authors >= bound)).toBe(true)
      const venues = tables.factors[0].levels
      for (const { venue, series } of analysis.venues) {
        const v = venues.findIndex(({ name }) => name === venue)
        series.forEach(({ raw }, t) => { if (raw !== null) expect(tables.authors.byStepVenue[t * venues.length + v]).toBeGreaterThanOrEqual(bound) })
      }
      // a level is told of only if it once had as many authors
      for (const [f, names] of [[0, analysis.venues.map(({ venue }) => venue)], [1, analysis.topics.map(({ topic }) => topic)]] as const) {
        const { levels } = tables.factors[f]
        for (const name of names) {
          const l = levels.findIndex((level) => level.name === name)
          expect(Math.max(...tables.timeline.periods.map((_, p) => tables.authors.byPeriodLevel[f][p * levels.length + l]))).toBeGreaterThanOrEqual(bound)
        }
      }
    }), { numRuns: 6 })
  }, 120_000)

  test('it can fail: there are small groups in such accounts, and some are left out', async () => {
    const { tables, analysis } = await analysed({ seed: 3, venues: 5, topics: 3, mentions: 25 })
    expect(tables.authors.byStepVenue.some((authors) => authors > 0 && authors < bound)).toBe(true)
    expect(analysis.venues.length).toBeLessThan(5)
    expect(analysis.venues.some(({ series }) => series.some(({ raw, mentions }) => raw === null && mentions > 0))).toBe(true)
  })
})
