import { readFile } from 'node:fs/promises'
import path from 'node:path'
import { gzipSync } from 'node:zlib'
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { readAccount } from '../../../generator/account/read-account.ts'
import { readIntake } from '../../../generator/intake/read-intake.ts'
import { quotedCsv, withAccount } from './temporary-account.ts'

const yaml = (file: string): string => `account: demo
brand: B
mentions:
  - files: ${file}
    columns: { posted_at: t, venue: v, score: s, author: who, text: said }
    score: { range: [1, 5] }
`

async function rejectsOf(file: string, content: string | Uint8Array): Promise<string> {
  return withAccount({ 'account.yaml': yaml(file), [file]: content }, async (folder) => {
    const rejects = path.join(folder, 'out/rejects')
    await readIntake(await readAccount(folder), { period: '2025-12', rejects })
    return readFile(path.join(rejects, 'mentions.csv'), 'utf8')
  })
}

const text = `t,v,s,who,said
2025-03-03,forum,3,ann,"one
two

three"
never,forum,3,ann,secret
2025-03-03,forum,nine,ann,"secret
words"

2025-03-03,forum,9,ann,secret
2025-03-03,,3,ann,secret
too,few
2025-03-03,forum,3,ann,secret,more
2025-03-03,forum,3,ann,"a ""quoted"" word"
"bad"quote,forum,3,ann,secret
2025-03-03,forum,,ann,secret
`
const expected = `file,line,reason
a.csv,6,time-unreadable
a.csv,7,score-unreadable
a.csv,10,score-outside-range
a.csv,11,venue-missing
a.csv,12,row-malformed
a.csv,13,row-malformed
a.csv,15,row-malformed
a.csv,16,score-unreadable
`

describe('rejects', () => {
  test('name file, line and reason, also after line breaks inside of fields, and nothing of what was said', async () => {
    expect(await rejectsOf('a.csv', text)).toBe(expected)
    expect(await rejectsOf('a.csv', text.replaceAll('\n', '\r\n'))).toBe(expected)
    expect(await rejectsOf('a.csv', `\uFEFF${text}`)).toBe(expected)
    expect(await rejectsOf('a.csv.gz', gzipSync(text))).toBe(expected.replaceAll('a.csv', 'a.csv.gz'))
    expect(await rejectsOf('a.csv', text)).not.toMatch(/ann|secret|forum/)
  })

  test('a quote that is never closed loses its own line and no other', async () => {
    const rows = Array.from({ length: 2000 }, (_, index) => (index === 700 || index === 900 ? '2025-03-03,forum,3,"ann,words' : index === 1500 ? 'never,forum,3,ann,words' : `2025-03-03,forum,3,ann,words ${index}`))
    const content = `t,v,s,who,said\n${rows.join('\n')}\n`
    // The quote of row 900 closes the one of row 700: between the two it cannot be known what was meant.
    const one = content.replace('"ann,words\n2025-03-03,forum,3,ann,words 901', 'ann,words\n2025-03-03,forum,3,ann,words 901')
    for (const [file, bytes] of [['a.csv', one], ['a.csv.gz', gzipSync(one)]] as const) {
      expect(await rejectsOf(file, bytes)).toBe(`file,line,reason\n${file},702,row-malformed\n${file},1502,time-unreadable\n`)
    }
    await withAccount({ 'account.yaml': yaml('"*.csv"'), 'a.csv': one, 'b.csv': 't,v,s,who,said\nnever,forum,3,ann,words\n2025-03-04,forum,3,ann,\n' }, async (folder) => {
      const { accounting } = await readIntake(await readAccount(folder), { period: '2025-12', rejects: folder })
      expect(accounting).toMatchObject({ received: 2002, modelled: 1999, rejected: 3 })
      expect(await readFile(path.join(folder, 'mentions.csv'), 'utf8')).toContain('b.csv,2,time-unreadable')
    })
  })

  test('of NDJSON count blank lines too', async () => {
    expect(await rejectsOf('a.ndjson', '{"t":"2025-03-03","v":"forum","s":3,"who":"ann","said":""}\n\n{"t":"2025-03-03","v":"forum","s":30}\nno json\n'))
      .toBe('file,line,reason\na.ndjson,3,score-outside-range\na.ndjson,4,row-malformed\n')
  })

  test('a file name that a CSV must quote is quoted', async () => {
    expect(await rejectsOf('a, "b".csv', 't,v,s,who,said\n2025-03-03,forum,3,,\nnever,forum,3,,\n')).toContain('"a, ""b"".csv",3,time-unreadable')
  })

  test('stand on the line that the row begins on, wherever line breaks are', async () => {
    const field = fc.stringMatching(/^[a-z" ,\n]{0,8}$/)
    await fc.assert(fc.asyncProperty(fc.array(fc.record({ sound: fc.boolean(), said: field, who: field }), { minLength: 1, maxLength: 25 }), async (given) => {
      const rows = [...given, { sound: true, said: '', who: '' }].map(({ sound, said, who }) => [sound ? '2025-03-03' : 'never', 'forum', '3', who, said])
      const lines = rows.map((_, index) => quotedCsv(['t', 'v', 's', 'who', 'said'], rows.slice(0, index)).split('\n').length + 1)
      const wanted = rows.flatMap((row, index) => (row[0] === 'never' ? [`a.csv,${lines[index]},time-unreadable\n`] : []))
      expect(await rejectsOf('a.csv', quotedCsv(['t', 'v', 's', 'who', 'said'], rows))).toBe(`file,line,reason\n${wanted.join('')}`)
    }), { numRuns: 25 })
  })
})
