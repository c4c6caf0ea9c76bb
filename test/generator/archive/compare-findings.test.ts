import { expect, test } from 'vitest'
import { compareFindings, largest } from '../../../generator/archive/compare-findings.ts'

const findings = { opinion: { mean: 10, low: -2, label: 'up' }, venues: [{ name: 'a', share: 0.5 }, { name: 'b', share: 0.5 }], survey: null, caveats: [] }

test('the same findings, their keys in another order, do not differ', () => {
  const { caveats, survey, venues, opinion } = findings
  expect(compareFindings(findings, { caveats, survey, venues, opinion: { label: 'up', low: -2, mean: opinion.mean } })).toEqual({ values: 9, differences: [] })
})

test('each value that differs is told with its path; of numbers how far', () => {
  const { differences } = compareFindings(findings, { ...findings, opinion: { mean: 10.1, low: 2, label: 'down' } })
  expect(differences).toEqual([
    { path: 'opinion.mean', sealed: 10, rebuilt: 10.1, relative: (10.1 - 10) / 10.1 },
    { path: 'opinion.low', sealed: -2, rebuilt: 2, relative: 2 },
    { path: 'opinion.label', sealed: 'up', rebuilt: 'down', relative: null },
  ])
  expect(largest(differences)?.path).toBe('opinion.low')
})

test('the last bit of a number is a difference', () => {
  const { differences } = compareFindings({ x: 0.3 }, { x: 0.1 + 0.2 })
  expect(differences[0].relative).toBeGreaterThan(0)
  expect(differences[0].relative).toBeLessThan(1e-15)
})

test('what is there in one of the two only is told, lists and parts among it', () => {
  const { differences } = compareFindings(findings, { ...findings, venues: findings.venues.slice(0, 1), survey: { verdict: 'leads' }, caveats: [{ code: 'x' }] })
  expect(differences.map(({ path, sealed, rebuilt }) => [path, sealed, rebuilt])).toEqual([
    ['venues.1.name', 'b', undefined], ['venues.1.share', 0.5, undefined], ['survey', null, undefined], ['caveats', '[]', undefined], ['survey.verdict', undefined, 'leads'], ['caveats.0.code', undefined, 'x'],
  ])
})
