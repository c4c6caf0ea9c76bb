import { expect, test } from 'vitest'
import { tablesOf } from '../../../generator/tables/tables-of.ts'
import type { Row } from '../../../generator/tables/table.ts'
import { writeCell } from '../../../generator/words/cells.ts'
import { blankFindings } from '../../../model/findings/blank.ts'
import { definitionParts } from '../../../model/past/definition.ts'
import type { Findings } from '../../../model/findings/schema.ts'
import { houseWords } from '../../support/house-words.ts'
import { sampleFindings } from '../../support/sample-findings.ts'

const words = await houseWords()
const findings = sampleFindings()
const revisions = findings.revisions!
const rowsOf = (name: string, of: Findings = findings): readonly Row[] => tablesOf(of).find((table) => table.name === name)?.rows ?? []
const ofPast = ['revisions', 'breaks', 'follow-up']
const written = (row: Row | undefined, key: string) => row && writeCell({ key, kind: 'text' }, row, words, new Map())

test('before the first seal the tables are there and empty', () => {
  for (const name of ofPast) expect(rowsOf(name, blankFindings), name).toEqual([])
  for (const name of ofPast) expect(rowsOf(name).length, name).toBeGreaterThan(0)
})

test('every column has its words', () => {
  for (const { name, columns } of tablesOf(findings).filter((table) => ofPast.includes(table.name))) {
    for (const { key } of columns) if (!/_(low|high)$/.test(key)) expect(words.has(`column-${key}`), `${name}: ${key}`).toBe(true)
  }
})

test('every sealed period, the newest first, as told and as it stands now; parts sum to the whole', () => {
  const rows = rowsOf('revisions')
  expect(rows.map(({ period }) => period)).toEqual(revisions.periods.map(({ period }) => period).reverse())
  const [newest, told] = [rows[0]!, revisions.periods.at(-1)!]
  expect(newest).toMatchObject({ start: '2026-09-01', told: told.level.mean, told_low: told.level.low, told_high: told.level.high, now: told.level_now!.mean, moved: told.moved, change_told: told.change!.mean, moved_change: told.moved_change, late: told.late })
  for (const row of rows) expect(['moved_late', 'moved_account', 'moved_program', 'moved_later'].reduce((sum, key) => sum + Number(row[key]), 0)).toBeCloseTo(Number(row['moved']), 9)
  expect(rows.filter(({ resealed }) => resealed !== null)).toMatchObject([{ period: '2026-05', resealed_on: '2026-08-20', resealed: revisions.periods[1]!.revised!.level.mean }])
})

test('what can’t be told is null: late posts that can’t be told apart, and all of now where a period has left the history', () => {
  const [first, second, ...others] = revisions.periods
  const periods = [{ ...first!, parts: { ...first!.parts!, late_posts: null } }, { ...second!, level_now: null, change_now: null, moved: null, moved_change: null, parts: null }, ...others]
  const rows = rowsOf('revisions', { ...findings, revisions: { ...revisions, periods } })
  expect(rows.at(-1)).toMatchObject({ moved_late: null, moved: first!.moved, moved_account: first!.parts!.account })
  expect(rows.at(-2)).toMatchObject({ now: null, now_low: null, moved: null, moved_late: null, moved_later: null, change_now: null, told: second!.level.mean })
})

test('a break has a row for each part, midway between the two periods; each part there is has its words', () => {
  const of = { ...findings, revisions: { ...revisions, breaks: [{ after: '2026-06', before: '2026-07', parts: [...definitionParts], bridged: false }] } }
  const rows = rowsOf('breaks', of)
  expect(rows).toHaveLength(definitionParts.length)
  expect(rows[0]).toEqual({ after: '2026-06', before: '2026-07', between: '2026-06-16', definition: 'brand', bridged: false })
  for (const row of rows) expect(written(row, 'definition')).not.toBe(row['definition'])
  expect([written(rows[0], 'after'), written(rows[0], 'before'), written(rows.find(({ definition }) => definition === 'target_mix'), 'definition')]).toEqual(['June 2026', 'July 2026', 'the fixed mix that opinion is stated at'])
})

test('advice followed up: counts or shares, widths where given, an outcome in words', () => {
  const rows = rowsOf('follow-up')
  expect(rows[0]).toMatchObject({ code: 'hear-venue', outcome: 'partly', count_before: 210, count_sought: 330, count_now: 268, share_before: null, width_expected: 2.6, width_now: 2.8 })
  expect(rows[1]).toMatchObject({ code: 'hear-segment', count_before: null, share_before: 0.04, share_sought: 0.16, share_now: 0.04, width_expected: null })
  expect(rows.map((row) => written(row, 'outcome'))).toEqual(['on its way', 'not met', 'met', 'can’t be told'])
})
