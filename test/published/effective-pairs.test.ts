import { describe, expect, test } from 'vitest'
import { autocorrelations } from '../../model/statistics/autocorrelation.ts'
import { correlation } from '../../model/statistics/correlation.ts'
import { effectivePairs, lagOnePairs, pairsFromProducts } from '../../model/statistics/effective-pairs.ts'
import { fisherInterval } from '../../model/statistics/fisher-interval.ts'
import { studentCdf } from '../../model/statistics/student-t.ts'
import { numericColumns } from './numeric-columns.ts'

describe('COR-01: level of Lake Huron and flow of the Nile, 1875-1970', () => {
  // Bartlett (1935), JRSS 98:536-543; Bayley and Hammersley (1946); Pyper and Peterman (1998), Canadian J. of Fisheries and Aquatic
  // Sciences 55:2127-2140, eq. 1, 6 and 7, lags up to N / 5. Recomputed in R 4.2.2. Tolerance 1e-9.
  const { huron, nile } = numericColumns('huron-nile.csv')
  const [n, r] = [huron.length, correlation(huron, nile)!]
  const [ofHuron, ofNile] = [autocorrelations(huron, 19)!, autocorrelations(nile, 19)!]
  const pairs = (factor: (lag: number) => number) => pairsFromProducts(n, ofHuron.map((rho, i) => rho * ofNile[i] * factor(i + 1)))
  const bartlett = lagOnePairs(n, ofHuron[0], ofNile[0])

  test.each([
    ['r', r, 0.242688853164841], ['lag-one autocorrelation of Lake Huron', ofHuron[0], 0.833449484061058], ['of the Nile', ofNile[0], 0.478311571685239],
    ['pairs by Bartlett', bartlett, 41.2753737047774], ['by the weighted sum', pairs((lag) => (n - lag) / n), 29.7692350214631],
    ['by the sum without weights', pairs(() => 1), 29.0123704666413], ['with the bias corrected', pairs((lag) => (n / (n - lag)) ** 2), 27.4737797238309],
  ])('%s', (_, found, expected) => { expect(Math.abs(found - expected)).toBeLessThan(1e-9) })

  test('ours: the last of these but for three small negative products (lags 17 to 19), so a little fewer', () => {
    expect(ofHuron.filter((rho, i) => rho * ofNile[i] < 0)).toHaveLength(3)
    const { value } = effectivePairs(huron, nile)
    expect(value).toBeLessThan(27.4737797238309)
    expect(value).toBeGreaterThan(27.1)
  })

  test('t test and 95 % interval on all pairs and on Bartlett\'s', () => {
    const cases = [
      { count: n, t: 2.42546705611886, p: 0.0171983053573474, low: 0.0443613409342783, high: 0.4226122987732 },
      { count: bartlett, t: 1.56780345227839, p: 0.124949597423752, low: -0.0690629419028496, high: 0.511258095685672 },
    ]
    for (const { count, t, p, low, high } of cases) {
      const statistic = r * Math.sqrt((count - 2) / (1 - r * r))
      expect(Math.abs(statistic - t)).toBeLessThan(1e-9)
      expect(Math.abs(2 * studentCdf(-statistic, count - 2) - p)).toBeLessThan(1e-9)
      const interval = fisherInterval(r, count, 0.95)!
      expect(Math.abs(interval.low - low)).toBeLessThan(1e-9)
      expect(Math.abs(interval.high - high)).toBeLessThan(1e-9)
    }
  })

  test('it can fail: one year of Lake Huron less', () => {
    expect(Math.abs(pairsFromProducts(n, autocorrelations(huron.slice(1), 19)!.map((rho, i) => rho * ofNile[i])) - 29.0123704666413)).toBeGreaterThan(0.01)
    expect(Math.abs(lagOnePairs(n - 1, autocorrelations(huron.slice(1), 1)![0], ofNile[0]) - 41.2753737047774)).toBeGreaterThan(0.01)
  })
})

describe('COR-03: two AR(1) series, 60 pairs, 0.6 and 0.5', () => {
  // Bartlett (1935). Confirmed by arithmetic. Tolerance 1e-10: the closed form and the sum over all lags agree.
  const sum = (lags: number) => pairsFromProducts(60, Array.from({ length: lags }, (_, i) => 0.6 ** (i + 1) * 0.5 ** (i + 1)))

  test('closed and summed', () => {
    expect(Math.abs(lagOnePairs(60, 0.6, 0.5) - 32.3076923076923)).toBeLessThan(1e-10)
    expect(Math.abs(sum(59) - 32.3076923076923)).toBeLessThan(1e-10)
  })

  test('it can fail: two lags are not all', () => { expect(sum(2)).toBeGreaterThan(33) })
})
