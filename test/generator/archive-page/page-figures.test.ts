import { expect, test } from 'vitest'
import { pageFigures } from '../../../generator/archive-page/page-figures.ts'
import { sampleFindings } from '../../support/sample-findings.ts'

const findings = sampleFindings()

test('the findings that this program writes are read', () => {
  expect(pageFigures(JSON.stringify(findings))?.opinion.period).toEqual(findings.opinion.period)
})

test('keys of other versions do not matter, at any depth', () => {
  const fewer = { period: findings.period, grid: findings.grid, interval: findings.interval, caveats: findings.caveats }
  const other = { ...fewer, schema: 'tareline-findings/9', news: 1, opinion: { ...findings.opinion, news: 1, period: { ...findings.opinion.period, news: 1 } } }
  expect(pageFigures(JSON.stringify(other))?.opinion.change?.mean).toBe(findings.opinion.change?.mean)
})

const spoilt: readonly (readonly [string, string])[] = [
  ['no JSON', '{'],
  ['a text', '"findings"'],
  ['no opinion', JSON.stringify({ ...findings, opinion: null })],
  ['a figure that is none', JSON.stringify({ ...findings, opinion: { ...findings.opinion, period: { ...findings.opinion.period, mean: 'high' } } })],
  ['a date that is none', JSON.stringify({ ...findings, period: { ...findings.period, end: '"><script>' } })],
  ['no step up to the end of the period', JSON.stringify({ ...findings, period: { name: '1999-01', start: '1999-01-01', end: '1999-01-31' } })],
]
test.each(spoilt)('%s: no figures', (_, text) => { expect(pageFigures(text)).toBeNull() })
