import { expect, test } from 'vitest'
import { closingTable, type AccountOutcome } from '../../../generator/cli/closing-table.ts'

const change = { mean: -3.14, low: -5.02, high: -1.2, sd: 1 }
const built = (name: string, more: Partial<NonNullable<AccountOutcome['draft']>> = {}): AccountOutcome => ({
  name, outcome: 'built', exitCode: 0, file: 'drafts/2026-10/review.pdf', faults: [],
  draft: { account: name, period: '2026-10', folder: `/anywhere/${name}`, movement: 'down', change, serious: [], ...more },
})
const failed = (name: string, message = 'Unexpected absence of `brand` at account.yaml brand, expected it to be given.', codes = ['account-key-absent']): AccountOutcome => ({
  name, outcome: 'failed', exitCode: 1, file: null, draft: null, faults: codes.map((code) => ({ code, place: 'account.yaml', message, mend: 'Mend it.' })),
})

test('a row for each account, and a line that counts them', () => {
  const outcomes = [
    built('ferries', { serious: ['few-authors', 'stale-audit'] }), { ...built('cycles', { movement: 'not-established', change: { mean: 0.4, low: -0.04, high: 1, sd: 1 } }), outcome: 'unchanged' as const },
    built('first', { movement: null, change: null }), failed('wrong'), { ...failed('late'), outcome: 'stopped' as const, exitCode: 130 as const },
  ]
  expect(closingTable(outcomes, 'accounts', 140).split('\n')).toEqual([
    '',
    'account  change of opinion, in points                                 serious caveats           file in its folder',
    '-------  -----------------------------------------------------------  ------------------------  -------------------------',
    'ferries  2026-10: down 3.1 (-5.0 to -1.2)                             few-authors, stale-audit  drafts/2026-10/review.pdf',
    'cycles   2026-10: no change established, 0.4 (0.0 to 1.0); unchanged  none                      drafts/2026-10/review.pdf',
    'first    2026-10: no period before                                    none                      drafts/2026-10/review.pdf',
    'wrong    not built: Unexpected absence of `brand` at account.yaml brand, expected it to be given. [account-key-absent]',
    'late     stopped, not built',
    '',
    'accounts: 5 accounts, 2 built, 1 unchanged, 1 not built, 1 stopped',
  ])
})

/** What stands in each column of a table from its row of dashes down, without spaces. */
function columnsOf(lines: readonly string[]): readonly string[] {
  const dashes = lines.findIndex((line) => line.startsWith('---'))
  const places = [...lines[dashes].matchAll(/-+/g)].map(({ 0: { length }, index }) => [index, index + length] as const)
  return places.map(([from, to]) => lines.slice(dashes + 1).map((line) => line.slice(from, to)).join('').replaceAll(' ', ''))
}

test.each([60, 80, 100])('within %i columns nothing is lost', (width) => {
  const outcomes = [built('an-account-of-a-rather-long-name', { serious: ['pooled-average-misleads', 'posts-of-few-authors', 'a-third'] }), built('b'), built('c/d'.repeat(30))]
  const lines = closingTable(outcomes, 'accounts', width).split('\n').slice(0, -2)
  expect(Math.max(...lines.map(({ length }) => length))).toBeLessThanOrEqual(width)
  expect(columnsOf(lines)).toEqual([
    `an-account-of-a-rather-long-nameb${'c/d'.repeat(30)}`, '2026-10:down3.1(-5.0to-1.2)'.repeat(3), 'pooled-average-misleads,posts-of-few-authors,a-thirdnonenone', 'drafts/2026-10/review.pdf'.repeat(3),
  ])
})

test('what went wrong has the room beside the name, and rows keep their order', () => {
  const lines = closingTable([built('a'), failed('b', 'Unexpected '.repeat(20), ['one', 'two', 'three']), built('c')], 'accounts', 80).split('\n')
  expect(Math.max(...lines.map(({ length }) => length))).toBeLessThanOrEqual(80)
  expect(lines.flatMap((line) => /^[abc]\b/.exec(line)?.[0] ?? [])).toEqual(['a', 'b', 'c'])
  expect(lines.join(' ')).toContain('[one], and 2 more')
})

test('what an account says of itself can’t move the cursor, clear the screen or turn the line about', () => {
  const table = closingTable([built('evil\u001b[2Jname\u202etxt\u0085'), failed('b\r\nc', 'Unexpected \u001b]0;title\u0007 there')], 'some\u001bwhere', 100)
  expect(table.replaceAll('\n', '')).not.toMatch(/[\p{Cc}\p{Cf}]/u)
  expect(table).toContain('evil [2Jname txt')
})
