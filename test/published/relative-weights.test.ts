import { describe, expect, test } from 'vitest'
import { relativeWeights } from '../../model/statistics/relative-weights.ts'

describe('RI-02: fertility in 47 Swiss provinces, five predictors', () => {
  // Johnson (2000), Multivariate Behavioral Research 35:1-19; Genizi (1993), Statistica Sinica 3:407-420. Data: `swiss` of R datasets. Recomputed in R 4.2.2.
  // R squared is also that of RI-01: Groemping (2006), J. of Statistical Software 17(1), printed value found. Tolerance 1e-9.
  const withResponse = [0.353079183619975, -0.645882706457288, -0.663788857035069, 0.463684700651794, 0.416556031434983]
  const correlations = [
    1, -0.686542208617137, -0.63952251894832, 0.40109505304874, -0.0608586084165816,
    -0.686542208617137, 1, 0.698415296288483, -0.572741806064167, -0.114021596482034,
    -0.63952251894832, 0.698415296288483, 1, -0.153858917090915, -0.0993218458213457,
    0.40109505304874, -0.572741806064167, -0.153858917090915, 1, 0.175495907596623,
    -0.0608586084165816, -0.114021596482034, -0.0993218458213457, 0.175495907596623, 1,
  ]
  const found = relativeWeights(correlations, withResponse)
  if (found.weights === null) throw new Error('Unexpected collinear predictors')
  const { weights, explained } = found

  test('weights, shares, R squared', () => {
    const expected = [0.0484168958119007, 0.15470824980616, 0.271964104645999, 0.114680029947561, 0.116965721381105]
    const shares = [0.0685078504712325, 0.218905600341717, 0.384817653056789, 0.162267369932314, 0.165501526197947]
    expected.forEach((weight, j) => { expect(Math.abs(weights[j] - weight)).toBeLessThan(1e-9) })
    shares.forEach((share, j) => { expect(Math.abs(weights[j] / explained - share)).toBeLessThan(1e-9) })
    expect(Math.abs(explained - 0.706735001592726)).toBeLessThan(1e-9)
  })

  test('it can fail: averages over all orders (LMG) are other figures for the same R squared', () => {
    const lmg = [0.0570912207680913, 0.171173028900234, 0.260134678624384, 0.105570150373494, 0.112765922926522]
    expect(lmg.reduce((a, b) => a + b, 0)).toBeCloseTo(explained, 9)
    lmg.forEach((weight, j) => { expect(Math.abs(weights[j] - weight)).toBeGreaterThan(1e-3) })
  })
})

describe('RI-05: predictors that are not correlated', () => {
  // An identity: squared correlations. Confirmed by arithmetic. Tolerance 1e-12.
  test('0.36 and 0.09', () => {
    const { weights } = relativeWeights([1, 0, 0, 1], [0.6, -0.3])
    expect(weights![0]).toBeCloseTo(0.36, 12)
    expect(weights![1]).toBeCloseTo(0.09, 12)
  })

  test('it can fail: correlated at 0.1 they are not', () => {
    expect(relativeWeights([1, 0.1, 0.1, 1], [0.6, -0.3]).weights![0]).not.toBeCloseTo(0.36, 2)
  })
})
