import { describe, expect, test } from 'vitest'
import { confusionShares, correctedShares, rescoring } from '../../model/statistics/misclassification.ts'
import { singularDecomposition } from '../../model/statistics/singular-decomposition.ts'
import { wilsonInterval } from '../../model/statistics/wilson.ts'

const near = (found: number, expected: number, tolerance: number) => { expect(Math.abs(found - expected)).toBeLessThan(tolerance) }
/** Rows: with the trait, without; columns: positive, negative. */
const screening = (sensitivity: number, specificity: number) => [sensitivity, 1 - sensitivity, 1 - specificity, specificity]
const prevalence = (positives: number, matrix: readonly number[]) => correctedShares(matrix, [positives, 1 - positives])!

describe('MIS-01: prevalence from an imperfect test', () => {
  // Rogan and Gladen (1978), American J. of Epidemiology 107:71-76; R package epiR, help of epi.prev, example 1: 22 (14 to 32) in 100.
  // Computed by epiR 2.0.57, R 4.2.2. Tolerance 1e-8 for the estimate, 1e-4 for intervals.
  const matrix = screening(0.96, 0.89)

  test('estimate, Wilson interval carried over end by end, standard error', () => {
    near(prevalence(45 / 150, matrix).shares[0], 0.223529411764706, 1e-8)
    const { low, high } = wilsonInterval(45, 150, 0.95)
    near(prevalence(low, matrix).shares[0], 0.144009757396843, 1e-4)
    near(prevalence(high, matrix).shares[0], 0.314799769364605, 1e-4)
    const { weights } = rescoring(matrix, [1, 0])
    near(weights![0] * 0.3 + weights![1] * 0.7, 0.223529411764706, 1e-8)
    near((weights![0] - weights![1]) * Math.sqrt((0.3 * 0.7) / 150), 0.0440194986679287, 1e-8)
    expect(prevalence(45 / 150, matrix).impossible).toEqual([])
  })

  test('it can fail: sensitivity and specificity exchanged', () => {
    expect(Math.abs(prevalence(0.3, screening(0.89, 0.96)).shares[0] - 0.2235)).toBeGreaterThan(0.05)
  })
})

describe('MIS-02: an estimate below zero', () => {
  // R package epiR, help of epi.prev, example 2 (Moujaber and others 2008): -4 in 100. Computed by epiR 2.0.57, R 4.2.2. Tolerance 1e-8.
  test('is returned as it is, and said to be impossible', () => {
    const { shares, impossible } = prevalence(6 / 151, screening(0.964, 0.927))
    near(shares[0], -0.0373343441776113, 1e-8)
    expect(impossible).toEqual([0, 1])
  })

  test('it can fail: with 12 positives it is above zero, and nothing is said', () => {
    const { shares, impossible } = prevalence(12 / 151, screening(0.964, 0.927))
    expect(shares[0]).toBeGreaterThan(0)
    expect(impossible).toEqual([])
  })
})

describe('MIS-04: exposure of cases and controls', () => {
  // Fink and Lash (2003), Cancer Causes and Control 14:497-503; Lash, Fox and Fink (2009), Applying Quantitative Bias Analysis to Epidemiologic Data,
  // chapter 6; tests of the R package episensr 1.3.0. Printed value found; recomputed in R 4.2.2. 1e-4 against print, 1e-10 against exact.
  const exposed = ([yes, no]: readonly [number, number], matrix: readonly number[]) => (yes + no) * prevalence(yes / (yes + no), matrix).shares[0]
  const oddsRatio = (matrix: readonly number[]) => {
    const [ofCases, ofControls] = [exposed([215, 1449], matrix), exposed([668, 4296], matrix)]
    return ofCases / (1664 - ofCases) / (ofControls / (4964 - ofControls))
  }

  test('exposed, and the odds ratio', () => {
    const matrix = screening(0.78, 0.99)
    near(exposed([215, 1449], matrix) / 257.61038961039, 1, 1e-10)
    near(exposed([668, 4296], matrix) / 803.064935064935, 1, 1e-10)
    near(oddsRatio(matrix), 0.9491, 1e-4)
    near(oddsRatio(matrix), 0.949069463233105, 1e-10)
  })

  test('it can fail: uncorrected it is 0.9542', () => {
    near(oddsRatio(screening(1, 1)), 0.9542, 1e-4)
    expect(Math.abs(oddsRatio(screening(1, 1)) - 0.9491)).toBeGreaterThan(0.004)
  })
})

describe('MIS-05: shares of four classes of land', () => {
  // Olofsson and others (2014), Remote Sensing of Environment 148:42-57, Table 8 and p. 54. Printed value partly from memory; reproduced by
  // computation in R 4.2.2. 1 ha against print, 1e-8 against exact. The paper's sample is stratified by the mapped class; the
  // matrix from true to mapped class that follows from it must give the same shares when inverted.
  const counts = [[66, 0, 5, 4], [0, 55, 8, 12], [1, 0, 153, 11], [2, 1, 9, 313]]
  const mapped = [0.02, 0.015, 0.32, 0.645]
  const joint = (weights: readonly number[]) => counts.flatMap((_, actual) => counts.map((row, map) => (weights[map] * row[actual]) / row.reduce((a, b) => a + b, 0)))
  const matrix = confusionShares(joint(mapped))

  test('shares, areas, and the share of each true class mapped as such', () => {
    const { shares } = correctedShares(matrix, mapped)!
    ;[0.0235086247086247, 0.0129846153846154, 0.317522144522145, 0.645984615384615].forEach((expected, label) => { near(shares[label], expected, 1e-8) })
    ;[21158, 11686, 285770, 581386].forEach((expected, label) => { near(900_000 * shares[label], expected, 1) })
    ;[0.748661404830841, 0.847156398104265, 0.934508908579693, 0.961608992831456].forEach((expected, label) => { near(matrix[5 * label], expected, 1e-8) })
  })

  test('it can fail: the sample taken as if drawn at random', () => {
    const { shares } = correctedShares(confusionShares(joint(counts.map((row) => row.reduce((a, b) => a + b, 0)))), mapped)!
    expect(Math.abs(shares[0] - 0.0235086247086247)).toBeGreaterThan(1e-3)
  })
})

describe('MIS-07: three classes, matrix inverted', () => {
  // Tenenbein (1972), Technometrics 14:187-202; Buonaccorsi (2010), Measurement Error, chapter 2. An example made for the check: two independent
  // solutions agree, R 4.2.2. Tolerance 1e-9.
  const matrix = [0.8, 0.12, 0.08, 0.15, 0.7, 0.15, 0.05, 0.2, 0.75]
  const codedB = [0.45, 0.3, 0.25]
  const truthB = [0.496083550913838, 0.279373368146214, 0.224543080939948]

  test('shares of both cases', () => {
    correctedShares(matrix, [0.455, 0.31, 0.235])!.shares.forEach((share, label) => { near(share, [0.5, 0.3, 0.2][label], 1e-9) })
    correctedShares(matrix, codedB)!.shares.forEach((share, label) => { near(share, truthB[label], 1e-9) })
  })

  test('rescored labels give the same shares, and their standard errors among 1,000', () => {
    const errors = [0.0229816929809843, 0.0265638049371828, 0.0218751591675541]
    errors.forEach((expected, label) => {
      const { weights } = rescoring(matrix, [0, 1, 2].map((other) => (other === label ? 1 : 0)))
      const mean = codedB.reduce((sum, share, k) => sum + share * weights![k], 0)
      near(mean, truthB[label], 1e-9)
      near(Math.sqrt(codedB.reduce((sum, share, k) => sum + share * (weights![k] - mean) ** 2, 0) / 1000), expected, 1e-9)
    })
  })

  test('determinant and condition number from the singular values', () => {
    const { values } = singularDecomposition(matrix)
    near(values.reduce((product, value) => product * value, 1), 0.383, 1e-9)
    near(values[0] / values[2], 1.87724235041827, 1e-9)
  })

  test('it can fail: the matrix transposed', () => {
    const transposed = [0.8, 0.15, 0.05, 0.12, 0.7, 0.2, 0.08, 0.15, 0.75]
    expect(() => correctedShares(transposed, codedB)).toThrow('row 1')
    expect(Math.abs(correctedShares(confusionShares(transposed), codedB)!.shares[0] - truthB[0])).toBeGreaterThan(1e-3)
  })
})
