import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { expect, test } from 'vitest'
import { openDatabase, literal } from '../../../generator/intake/database.ts'
import { timeSql, timeText } from '../../../generator/intake/time-sql.ts'
import { changedOver, readTimes, timeForms } from '../../../generator/start/time-forms.ts'

const moment = Date.UTC(2026, 1, 23, 14, 5, 9)

/** What a form makes of 23 February 2026, 14:05:09, a Monday. */
function written(form: string): string {
  const parts: Readonly<Record<string, string>> = { d: '23', m: '2', Y: '2026', y: '26', H: '14', I: '2', M: '05', S: '09', p: 'PM', z: '+0100', a: 'Mon', b: 'Feb', B: 'February' }
  return form.replace(/%(\w)/g, (_, part: string) => parts[part]!)
}

const plain: readonly (readonly [string, number])[] = [
  ['2026-02-23T14:05:09Z', moment], ['2026-02-23 14:05:09', moment], ['2026-02-23T14:05:09.250+01:00', moment - 3_600_000], ['2026-02-23T14:05Z', moment - 9000], ['2026-02-23', Date.UTC(2026, 1, 23)],
  ['2026-2-3', Date.UTC(2026, 1, 3)], ['2026/02/23 14:05:09', moment], ['20260223T140509', moment], ['20260223', Date.UTC(2026, 1, 23)], ['2026-02-23 14:05:09 UTC', moment], ['2026-02-23 14:05:09+0130', moment - 5_400_000],
  [String(moment), moment], [String(moment / 1000), moment],
]

test('every form, ISO 8601 and epochs are read as the intake reads them', async () => {
  const scratch = await mkdtemp(path.join(tmpdir(), 'times-'))
  const database = await openDatabase({ readable: [], scratch, threads: 1 })
  const asIntake = async (text: string, format: string | null): Promise<number | null> => {
    const time = timeSql('posted', format)
    const sql = [time.draft, time.zoned, time.reading, time.clock].reduce((inner, level) => `SELECT *, ${level} FROM (${inner})`, `SELECT ${timeText(literal(text))} AS posted`)
    const [row] = await database.rows<{ clock: bigint | null }>(sql)
    return row!.clock === null ? null : Number(row!.clock) / 1000
  }
  try {
    for (const form of timeForms) {
      const text = written(form)
      const reading = readTimes([text])
      expect(reading?.format, text).not.toBeUndefined()
      expect(await asIntake(text, reading!.format), `${text} by ${reading!.format}`).toBe(reading!.moments[0])
    }
    for (const [text, at] of plain) {
      expect([text, readTimes([text])?.format, readTimes([text])?.moments[0]]).toEqual([text, null, at])
      expect(Math.abs((await asIntake(text, null))! - at), text).toBeLessThan(1000)
    }
  } finally {
    database.close()
    await rm(scratch, { recursive: true, force: true })
  }
}, 30_000)

test('a day above 12 tells day and month apart; without one both forms are told', () => {
  expect(readTimes(['03/04/2026', '13/04/2026'])).toMatchObject({ format: '%d/%m/%Y', rival: null })
  expect(readTimes(['03/04/2026', '04/13/2026'])).toMatchObject({ format: '%m/%d/%Y', rival: null })
  expect(readTimes(['03/04/2026', '05/06/2026'])).toMatchObject({ format: '%d/%m/%Y', rival: '%m/%d/%Y' })
  expect(changedOver('%d %b %Y')).toBeNull()
})

test.each([
  [['31.02.2026']], [['2026-13-01']], [['24/12/2026 25:00']], [['ann', 'bob']], [['']], [[]], [['12345']], [['1.5']], [['99999999999999']], [['2026-01-01', 'x', 'y']],
])('%j are no times', (values) => {
  expect(readTimes(values)).toBeNull()
})

test('values that do not read are NaN, and the share says how many do', () => {
  const reading = readTimes(['2026-01-01', '', 'yesterday', '2026-01-02', '2026-01-03', '2026-01-04T00:00:00Z'])!
  expect(reading).toMatchObject({ kind: 'iso', share: 0.8, withOffset: 0.25 })
  expect([...reading.moments].map(Number.isNaN)).toEqual([false, true, true, false, false, false])
})
