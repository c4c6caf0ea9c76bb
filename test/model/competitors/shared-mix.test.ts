import { expect, test } from 'vitest'
import fc from 'fast-check'
import { sharedMix } from '../../../model/competitors/shared-mix.ts'
import type { Factor } from '../../../model/intake/intake-tables.ts'

const factorOf = (name: string, levels: readonly string[]): Factor => ({ name, levels: levels.map((level) => ({ name: level, label: level.toUpperCase() })) })
const source = ['base', 'base'] as const

test('the shared levels are scaled up to the whole; what is left out is told', () => {
  const own = [factorOf('venue', ['blogs', 'boards', 'videos']), factorOf('topic', ['fares', 'staff'])]
  const other = [factorOf('venue', ['boards', 'panel', 'videos']), factorOf('topic', ['fares', 'staff'])]
  const mix = sharedMix(own, { shares: [Float64Array.of(0.2, 0.6, 0.2), Float64Array.of(0.3, 0.7)], source }, other)!
  expect([...mix.own[0]]).toEqual([0, expect.closeTo(0.75, 12), expect.closeTo(0.25, 12)])
  expect([...mix.other[0]]).toEqual([expect.closeTo(0.75, 12), 0, expect.closeTo(0.25, 12)])
  expect([...mix.own[1]]).toEqual([...mix.other[1]])
  expect(mix.covered).toBeCloseTo(0.8, 12)
  expect(mix.leftOut).toEqual([{ factor: 'venue', label: 'BLOGS' }])
})

test('brands with no level in common, or none that the mix weighs, can’t be compared', () => {
  const own = [factorOf('venue', ['blogs', 'boards'])]
  const mix = { shares: [Float64Array.of(1, 0)], source: ['base'] as const }
  expect(sharedMix(own, mix, [factorOf('venue', ['videos'])])).toBeNull()
  expect(sharedMix(own, mix, [factorOf('venue', ['boards'])])).toBeNull()
  expect(sharedMix(own, mix, [factorOf('venue', ['blogs'])])?.covered).toBe(1)
})

test('both mixes sum to 1 and agree level by level, whatever is shared', () => {
  const names = ['a', 'b', 'c', 'd', 'e']
  fc.assert(fc.property(fc.subarray(names, { minLength: 1 }), fc.subarray(names, { minLength: 1 }), fc.array(fc.double({ min: 0.01, max: 1, noNaN: true }), { minLength: 5, maxLength: 5 }), (ours, theirs, weights) => {
    const total = ours.reduce((sum, _, i) => sum + weights[i], 0)
    const mix = sharedMix([factorOf('venue', ours)], { shares: [Float64Array.from(ours, (_, i) => weights[i] / total)], source: ['base'] }, [factorOf('venue', theirs)])
    const shared = ours.filter((name) => theirs.includes(name))
    if (mix === null) return shared.length === 0
    const at = (levels: readonly string[], shares: Float64Array, name: string) => shares[levels.indexOf(name)]
    return Math.abs(mix.own[0].reduce((a, b) => a + b, 0) - 1) < 1e-9 && Math.abs(mix.other[0].reduce((a, b) => a + b, 0) - 1) < 1e-9
      && shared.every((name) => at(ours, mix.own[0], name) === at(theirs, mix.other[0], name)) && mix.covered <= 1
  }))
})
