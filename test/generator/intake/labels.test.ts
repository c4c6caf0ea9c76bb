import { describe, expect, test } from 'vitest'
import type { IntakeTables } from '../../../model/intake/intake-tables.ts'
import { readAccount } from '../../../generator/account/read-account.ts'
import { readIntake } from '../../../generator/intake/read-intake.ts'
import { withAccount } from './temporary-account.ts'

const source = (file: string, score: string): string => `  - files: ${file}\n    columns: { posted_at: t, venue: v, score: s, author: who }\n    score: ${score}\n`
const cells = '  - cells: c.csv\n'
const files = {
  'a.csv': 't,v,s,who\n2025-03-03,forum,good,ann\n2025-03-03,forum,BAD,bob\n', 'b.csv': 't,v,s,who\n2025-03-04,forum,Good,cat\n2025-03-04,blog,bad,ann\n',
  'n.csv': 't,v,s,who\n2025-03-04,forum,5,cat\n', 'c.csv': 'step,venue,topic,poster,mentions,authors,mean,variance\n2025-03-03,forum,none,occasional,4,2,0.5,0.5\n',
}
const intake = (sources: string, labels: boolean): Promise<IntakeTables> =>
  withAccount({ ...files, 'account.yaml': `account: demo\nbrand: B\nfactors: [venue]\nmentions:\n${sources}` }, async (folder) => readIntake(await readAccount(folder), { period: '2025-03', labels }))

describe('labels by cell', () => {
  test('of two sources that label alike, spelled as in the first', async () => {
    const { labels, noLabels, cells: { count } } = await intake(source('a.csv', '{ labels: { good: 1, bad: -1 } }') + source('b.csv', '{ labels: { Bad: -1, Good: 1 } }'), true)
    expect([count, noLabels, labels!.names, [...labels!.counts]]).toEqual([2, null, ['bad', 'good'], [1, 0, 1, 2]])
  })

  test.each([
    ['labels-differ', source('a.csv', '{ labels: { good: 1, bad: -1 } }') + source('b.csv', '{ labels: { good: 1, bad: -0.5 } }')],
    ['labels-differ', source('a.csv', '{ labels: { good: 1, bad: -1 } }') + source('b.csv', '{ labels: { good: 1, bad: -1, so-so: 0 } }')],
    ['ranges', source('n.csv', '{ range: [1, 5] }')],
    ['ready-made', source('a.csv', '{ labels: { good: 1, bad: -1 } }') + cells],
    ['ready-made', source('n.csv', '{ range: [1, 5] }') + cells],
  ])('are not to be had: %s', async (reason, sources) => {
    expect(await intake(sources, true)).toMatchObject({ labels: null, noLabels: reason })
  })

  test('are none of mentions that are scored by a range: the others keep theirs', async () => {
    const { labels, cells } = await intake(source('a.csv', '{ labels: { good: 1, bad: -1 } }') + source('n.csv', '{ range: [1, 5] }'), true)
    expect([cells.mentions.reduce((sum, n) => sum + n, 0), labels!.counts.reduce((sum, n) => sum + n, 0)]).toEqual([3, 2])
  })

  test('are not counted where nobody asks', async () => {
    expect(await intake(source('n.csv', '{ range: [1, 5] }'), false)).toMatchObject({ labels: null, noLabels: null })
  })
})
