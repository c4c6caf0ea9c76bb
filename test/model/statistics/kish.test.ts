import fc from 'fast-check'
import { expect, test } from 'vitest'
import { clusterDesignEffect, kishDesignEffect, kishEffectiveSize } from '../../../model/statistics/kish.ts'

const weights = fc.array(fc.double({ min: 1e-6, max: 1e6, noNaN: true }), { minLength: 1, maxLength: 60 })

test('between 1 and n; scale does not matter; zero weights count for nothing', () => {
  fc.assert(fc.property(weights, fc.constantFrom(1e-300, 0.25, 1e290), (w, scale) => {
    const size = kishEffectiveSize(w)
    expect(size).toBeGreaterThanOrEqual(1 - 1e-12)
    expect(size).toBeLessThanOrEqual(w.length * (1 + 1e-12))
    expect(kishEffectiveSize(w.map((weight) => weight * scale)) / size).toBeCloseTo(1, 9)
    expect(kishEffectiveSize([...w, 0]) / size).toBeCloseTo(1, 12)
    expect(kishDesignEffect(w) * size).toBeCloseTo(w.length, 9)
  }))
})

test('equal weights lose nothing, one weight is one voice', () => {
  expect(kishEffectiveSize([0.1, 0.1, 0.1])).toBe(3)
  expect(kishEffectiveSize([0, 0, 5])).toBe(1)
})

test('weights with counts are so many respondents of each', () => {
  expect(kishEffectiveSize([1, 4], [3, 2])).toBeCloseTo(kishEffectiveSize([1, 1, 1, 4, 4]), 12)
  expect(() => kishEffectiveSize([1, 4], [3, -2])).toThrow('counts[1] -2')
  expect(() => kishEffectiveSize([1, 4], [3])).toThrow('counts[1] undefined')
})

// b = sum m^2 / sum m makes 1 + (b - 1) rho the variance of a mean of clustered values exactly: sum over pairs, by hand.
test('the cluster design effect with b = sum m^2 / sum m is the exact variance ratio', () => {
  const [sizes, rho] = [[1, 2, 5], 0.3]
  const n = sizes.reduce((sum, m) => sum + m, 0)
  const variance = sizes.reduce((sum, m) => sum + m + m * (m - 1) * rho, 0) / n ** 2
  const b = sizes.reduce((sum, m) => sum + m * m, 0) / n
  expect(clusterDesignEffect(b, rho)).toBeCloseTo(variance * n, 14)
  expect(clusterDesignEffect(n / sizes.length, rho)).not.toBeCloseTo(variance * n, 2)
})

test('what cannot be weighed is refused by name', () => {
  expect(() => kishEffectiveSize([1, -2])).toThrow('weights[1] -2')
  expect(() => kishEffectiveSize([Number.NaN])).toThrow('weights[0] NaN')
  expect(() => kishEffectiveSize([0, 0])).toThrow('none of 2 positive')
  expect(() => kishDesignEffect([])).toThrow('none of 0 positive')
  expect(() => clusterDesignEffect(0.5, 0.1)).toThrow('cluster size 0.5')
  expect(() => clusterDesignEffect(10, -0.2)).toThrow('-0.2')
  expect(() => clusterDesignEffect(10, Number.NaN)).toThrow('NaN')
  expect(clusterDesignEffect(1, -1)).toBe(1)
})
