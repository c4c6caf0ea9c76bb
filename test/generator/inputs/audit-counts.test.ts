import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { auditCounts } from '../../../generator/inputs/audit-counts.ts'
import { faultsOf, labelledAccount, readInputs } from './survey-account.ts'

const keys = 'coding_audit: { files: "a*.csv" }\n'
const header = 'venue,true_label,coded_label,count\n'

describe('an audit that is right', () => {
  test('has the names of the account, whatever of name, label or spelling was written', async () => {
    const { audit, files } = await readInputs(keys, { 'a.csv': `${header}boards,negative,NEUTRAL,7\nDiscussion  Boards,neutral,neutral,40\nForum,very positive,Negative,0\nblogs,neutral,negative,3\n` }, labelledAccount)
    expect(audit).toEqual([
      { venue: 'boards', trueLabel: 'negative', codedLabel: 'neutral', count: 7 }, { venue: 'boards', trueLabel: 'neutral', codedLabel: 'neutral', count: 40 },
      { venue: 'boards', trueLabel: 'Very Positive', codedLabel: 'negative', count: 0 }, { venue: 'blogs', trueLabel: 'neutral', codedLabel: 'negative', count: 3 },
    ])
    expect(files).toMatchObject([{ path: 'a.csv', rows: 4 }])
  })

  test('adds up: by files, by spellings, and by a row a coding', async () => {
    const { audit } = await readInputs(keys, { 'a1.csv': `${header}boards,neutral,neutral,1\nforum,neutral,neutral,1\n`, 'a2.csv': `${header}boards,Neutral,neutral,40\n` }, labelledAccount)
    expect(audit).toEqual([{ venue: 'boards', trueLabel: 'neutral', codedLabel: 'neutral', count: 42 }])
  })

  test('names are as written where the account has none: scores from a range have no labels, and it is for the review to refuse', async () => {
    expect((await readInputs(keys, { 'a.csv': `${header}forum,Bad,bad,1\n` })).audit).toEqual([{ venue: 'forum', trueLabel: 'Bad', codedLabel: 'bad', count: 1 }])
  })

  test('no coding is lost or made in adding up, and no pair stands twice', () => {
    const row = fc.record({ venue: fc.constantFrom('a', 'b'), trueLabel: fc.constantFrom('n', 'p'), codedLabel: fc.constantFrom('n', 'p'), count: fc.nat(99) })
    fc.assert(fc.property(fc.array(row), (rows) => {
      const counts = auditCounts(rows)
      const total = (of: readonly { readonly count: number }[]): number => of.reduce((sum, { count }) => sum + count, 0)
      expect(total(counts)).toBe(total(rows))
      for (const each of counts) {
        const same = rows.filter(({ venue, trueLabel, codedLabel }) => venue === each.venue && trueLabel === each.trueLabel && codedLabel === each.codedLabel)
        expect(each.count).toBe(total(same))
      }
      expect(new Set(counts.map(({ venue, trueLabel, codedLabel }) => `${venue} ${trueLabel} ${codedLabel}`)).size).toBe(counts.length)
    }))
  })
})

const wrongs: readonly (readonly [string, string, string, string, RegExp])[] = [
  ['a venue that the account has not', 'bords,neutral,neutral,1\n', 'input-name-unknown', 'a.csv:2 venue', /venue `bords`.*`boards`, `blogs`.*Did you mean `boards`\?.*`venues` of the account/s],
  ['all venues at once', 'all,neutral,neutral,1\n', 'input-name-unknown', 'a.csv:2 venue', /venue `all`/],
  ['no venue', ',neutral,neutral,1\n', 'input-value', 'a.csv:2 venue', /empty value/],
  ['a true label that the account has not', 'boards,veri positive,neutral,1\n', 'input-name-unknown', 'a.csv:2 true_label', /label `veri positive`.*`Very Positive`.*Did you mean `very positive`\?/s],
  ['a coded label that the account has not', 'boards,neutral,neutrall,1\n', 'input-name-unknown', 'a.csv:2 coded_label', /Did you mean `neutral`\?/],
  ['no label', 'boards,neutral,,1\n', 'input-value', 'a.csv:2 coded_label', /empty value/],
  ['half a post', 'boards,neutral,neutral,1.5\n', 'input-value', 'a.csv:2 count', /`1\.5`.*whole number/],
  ['posts below 0', 'boards,neutral,neutral,-1\n', 'input-value', 'a.csv:2 count', /0 or more/],
  ['no count', 'boards,neutral,neutral,\n', 'input-value', 'a.csv:2 count', /empty value/],
  ['no row', '', 'input-empty', 'a.csv', /rows below/],
]

describe('an audit that is wrong', () => {
  test.each(wrongs)('%s is the only fault, at its place', async (_, rows, code, place, wording) => {
    const faults = await faultsOf(keys, { 'a.csv': header + rows }, labelledAccount)
    expect(faults.map((fault) => [fault.code, fault.place])).toEqual([[code, place]])
    expect(`${faults[0]!.message} ${faults[0]!.mend}`).toMatch(wording)
  })

  test('all that is wrong with a row is told', async () => {
    expect((await faultsOf(keys, { 'a.csv': `${header}x,y,,-1\n` }, labelledAccount)).map(({ place }) => place).sort()).toEqual(['a.csv:2 coded_label', 'a.csv:2 count', 'a.csv:2 true_label', 'a.csv:2 venue'])
  })

  test('labels of every source count', async () => {
    const two = labelledAccount.replace('venues:', '  - files: more.csv\n    columns: { posted_at: published, venue: source, score: tone }\n    score: { labels: { poor: -1, NEUTRAL: 0 } }\nvenues:')
    const files = { 'more.csv': 'published,source,tone\n', 'a.csv': `${header}boards,poor,Neutral,1\n` }
    expect((await readInputs(keys, files, two)).audit).toEqual([{ venue: 'boards', trueLabel: 'poor', codedLabel: 'neutral', count: 1 }])
    expect(await faultsOf(keys, files, labelledAccount)).toHaveLength(1)
  })
})
