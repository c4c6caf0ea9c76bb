import { expect, test } from 'vitest'
import { findingsSchema } from '../../../model/findings/schema.ts'
import { postsAlone, readyMade, sampleFindings, withCoder } from '../../support/sample-findings.ts'

test('the sample findings are valid by the schema and the same at every call', () => {
  expect(findingsSchema.parse(sampleFindings())).toEqual(sampleFindings())
})

test('so are its variants: posts alone, ready-made cells, each state of the coder', () => {
  const states = (['absent', 'applied', 'too-few', 'too-poor', 'ranges', 'ready-made'] as const).map(withCoder)
  for (const findings of [postsAlone(), readyMade(), ...states]) expect(findingsSchema.parse(findings)).toEqual(findings)
})

test('it can fail: a share above one is refused', () => {
  const findings = sampleFindings()
  expect(findingsSchema.safeParse({ ...findings, venues: [{ ...findings.venues[0], share: 1.2 }] }).success).toBe(false)
})

test('the parts add up to the change of the raw average, and the shares of the venues to one', () => {
  const { decomposition, venues } = sampleFindings()
  expect(decomposition!.parts.reduce((sum, part) => sum + part.estimate.mean, 0)).toBeCloseTo(decomposition!.raw_change, 9)
  expect(venues.reduce((sum, venue) => sum + venue.share, 0)).toBeCloseTo(1, 9)
})

test('the story: the raw average fell while opinion rose', () => {
  const { opinion } = sampleFindings()
  expect(opinion.raw_change).toBeLessThan(-0.5)
  expect(opinion.change!.low).toBeGreaterThan(0)
})
