import { describe, expect, test } from 'vitest'
import { tablesOf } from '../../../generator/tables/tables-of.ts'
import type { Row } from '../../../generator/tables/table.ts'
import { writeCell } from '../../../generator/words/cells.ts'
import { blankFindings } from '../../../model/findings/blank.ts'
import type { Findings } from '../../../model/findings/schema.ts'
import { houseWords } from '../../support/house-words.ts'
import { sampleFindings } from '../../support/sample-findings.ts'

const words = await houseWords()
const findings = sampleFindings()
const rowsOf = (name: string, of: Findings = findings): readonly Row[] => tablesOf(of).find((table) => table.name === name)?.rows ?? []
const ofListening = ['staying', 'spread', 'spread-series', 'pull', 'benchmark', 'benchmark-margins', 'tipping', 'coder', 'importance', 'hearing', 'advice']

test('without the inputs the tables are there and empty', () => {
  for (const name of ofListening) expect(rowsOf(name, blankFindings), name).toEqual([])
  for (const name of ofListening) expect(rowsOf(name).length, name).toBeGreaterThan(0)
})

test('every column has its words; the bounds of an interval share theirs', () => {
  for (const { name, columns } of tablesOf(findings).filter((table) => ofListening.includes(table.name))) {
    for (const { key } of columns) if (!/(^|_)(low|high)$/.test(key)) expect(words.has(`column-${key}`), `${name}: ${key}`).toBe(true)
  }
})

test('venues stand in the one order of the document', () => {
  const expected = [...findings.venues].sort((a, b) => b.share - a.share).map(({ venue }) => venue)
  for (const name of ['spread', 'spread-series', 'coder', 'hearing']) expect([...new Set(rowsOf(name).map(({ venue }) => venue))], name).toEqual(expected)
  expect([...new Set(rowsOf('pull').map(({ venue }) => venue))]).toEqual(expected.filter((venue) => ['boards', 'microblogs', 'video'].includes(venue)))
})

describe('what is masked is null, and a dash where people read it', () => {
  const dash = (row: Row | undefined, key: string, kind: 'share' | 'count' | 'change') => row && writeCell({ key, kind }, row, words, new Map())
  test('staying', () => {
    const masked = rowsOf('staying').filter(({ stayed }) => stayed === null)
    expect(masked).toEqual([{ stance: 'positive', period: '2024-09', start: '2024-09-01', next_period: '2024-10', authors: 8, stayed: null, stayed_share: null, low: null, high: null }])
    expect(dash(masked[0], 'stayed_share', 'share')).toBe('–')
  })
  test('customers and importance', () => {
    const freight = rowsOf('benchmark').find(({ level }) => level === 'freight')
    expect(freight).toMatchObject({ heard: null, authors: null, gap: null, customers: 0.08 })
    expect([dash(freight, 'heard', 'share'), dash(freight, 'authors', 'count'), dash(freight, 'gap', 'change')]).toEqual(['–', '–', '–'])
    expect(rowsOf('importance').find(({ topic }) => topic === 'weather')).toMatchObject({ talk: null, authors: null, gap: null })
  })
})

test('customers: those furthest below their share first; a margin is named where there are several; who can’t be reached is marked', () => {
  expect(rowsOf('benchmark').map(({ level }) => level)).toEqual(['islander', 'freight', 'school parties', 'commuter', 'holiday', '55 and over', '35 to 54', 'under 35'])
  expect(rowsOf('benchmark')[0]).toMatchObject({ label: 'islander (segment)', authors_needed: 240, authors_needed_jointly: 385, unreached: false })
  expect(rowsOf('benchmark').filter(({ unreached }) => unreached).map(({ level }) => level)).toEqual(['school parties'])
  const one = { ...findings, benchmark: { ...findings.benchmark!, margins: findings.benchmark!.margins.slice(0, 1) } }
  expect(rowsOf('benchmark', one)[0]).toMatchObject({ label: 'islander' })
})

test('the coder: nothing agrees where nothing was judged', () => {
  expect(rowsOf('coder').find(({ venue }) => venue === 'reviews')).toMatchObject({ codings: 0, agreement: null, left_as_coded: 'ranges', correction: null })
  expect(rowsOf('coder').filter(({ left_as_coded: left }) => left === null)).toHaveLength(4)
})

test('staying by stance, in the order of the scale; spread with the share at the ends now', () => {
  expect([...new Set(rowsOf('staying').map(({ stance }) => stance))]).toEqual(['negative', 'middle', 'positive'])
  const boards = findings.speaking.spread.find(({ venue }) => venue === 'boards')!
  expect(rowsOf('spread')[0]).toMatchObject({ venue: 'boards', spread_base: boards.base, spread: boards.now, spread_change: boards.change!.mean, extremes: boards.series.at(-1)!.extremes })
  expect(rowsOf('spread-series')).toHaveLength(findings.speaking.spread.reduce((sum, { series }) => sum + series.length, 0))
})

test('pull of all classes together is named; the most important topic stands first; advice keeps its rank', () => {
  expect(rowsOf('pull').slice(0, 2).map(({ poster }) => poster)).toEqual(['all', 'occasional'])
  expect(writeCell({ key: 'poster', kind: 'text' }, rowsOf('pull')[0]!, words, new Map())).toBe('All')
  expect(writeCell({ key: 'poster', kind: 'text' }, rowsOf('pull')[1]!, words, new Map())).toBe('Occasional posters')
  const importances = rowsOf('importance').map(({ importance }) => Number(importance))
  expect(importances).toEqual([...importances].sort((a, b) => b - a))
  expect(rowsOf('advice').map(({ rank, code }) => [rank, code])).toEqual(findings.advice.map(({ code }, at) => [at + 1, code]))
})

test('the curve of the tipping point passes the reported change at 1, falls where the change was a rise, and comes to nothing at one marked row', () => {
  const curve = rowsOf('tipping')
  expect(curve.find(({ ratio }) => ratio === 1)?.['tipped_change']).toBeCloseTo(findings.opinion.change!.mean, 9)
  expect(Number(curve.at(-1)?.['tipped_change'])).toBeLessThan(Number(curve[0]?.['tipped_change']))
  const marked = curve.filter(({ tips }) => tips === true)
  expect(marked).toHaveLength(1)
  expect(marked[0]?.['ratio']).toBe(findings.tipping!.ratio.mean)
  expect(marked[0]?.['tipped_change']).toBeCloseTo(0, 9)
})
