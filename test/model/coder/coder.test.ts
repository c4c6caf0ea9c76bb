import { describe, expect, test } from 'vitest'
import { readAudit } from '../../../model/coder/audit.ts'
import { correctionOf, drawWeights, rescoredTables } from '../../../model/coder/rescore.ts'
import type { AuditCount } from '../../../model/inputs/small-inputs.ts'
import type { IntakeTables } from '../../../model/intake/intake-tables.ts'
import { createGenerator, type Generator } from '../../../model/random/generator.ts'
import { quantiles } from '../../../model/statistics/quantile.ts'
import { coders } from '../../simulation/coder-study.ts'

const namesOf = (k: 2 | 3) => (k === 2 ? ['negative', 'positive'] : ['negative', 'neutral', 'positive'])
const scoresOf = (k: 2 | 3) => (k === 2 ? [-1, 1] : [-1, 0, 1])

/** One venue, one cell, with these mentions by coded label. */
function tablesOf(k: 2 | 3, coded: readonly number[], unlabelled = 0): IntakeTables {
  const mentions = coded.reduce((sum, count) => sum + count, unlabelled)
  const mean = coded.reduce((sum, count, l) => sum + count * scoresOf(k)[l], 0) / mentions
  const one = (value: number) => Float64Array.of(value)
  return {
    factors: [{ name: 'venue', levels: [{ name: 'boards', label: 'Boards' }] }],
    cells: {
      count: 1, step: Int32Array.of(0), levels: [Int32Array.of(0)], mentions: one(mentions), authors: one(mentions), mean: one(mean),
      squares: one(coded.reduce((sum, count, l) => sum + count * (scoresOf(k)[l] - mean) ** 2, 0)), freedom: one(mentions - 1), clustering: one(1), deff: one(NaN),
    },
    labels: { names: namesOf(k), scores: Float64Array.from(scoresOf(k)), counts: Float64Array.from(coded) },
  } as unknown as IntakeTables
}

const auditOf = (k: 2 | 3, table: readonly (readonly number[])[]): AuditCount[] =>
  table.flatMap((row, t) => row.map((count, c) => ({ venue: 'boards', trueLabel: namesOf(k)[t], codedLabel: namesOf(k)[c], count })))

describe('an audit', () => {
  const good = [[45, 5], [5, 45]]
  test.each([
    ['is applied where it is large and good', good, [60, 40], 0, null],
    ['of 49 codings is refused', [[22, 2], [3, 22]], [60, 40], 0, 'too-few'],
    ['of a coder that can hardly tell labels apart is refused', [[30, 25], [25, 30]], [60, 40], 0, 'too-poor'],
    ['of a venue with other scores is refused', good, [60, 40], 10, 'ranges'],
    ['that has nothing of the venue is none', [[0, 0], [0, 0]], [60, 40], 0, 'no-audit'],
  ])('%s', (_, table, coded, unlabelled, refused) => {
    const found = readAudit(tablesOf(2, coded, unlabelled), auditOf(2, table))!
    expect(found.venues[0].refused).toBe(refused)
    expect(found.weights[0] === null).toBe(refused !== null)
  })
  test('needs labels at all', () => {
    expect(readAudit({ ...tablesOf(2, [1, 1]), labels: null }, auditOf(2, good))).toBeNull()
  })
  test('tells how often people and coder agree', () => {
    expect(readAudit(tablesOf(2, [60, 40]), auditOf(2, good))!.venues[0]).toMatchObject({ codings: 100, agreement: 0.9 })
  })
})

describe('correcting', () => {
  // Rogan and Gladen (1978): p = (q + specificity - 1) / (sensitivity + specificity - 1); the posterior mean of 48 of 50 and 44 of 50 under a uniform prior
  test('of two labels is the estimator of Rogan and Gladen', () => {
    const [sensitivity, specificity] = [45 / 52, 49 / 52]
    const tables = tablesOf(2, [70, 30])
    const { cells } = rescoredTables(tables, readAudit(tables, auditOf(2, [[48, 2], [6, 44]]))!)
    const share = (0.3 + specificity - 1) / (sensitivity + specificity - 1)
    expect(cells.mean[0]).toBeCloseTo(2 * share - 1, 12)
  })
  test('leaves cells of a venue without an audit as they are', () => {
    const tables = tablesOf(3, [20, 30, 50])
    const { cells } = rescoredTables(tables, readAudit(tables, [])!)
    expect([cells.mean[0], cells.squares[0]]).toEqual([tables.cells.mean[0], tables.cells.squares[0]])
  })
  test.each([2, 3] as const)('of %i labels: the interval of the audit’s draws holds the true mean at about its rate', (k) => {
    const confusion = coders[k][0]
    const shares = k === 2 ? [0.4, 0.6] : [0.3, 0.3, 0.4]
    const truth = shares.reduce((sum, share, l) => sum + share * scoresOf(k)[l], 0)
    // as many posts as chance does not touch: all that is not known is the coder
    const coded = confusion[0].map((_, c) => Math.round(1e7 * shares.reduce((sum, share, t) => sum + share * confusion[t][c], 0)))
    const tables = tablesOf(k, coded)
    const total = coded.reduce((sum, count) => sum + count, 0)
    const raw = tables.cells.mean[0]
    let [covered, plain] = [0, 0]
    const runs = 300
    for (let run = 0; run < runs; run++) {
      const generator = createGenerator(31, run)
      const audit = readAudit(tables, auditOf(k, confusion.map((row, t) => multinomial(row, Math.round(200 * shares[t]), generator))))!
      const means = Float64Array.from({ length: 400 }, () => raw + correctionOf(audit, drawWeights(audit, generator), [Float64Array.from(coded)], total))
      const [low, high] = quantiles(means, [0.05, 0.95])
      if (low <= truth && truth <= high) covered++
      if (Math.abs(raw - truth) < 0.01) plain++
    }
    // binomial, 300 runs: 0.9 has a standard error of 0.017
    expect(covered / runs).toBeGreaterThan(0.85)
    expect(covered / runs).toBeLessThan(0.95)
    // without the audit the mean is off in every run
    expect(plain).toBe(0)
  })
})

function multinomial(shares: readonly number[], n: number, generator: Generator): number[] {
  const counts = shares.map(() => 0)
  for (let i = 0; i < n; i++) {
    let left = generator.uniform()
    const at = shares.findIndex((share) => (left -= share) < 0)
    counts[at < 0 ? shares.length - 1 : at]++
  }
  return counts
}
