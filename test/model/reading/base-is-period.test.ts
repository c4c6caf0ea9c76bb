import { expect, test } from 'vitest'
import { createGenerator } from '../../../model/random/generator.ts'
import type { IntakeTables } from '../../../model/intake/intake-tables.ts'
import type { Findings } from '../../../model/findings/schema.ts'
import { periodsTable } from '../../../generator/tables/opinion-tables.ts'
import { venuesTable } from '../../../generator/tables/venue-tables.ts'
import { analyseHere } from '../../support/analyse-reference.ts'
import { simulateCells } from '../../support/simulate-cells.ts'

const sigmas = { mu: 0.02, venueDrift: [0.01, 0.01], venue: 0.1, topic: 0.1, poster: 0.1, tau: 0.03 }
const { tables } = simulateCells({ steps: 13, venues: 2, topics: 2, posters: 2, mentionsPerStep: 100, sigmas, baseSteps: 4 }, createGenerator(5, 0))

/** The same tables, reviewed with the period itself as base. */
function onItself(of: IntakeTables): IntakeTables {
  const { timeline } = of
  return { ...of, timeline: { ...timeline, inBase: timeline.inBase.map((_, t) => (timeline.periodOf[t] === timeline.current ? 1 : 0)) } }
}

const row = (rows: readonly Readonly<Record<string, unknown>>[]) => rows[rows.length - 1]!

test('where the period is the base itself, it is told, and tables have no change since', async () => {
  const findings = await analyseHere(onItself(tables)) as unknown as Findings
  expect(findings.method.base_is_period).toBe(true)
  expect(findings.opinion.since_base).toEqual({ mean: 0, low: 0, high: 0, sd: 0 })
  expect(row(periodsTable(findings).rows)).toMatchObject({ since_base: null, since_base_low: null, since_base_high: null })
  expect(row(venuesTable(findings).rows)).toMatchObject({ drift: null, drift_low: null, drift_high: null })
})

test('elsewhere it is not', async () => {
  const findings = await analyseHere(tables) as unknown as Findings
  expect(findings.method.base_is_period).toBe(false)
  expect(row(periodsTable(findings).rows)['since_base']).not.toBeNull()
  expect(row(venuesTable(findings).rows)['drift']).not.toBeNull()
})
