import { describe, expect, test } from 'vitest'
import { toCsv } from '../../../generator/tables/csv.ts'
import type { Cell } from '../../../generator/tables/table.ts'

const oneCell = (cell: Cell): string => toCsv({ name: 't', columns: [{ key: 'a', kind: 'text' }], rows: [{ a: cell }] })

describe('toCsv', () => {
  test('RFC 4180: header, CRLF after every row, the last included', () => {
    expect(toCsv({ name: 't', columns: [{ key: 'a', kind: 'text' }, { key: 'b', kind: 'count' }], rows: [{ a: 'x', b: 1 }, { a: 'y', b: null }] }))
      .toBe('a,b\r\nx,1\r\ny,\r\n')
  })

  test.each([['a,b', '"a,b"'], ['say "no"', '"say ""no"""'], ['two\nlines', '"two\nlines"'], ['plain', 'plain']])('%j is written %j', (cell, written) => {
    expect(oneCell(cell)).toBe(`a\r\n${written}\r\n`)
  })

  test.each(['=1+1', '+1', '-1', '@SUM(A1)', '\t=1', ' =1'])('text %j cannot run as a formula', (cell) => {
    expect(oneCell(cell)).toBe(`a\r\n'${cell}\r\n`)
  })

  test('a negative number is no formula and keeps its value in full', () => {
    expect(oneCell(-0.1234567890123)).toBe('a\r\n-0.1234567890123\r\n')
    expect(oneCell(true)).toBe('a\r\ntrue\r\n')
  })
})
