import { gzipSync } from 'node:zlib'
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { readTable } from '../../../generator/inputs/csv-table.ts'
import { quotedCsv, withAccount } from '../intake/temporary-account.ts'

const columns = { needed: ['date', 'label'], optional: ['kind'] }
const read = (name: string, content: string | Uint8Array) => withAccount({ [name]: content }, (folder) => readTable(folder, name, columns))

async function rowsOf(name: string, content: string | Uint8Array): Promise<readonly (readonly string[])[]> {
  return (await read(name, content)).rows.map(({ place, field }) => [place, ...['date', 'label', 'kind'].map(field)])
}

describe('a table', () => {
  const plain = 'date,label,kind\n2026-01-01,Fähre,price\n'
  const expected = [['t.csv:2', '2026-01-01', 'Fähre', 'price']]

  test.each([
    ['with a byte order mark', `\uFEFF${plain}`],
    ['with semicolons', plain.replaceAll(',', ';')],
    ['with tabs', plain.replaceAll(',', '\t')],
    ['with bars', plain.replaceAll(',', '|')],
    ['with quotes', plain.replace('Fähre', '"Fähre"')],
    ['with carriage returns', plain.replaceAll('\n', '\r\n')],
    ['with carriage returns alone', plain.replaceAll('\n', '\r')],
    ['without a last line break', plain.trimEnd()],
    ['with names in capitals and spaced', plain.replace('date,label,kind', ' Date ,LABEL,"Kind "')],
    ['with columns that mean nothing here', plain.replace('date,', 'date,id,').replace('01-01,', '01-01,7,')],
    ['with trailing delimiters', plain.replaceAll('\n', ',,\n')],
    ['in windows-1252', Uint8Array.from(Buffer.from(plain, 'latin1'))],
    ['in UTF-16 with the larger byte first', Uint8Array.from([0xfe, 0xff, ...Buffer.from(plain, 'utf16le').swap16()])],
    ['in UTF-16', Uint8Array.from([0xff, 0xfe, ...Buffer.from(plain, 'utf16le')])],
  ])('is read %s', async (_, content) => {
    expect(await rowsOf('t.csv', content)).toEqual(expected)
  })

  test('tells its header: where it stands, what is in it, and which columns asked for it has', async () => {
    expect((await read('t.csv', '\nLabel, ,Date ,On board\nx,,2026-01-01,\n')).header).toEqual({ place: 't.csv:2', names: ['Label', 'Date', 'On board'], columns: ['date', 'label'] })
  })

  test('is read from a gzip', async () => {
    expect(await rowsOf('t.csv.gz', gzipSync(plain))).toEqual([['t.csv.gz:2', '2026-01-01', 'Fähre', 'price']])
  })

  test('a gzip that unzips to more than anyone writes is refused', async () => {
    await expect(read('t.csv.gz', gzipSync(Buffer.alloc(65 * 1024 * 1024)))).rejects.toMatchObject({ faults: [{ code: 'file-unreadable' }] })
  })

  test('a row has the line on which it begins, whatever stands before it', async () => {
    expect((await rowsOf('t.csv', '\n\ndate,label\n\n2026-01-01,"one\r\ntwo\n\nthree"\n  \n2026-01-02,four\n')).map(([place, , label]) => [place, label]))
      .toEqual([['t.csv:5', 'one two three'], ['t.csv:10', 'four']])
  })

  test('any text comes out of quotes as it went in, at the line that counting gives', async () => {
    const label = fc.string({ unit: 'grapheme', minLength: 1, maxLength: 12 }).map((text) => `x${text.replace(/[\p{Cc}\p{Z}\uFEFF]+/gu, ' ')}x`)
    .chain((text) => fc.constantFrom('\n', '\r\n', '\r', ' ').map((gap) => text.replaceAll(' ', gap)))
    await fc.assert(fc.asyncProperty(fc.array(label, { minLength: 1, maxLength: 6 }), async (labels) => {
      const content = quotedCsv(['date', 'label'], labels.map((each) => ['2026-01-01', each]))
      const found = await rowsOf('t.csv', content)
      expect(found.map(([, , text]) => text)).toEqual(labels.map((each) => each.replace(/[\r\n]+/g, ' ')))
      let line = 2
      for (const [index, each] of labels.entries()) {
        expect(found[index]![0]).toBe(`t.csv:${line}`)
        line += each.split(/\r\n?|\n/).length
      }
    }), { numRuns: 40 })
  })
})
