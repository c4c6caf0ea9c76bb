import { describe, expect, test } from 'vitest'
import { bulkEffectiveSize, meanEffectiveSize, tailEffectiveSize } from '../../model/diagnostics/effective-size.ts'
import { plainSplitRhat, splitRhat } from '../../model/diagnostics/split-rhat.ts'
import { mean, standardDeviation } from '../../model/statistics/moments.ts'
import { numericColumns } from './numeric-columns.ts'

// Vehtari, Gelman, Simpson, Carpenter and Bürkner (2021), Rank-normalization, folding, and localization: an improved R-hat,
// Bayesian Analysis 16(2):667-718. Computed by the R package posterior 1.4.0, R 4.2.2. Tolerance 1e-6 relative.
interface Expected { readonly mean: number; readonly sd: number; readonly rhat: number; readonly plain: number; readonly bulk: number; readonly tail: number; readonly ofMean: number }
type Draws = readonly Float64Array[]

const columns = numericColumns('eight-schools-draws.csv')
const chainsOf = (name: string, draws = 100): Draws => [0, 1, 2, 3].map((chain) => columns[name].slice(100 * chain, 100 * chain + draws))

function summary(chains: Draws): Expected {
  const all = chains.flatMap((chain) => [...chain])
  const figure = (diagnostic: { readonly value: number | null }) => diagnostic.value ?? Number.NaN
  return {
    mean: mean(all), sd: standardDeviation(all), rhat: figure(splitRhat(chains)), plain: figure(plainSplitRhat(chains)),
    bulk: figure(bulkEffectiveSize(chains)), tail: figure(tailEffectiveSize(chains)), ofMean: figure(meanEffectiveSize(chains)),
  }
}

const parts = ['mean', 'sd', 'rhat', 'plain', 'bulk', 'tail', 'ofMean'] as const
const misses = (chains: Draws, expected: Expected) => parts.filter((part) => !(Math.abs(summary(chains)[part] / expected[part] - 1) < 1e-6))

describe('MCMC-01: eight schools, 4 chains of 100 draws', () => {
  const published: Record<string, Expected> = {
    mu: { mean: 4.1799990610081, sd: 3.40246820799428, rhat: 1.02192302747315, plain: 0.997910573793448, bulk: 558.017311097547, tail: 322.095517981194, ofMean: 511.522531048283 },
    tau: { mean: 4.16356885610418, sd: 3.57552198383963, rhat: 1.01467273951012, plain: 1.0099763928924, bulk: 246.373392215995, tail: 202.02342275575, ofMean: 280.593619848367 },
    theta1: { mean: 6.74893947963962, sd: 6.30134858319459, rhat: 1.01427992296324, plain: 1.01496674116804, bulk: 400.179629502697, tail: 253.918852241242, ofMean: 389.256416798953 },
  }

  test.each(Object.entries(published))('%s', (name, expected) => { expect(misses(chainsOf(name), expected)).toEqual([]) })

  test('it can fail: without the last draw every figure differs', () => {
    expect(misses(chainsOf('mu', 99), published.mu)).toEqual(parts)
  })
})

describe('MCMC-02: the first 50 draws of mu', () => {
  const asIs = chainsOf('mu', 50)
  const shifted = asIs.map((chain, i) => (i === 3 ? chain.map((value) => value + 3) : chain))
  const scaled = asIs.map((chain, i) => (i === 1 ? chain.map((value) => value * 3) : chain))
  const published: readonly (readonly [string, Draws, Expected])[] = [
    ['as they are', asIs, { mean: 4.11236880421094, sd: 3.66717772590101, rhat: 1.07403945745547, plain: 0.991884662140379, bulk: 231.107560908574, tail: 161.492842930825, ofMean: 211.535209515735 }],
    ['chain 4 shifted by 3', shifted, { mean: 4.86236880421094, sd: 3.94911462144102, rhat: 1.08444802964216, plain: 1.07834371060392, bulk: 48.8362649770926, tail: 57.8818110484964, ofMean: 55.3016910187881 }],
    ['chain 2 three times as wide, which folding catches', scaled, { mean: 6.12920916268606, sd: 8.51812038404063, rhat: 1.28173584518359, plain: 1.08981861565369, bulk: 90.245682294824, tail: 102.159944538315, ofMean: 46.5977778870932 }],
  ]

  test.each(published)('%s', (_, chains, expected) => { expect(misses(chains, expected)).toEqual([]) })

  test('it can fail: R-hat without folding, 1.05511461151885 in the source, would miss the wide chain', () => {
    expect(summary(scaled).rhat - 1.05511461151885).toBeGreaterThan(0.2)
  })
})

describe('MCMC-04: degenerate draws', () => {
  const constant = [new Float64Array(50).fill(2), new Float64Array(50).fill(2)]
  const broken = chainsOf('mu').map((chain, i) => (i === 2 ? chain.with(7, Number.NaN) : chain))

  test.each([splitRhat, plainSplitRhat, bulkEffectiveSize, meanEffectiveSize, tailEffectiveSize])('no figure, but a reason (%o)', (diagnostic) => {
    expect(diagnostic(constant)).toEqual({ value: null, reason: 'constant' })
    expect(diagnostic(broken)).toEqual({ value: null, reason: 'not-finite' })
  })

  test('it can fail: one draw apart is no longer constant', () => {
    expect(splitRhat([constant[0], constant[1].with(3, 2.1)]).value).not.toBeNull()
  })
})
