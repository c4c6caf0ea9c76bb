import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { expectedSd, layOut, nextChange, nextLevel } from '../../../model/advice/expected-precision.ts'
import { expectNextPeriod, hearBesides } from '../../../model/advice/next-period.ts'
import { samplingVariance } from '../../../model/cells/sampling-variance.ts'
import type { IntakeTables } from '../../../model/intake/intake-tables.ts'
import { createGenerator } from '../../../model/random/generator.ts'
import { simulateCells } from '../../support/simulate-cells.ts'

/*
 * The predicted standard deviation against the model written down as one dense joint normal of the target and of every cell's mean: history, the next
 * period's cells as they are now, and the advised authors added to them by hand.
 */
interface Sigma { readonly mu: number; readonly drift: number; readonly venue: number; readonly topic: number; readonly poster: number; readonly tau: number }

interface PlainCell { readonly step: number; readonly levels: readonly number[]; readonly variance: number }

/** Part of a target: a coefficient of mu, or of the offset of a level (factor 0 is venue). */
interface Load { readonly mu: readonly number[]; readonly offsets: readonly (readonly number[])[] }

/** Posterior sd of a target given all cells: sqrt(c'Sc - c'SH' (HSH' + R)^-1 HSc). */
function denseSd(cells: readonly PlainCell[], sigma: Sigma, target: Load, steps: number, several: readonly boolean[]): number {
  const sds = [sigma.venue, sigma.topic, sigma.poster]
  const loadOf = (cell: PlainCell): Load => ({
    mu: Array.from({ length: steps }, (_, t) => (t === cell.step ? 1 : 0)),
    offsets: target.offsets.map((levels, f) => levels.map((_, l) => (cell.levels[f] === l ? 1 : 0))),
  })
  const covarianceOf = (one: Load, other: Load): number => {
    let sum = 0
    for (let s = 0; s < steps; s++) for (let t = 0; t < steps; t++) sum += one.mu[s] * other.mu[t] * (0.25 + Math.min(s, t) * sigma.mu ** 2)
    one.offsets.forEach((levels, f) => {
      if (several[f]) levels.forEach((load, l) => { sum += load * other.offsets[f][l] * sds[f] ** 2 })
    })
    return sum
  }
  const loads = cells.map(loadOf)
  const between = cells.map((a, i) => cells.map((b, j) => covarianceOf(loads[i], loads[j]) + (i === j ? a.variance + sigma.tau ** 2 : 0)
    + (several[0] && a.levels[0] === b.levels[0] ? Math.min(a.step, b.step) * sigma.drift ** 2 : 0)))
  const withTarget = loads.map((load) => covarianceOf(load, target))
  const solved = solve(between, withTarget)
  return Math.sqrt(covarianceOf(target, target) - solved.reduce((sum, value, i) => sum + value * withTarget[i], 0))
}

function solve(matrix: readonly (readonly number[])[], right: readonly number[]): readonly number[] {
  const rows = matrix.map((row, i) => [...row, right[i]])
  rows.forEach((row, i) => {
    for (let k = i + 1; k < rows.length; k++) {
      const factor = rows[k][i] / row[i]
      for (let j = i; j <= rows.length; j++) rows[k][j] -= factor * row[j]
    }
  })
  const x = new Array<number>(rows.length).fill(0)
  for (let i = rows.length - 1; i >= 0; i--) x[i] = (rows[i][rows.length] - rows[i].slice(i + 1, rows.length).reduce((sum, value, k) => sum + value * x[i + 1 + k], 0)) / rows[i][i]
  return x
}

const shape = fc.record({
  venues: fc.integer({ min: 1, max: 3 }), topics: fc.integer({ min: 1, max: 3 }), posters: fc.integer({ min: 1, max: 2 }),
  seed: fc.integer({ min: 0, max: 1e6 }), authors: fc.integer({ min: 1, max: 500 }), rho: fc.double({ min: 0, max: 0.5, noNaN: true }),
})
const steps = 8
const nowSteps = [6, 7]
const sigma: Sigma = { mu: 0.03, drift: 0.015, venue: 0.2, topic: 0.25, poster: 0.1, tau: 0.05 }

interface Case { readonly tables: IntakeTables; readonly rho: number }

/** Tables whose authors posted more than once: b of 1 to 3 a cell, and an intraclass correlation. */
function caseOf({ venues, topics, posters, seed, rho }: { venues: number; topics: number; posters: number; seed: number; rho: number }): Case {
  const generator = createGenerator(seed, 0)
  const { tables } = simulateCells({
    steps, venues, topics, posters, mentionsPerStep: 25, sigmas: { mu: 0.03, venueDrift: Array.from({ length: venues }, () => 0.01), venue: 0.2, topic: 0.2, poster: 0.1, tau: 0.05 },
  }, generator)
  return { rho, tables: { ...tables, cells: { ...tables.cells, clustering: tables.cells.clustering.map(() => 1 + 2 * generator.uniform()) } } }
}

/** The cells of history and of the next period, and the authors added by hand: m posts of design effect 1 into a cell of n posts. */
function plainCells({ tables }: Case, sampling: ReturnType<typeof samplingVariance>, added: ReturnType<typeof hearBesides>): PlainCell[] {
  const { cells } = tables
  const all = Array.from({ length: cells.count }, (_, c) => c)
  const old = all.map((c): PlainCell => ({ step: cells.step[c], levels: cells.levels.map((column) => column[c]), variance: sampling.variance[c] }))
  const next = all.filter((c) => nowSteps.includes(cells.step[c])).map((c) => ({
    step: cells.step[c] + nowSteps.length, levels: cells.levels.map((column) => column[c]), posts: cells.mentions[c], deff: sampling.designEffect[c],
  }))
  const extra = added.map(({ step, levels, authors }) => {
    const own = next.find((cell) => cell.step === step && cell.levels.join() === levels.join())
    const [posts, deff] = own === undefined ? [0, 0] : [own.posts, own.deff]
    const deffAfter = (posts * deff + authors) / (posts + authors)
    return { step, levels, variance: sampling.withinCell[levels[0]] * deffAfter / (posts + authors) }
  })
  const untouched = next.filter((cell) => !extra.some((other) => other.step === cell.step && other.levels.join() === cell.levels.join()))
    .map(({ step, levels, posts, deff }) => ({ step, levels, variance: sampling.withinCell[levels[0]] * deff / posts }))
  return [...old, ...untouched, ...extra]
}

describe('what more authors would gain', () => {
  test('is the standard deviation of a refit with the advised authors added, within 1e-6', () => {
    fc.assert(fc.property(shape, ({ authors, ...given }) => {
      const built = caseOf(given)
      const { tables } = built
      const plain = samplingVariance(tables)
      const designEffect = plain.designEffect.map((_, c) => 1 + (tables.cells.clustering[c] - 1) * built.rho)
      const sampling = { ...plain, designEffect, variance: plain.variance.map((value, c) => value * designEffect[c] / plain.designEffect[c]) }
      for (const [factor, level] of [[0, given.venues - 1], [1, 0]] as const) {
        const added = hearBesides(tables, nowSteps, factor, level, authors)
        expect(added.reduce((sum, row) => sum + row.authors, 0)).toBeCloseTo(authors, 9)
        const expected = expectNextPeriod(tables, sampling, nowSteps, added)
        const expectation = layOut(expected)
        const vector = Float64Array.from(expectation.problem.scales, ({ name }) => (name.startsWith('venue_drift') ? sigma.drift : sigma[name as keyof Sigma]))
        const several = tables.factors.map(({ levels }) => levels.length > 1)
        const cells = plainCells(built, sampling, added)
        const offsets = (of: (f: number, l: number) => number) => tables.factors.map(({ levels }, f) => levels.map((_, l) => of(f, l)))
        const change: Load = { mu: Array.from({ length: steps + 2 }, (_, t) => (t >= steps ? 0.5 : nowSteps.includes(t) ? -0.5 : 0)), offsets: offsets(() => 0) }
        expect(Math.abs(expectedSd(expectation, vector, nextChange(expectation, expected)) - denseSd(cells, sigma, change, steps + 2, several))).toBeLessThan(1e-6)
        const shares = tables.factors.map(({ levels }) => Float64Array.from(levels, () => 1 / levels.length))
        const atLevel: Load = { mu: change.mu.map((_, t) => (t >= steps ? 0.5 : 0)), offsets: offsets((f, l) => shares[f][l]) }
        expect(Math.abs(expectedSd(expectation, vector, nextLevel(expectation, expected, shares)) - denseSd(cells, sigma, atLevel, steps + 2, several))).toBeLessThan(1e-6)
      }
    }), { numRuns: 25 })
  })

  test('it can fail: with one author more the standard deviation is another', () => {
    const { tables } = caseOf({ venues: 2, topics: 2, posters: 1, seed: 4, rho: 0 })
    const sampling = samplingVariance(tables)
    const sdWith = (authors: number) => {
      const expected = expectNextPeriod(tables, sampling, nowSteps, hearBesides(tables, nowSteps, 0, 0, authors))
      const expectation = layOut(expected)
      return expectedSd(expectation, Float64Array.from(expectation.problem.scales, ({ prior }) => prior / 2), nextChange(expectation, expected))
    }
    expect(sdWith(10) - sdWith(11)).toBeGreaterThan(1e-6)
  })
})
