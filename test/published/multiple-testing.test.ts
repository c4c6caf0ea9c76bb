import { expect, test } from 'vitest'
import { holmAdjusted } from '../../model/statistics/holm.ts'

// MULT-01. Fifteen p-values of the thrombolysis trial: Benjamini and Hochberg (1995), JRSS B 57:289-300, section 4; Holm
// (1979), Scandinavian J. of Statistics 6:65-70. Printed value found; recomputed in R 4.2.2. Tolerance 1e-10.
const pValues = [0.0001, 0.0004, 0.0019, 0.0095, 0.0201, 0.0278, 0.0298, 0.0344, 0.0459, 0.324, 0.4262, 0.5719, 0.6528, 0.759, 1]
const holm = [0.0015, 0.0056, 0.0247, 0.114, 0.2211, 0.278, 0.278, 0.278, 0.3213, 1, 1, 1, 1, 1, 1]

test('MULT-01: adjusted p-values, three of them at or below 0.05', () => {
  holmAdjusted(pValues).forEach((adjusted, i) => { expect(Math.abs(adjusted - holm[i])).toBeLessThan(1e-10) })
  expect(holmAdjusted(pValues).filter((adjusted) => adjusted <= 0.05)).toHaveLength(3)
})

test('MULT-01 can fail: Bonferroni, all times 15, differs from the second on', () => {
  expect(Math.abs(15 * pValues[1] - holm[1])).toBeGreaterThan(1e-4)
})
