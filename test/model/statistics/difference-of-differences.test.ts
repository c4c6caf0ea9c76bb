import { expect, test } from 'vitest'
import { createGenerator } from '../../../model/random/generator.ts'
import { differenceOfDifferences } from '../../../model/statistics/difference-of-differences.ts'
import { twoMeans, twoShares } from '../../../model/statistics/two-sample-tests.ts'
import { twoSidedQuantile } from '../../../model/statistics/wilson.ts'

test('of means: the normal interval from the two standard errors', () => {
  const one = twoMeans({ mean: 7.1, sd: 2, base: 30 }, { mean: 6.4, sd: 1, base: 80 }, 0.9)
  const other = twoMeans({ mean: 5, sd: 3, base: 50 }, { mean: 5.5, sd: 2, base: 40 }, 0.9)
  const half = twoSidedQuantile(0.9) * Math.sqrt(4 / 30 + 1 / 80 + 9 / 50 + 4 / 40)
  const found = differenceOfDifferences(one, other)
  expect(found.difference).toBeCloseTo(1.2, 12)
  expect(found.low).toBeCloseTo(1.2 - half, 12)
  expect(found.high).toBeCloseTo(1.2 + half, 12)
})

test('of shares: close to the normal interval in large samples, and with a width where all shares are 0', () => {
  const base = 20_000
  const share = (value: number) => ({ share: value, base })
  const found = differenceOfDifferences(twoShares(share(0.5), share(0.4), 0.9), twoShares(share(0.45), share(0.3), 0.9))
  const half = twoSidedQuantile(0.9) * Math.sqrt((0.25 + 0.24 + 0.2475 + 0.21) / base)
  expect((found.high - found.low) / (2 * half)).toBeCloseTo(1, 3)
  const none = twoShares({ share: 0, base: 30 }, { share: 0, base: 30 }, 0.9)
  expect(differenceOfDifferences(none, none).high).toBeGreaterThan(0.08)
})

test('the 90 % interval covers in small samples of small shares, where standard errors of the shares alone do not', () => {
  const [samples, base, truths] = [4000, 25, [0.1, 0.04, 0.06, 0.03]]
  const truth = truths[0] - truths[1] - (truths[2] - truths[3])
  const generator = createGenerator(7, 0)
  const drawn = (share: number) => {
    let yes = 0
    for (let i = 0; i < base; i += 1) if (generator.uniform() < share) yes += 1
    return { share: yes / base, base }
  }
  let [covered, plain] = [0, 0]
  for (let sample = 0; sample < samples; sample += 1) {
    const [a, b, c, d] = truths.map(drawn)
    const found = differenceOfDifferences(twoShares(a, b, 0.9), twoShares(c, d, 0.9))
    if (found.low <= truth && truth <= found.high) covered += 1
    const half = twoSidedQuantile(0.9) * Math.sqrt([a, b, c, d].reduce((sum, { share }) => sum + (share * (1 - share)) / base, 0))
    if (Math.abs(found.difference - truth) <= half) plain += 1
  }
  expect(covered / samples).toBeGreaterThan(0.89)
  expect(covered / samples).toBeLessThan(0.98)
  expect(plain).toBeLessThan(covered)
})
