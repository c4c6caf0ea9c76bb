import { describe, expect, test } from 'vitest'
import { readTipping } from '../../../model/customers/tipping.ts'
import { readVolume } from '../../../model/customers/volume.ts'
import type { Findings } from '../../../model/findings/schema.ts'
import type { Reading } from '../../../model/reading/context.ts'

const reading = (before: readonly number[], now: readonly number[]) => ({ adjusted: [Float64Array.from(before), Float64Array.from(now)], periodSteps: [1], previousSteps: [0] }) as unknown as Reading

describe('how selective posting would have to be', () => {
  test('for a fall, the unhappy must have become likelier: odds of content voices before over those after', () => {
    // opinion 0.2 is 60 % content, 0 is 50 %: odds of 1.5 to 1
    const { who, ratio, curve } = readTipping(reading([0.2, 0.2], [0, 0]), 0.9)!
    expect(who).toBe('unhappy')
    expect(ratio.mean).toBeCloseTo(1.5, 12)
    expect(curve.find((at) => at.ratio === 1)!.change.mean).toBeCloseTo(-20, 9)
    expect(curve.every((at, i) => i === 0 || at.change.mean > curve[i - 1].change.mean)).toBe(true)
    expect(curve.find((at) => at.ratio === ratio.mean)!.change.mean).toBeCloseTo(0, 9)
  })
  test('for a rise, the content', () => {
    const { who, ratio, curve } = readTipping(reading([0, 0], [0.2, 0.2]), 0.9)!
    expect(who).toBe('content')
    expect(ratio.mean).toBeCloseTo(1.5, 12)
    // the curve is of the content too: what is left of the rise falls as they become likelier to post
    expect(curve.find((at) => at.ratio === 1)!.change.mean).toBeCloseTo(20, 9)
    expect(curve.every((at, i) => i === 0 || at.change.mean < curve[i - 1].change.mean)).toBe(true)
    expect(curve.find((at) => at.ratio === ratio.mean)!.change.mean).toBeCloseTo(0, 9)
  })
  test('the curve reaches past the tipping point, little or much', () => {
    for (const now of [0.02, 0.2, 0.6, 0.7]) {
      const { ratio, curve } = readTipping(reading([0, 0], [now, now]), 0.9)!
      expect(curve.at(-1)!.ratio).toBeGreaterThan(ratio.mean)
      expect(curve[0].ratio).toBeLessThan(1)
    }
  })
  test('is not told beyond the scale, or with nothing to compare', () => {
    expect(readTipping(reading([0, 0], [1.1, 0]), 0.9)).toBeNull()
    expect(readTipping({ ...reading([0], [0]), previousSteps: null }, 0.9)).toBeNull()
  })
})

describe('what the volume is worth', () => {
  // of which so many are content: raw 100 (2 share - 1)
  const opinion = (content: number, authors: number) => ({ raw: 100 * (2 * content / authors - 1), authors }) as unknown as Findings['opinion']
  const survey = (value: number, base: number, kind = 'share') => ({ kind, metric: 'favourability', label: 'Favourability', waves: [{ wave: 'w1', value, effective_base: base }] }) as unknown as Findings['survey']

  test('a gap of ten points is worth a random sample of 25', () => {
    // sd^2 / gap^2 = 0.25 / 0.01, the survey's own error left out
    const found = readVolume(opinion(600, 1000), survey(50, 1e12), 10_000, 10)!
    expect(found.gap).toBeCloseTo(10, 9)
    expect(found.equal_sample).toBeCloseTo(25, 6)
    // Meng (2018), eq. 2.3: gap = rho sqrt((1 - f) / f) sd, with f = 0.1
    expect(found.defect_correlation).toBeCloseTo(0.1 / (3 * 0.5), 9)
  })
  test('without the number of customers there is no correlation; a gap within the survey’s own error is worth no number', () => {
    expect(readVolume(opinion(600, 1000), survey(50, 1e12), null, 10)).toMatchObject({ customers: null, defect_correlation: null })
    expect(readVolume(opinion(510, 1000), survey(50, 400), null, 10)!.equal_sample).toBeNull()
  })
  test('needs a share, and authors enough', () => {
    expect(readVolume(opinion(5, 9), survey(50, 400), null, 10)).toBeNull()
    expect(readVolume(opinion(500, 900), survey(7, 400, 'mean'), null, 10)).toBeNull()
    expect(readVolume(opinion(500, 900), null, null, 10)).toBeNull()
  })
})
