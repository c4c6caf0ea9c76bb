import { mkdir, mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { readAccount } from '../../../generator/account/read-account.ts'
import { InputFault } from '../../../generator/faults/fault.ts'
import { readIntake } from '../../../generator/intake/read-intake.ts'
import { joinUnread } from '../../../generator/intake/unread-values.ts'

let folder: string
beforeAll(async () => { folder = await mkdtemp(join(tmpdir(), 'unread-')) })
afterAll(() => rm(folder, { recursive: true, force: true }))

const tones = ['negativ', 'neutral', 'positiv']

/** 300 posts over 300 days, a third of each tone. */
async function intakeOf(name: string, reading: string, time = (day: number) => new Date(Date.UTC(2025, 0, 1 + day, 12)).toISOString()) {
  const account = join(folder, name)
  await mkdir(account)
  await writeFile(join(account, 'posts.csv'), ['when,where,tone', ...Array.from({ length: 300 }, (_, day) => `${time(day)},forum,${tones[day % 3]}`)].join('\n'))
  await writeFile(join(account, 'account.yaml'), `account: a\nbrand: A\nmentions:\n  - files: posts.csv\n    columns: { posted_at: when, venue: where, score: tone }\n    ${reading}\n`)
  return readIntake(await readAccount(account))
}

test('a label that the account misspells is told with its rows', async () => {
  const { accounting } = await intakeOf('misspelt', 'score: { labels: { negative: -1, neutral: 0, positiv: 1 } }')
  expect(accounting.unread).toEqual([{ column: 'score', value: 'negativ', rows: 100 }])
})

test('nothing is told where everything can be read', async () => {
  const { accounting } = await intakeOf('sound', 'score: { labels: { negativ: -1, neutral: 0, positiv: 1 } }')
  expect(accounting.unread).toEqual([])
})

test('where most rows can’t be read the fault shows what they hold', async () => {
  const fault = await intakeOf('mostly', 'score: { labels: { negative: -1, neutral: 0, positive: 1 } }').catch((error: unknown) => error)
  expect(fault).toBeInstanceOf(InputFault)
  expect((fault as InputFault).faults[0]).toMatchObject({ code: 'mostly-rejected', mend: expect.stringContaining('`negativ` (100), `positiv` (100)') as string })
})

test('times of another form: the fault shows one and says what to give', async () => {
  const fault = await intakeOf('times', 'score: { labels: { negativ: -1, neutral: 0, positiv: 1 } }', (day) => `${String(1 + day % 28).padStart(2, '0')}.01.2025 20:41`).catch((error: unknown) => error)
  expect((fault as InputFault).faults[0].code).toBe('no-mentions')
  expect((fault as InputFault).faults[0].mend).toMatch(/`\d\d\.01\.2025 20:41` \(\d+\).*time_format/)
})

test('the same value of several files is summed', () => {
  const row = { column: 'score', value: 'x', rows: 2 } as const
  expect(joinUnread([[row], [{ ...row, rows: 3 }, { column: 'posted_at', value: 'x', rows: 4 }]])).toEqual([{ column: 'score', value: 'x', rows: 5 }, { column: 'posted_at', value: 'x', rows: 4 }])
})
