import { describe, expect, test } from 'vitest'
import type { IntakeTables } from '../../../model/intake/intake-tables.ts'
import { readAccount } from '../../../generator/account/read-account.ts'
import { InputFault, type Fault } from '../../../generator/faults/fault.ts'
import { readIntake } from '../../../generator/intake/read-intake.ts'
import { withAccount } from './temporary-account.ts'

const yaml = (sources: string, more = ''): string => `account: demo\nbrand: B\nmentions:\n${sources}${more}`
const header = 'step,venue,topic,poster,mentions,authors,mean,variance,deff\n'
const intake = (files: Readonly<Record<string, string>>, period = '2025-12'): Promise<IntakeTables> =>
  withAccount(files, async (folder) => readIntake(await readAccount(folder), { period }))

async function faultsOf(rows: string, more = ''): Promise<readonly Fault[]> {
  const error: unknown = await intake({ 'account.yaml': yaml('  - cells: c.csv\n', more), 'c.csv': header + rows }).catch((reason: unknown) => reason)
  if (!(error instanceof InputFault)) throw new Error('no fault')
  return error.faults
}

const wrongs: readonly (readonly [string, string, string, RegExp])[] = [
  ['a step that is no Monday', '2025-03-04,a,b,c,2,1,0,0.1,\n', 'step', /Monday, such as 2025-03-03/],
  ['a step that is no date', 'March,a,b,c,2,1,0,0.1,\n', 'step', /`March`/],
  ['half a mention', '2025-03-03,a,b,c,2.5,1,0,0.1,\n', 'mentions', /whole number of at least 1/],
  ['no mention', '2025-03-03,a,b,c,0,0,0,0.1,\n', 'mentions', /at least 1/],
  ['more authors than mentions', '2025-03-03,a,b,c,2,3,0,0.1,\n', 'authors', /from 1 to that of mentions/],
  ['a mean outside', '2025-03-03,a,b,c,2,1,1.01,0.1,\n', 'mean', /from -1 to 1/],
  ['an empty mean', '2025-03-03,a,b,c,2,1,,0.1,\n', 'mean', /empty value/],
  ['a negative variance', '2025-03-03,a,b,c,2,1,0,-0.1,\n', 'variance', /at least 0/],
  ['a variance without end', '2025-03-03,a,b,c,2,1,0,Infinity,\n', 'variance', /at least 0/],
  ['a design effect below 1', '2025-03-03,a,b,c,2,1,0,0.1,0.9\n', 'deff', /at least 1/],
]

describe('a ready-made cell table', () => {
  test.each(wrongs)('%s is a fault with file, line and column', async (_, row, column, wording) => {
    const faults = await faultsOf(`2025-03-03,x,b,c,2,1,0,0.1,1\n${row}`)
    expect(faults.map((fault) => [fault.code, fault.place])).toContainEqual(['cell-value', `c.csv:3 ${column}`])
    expect(faults.map((fault) => fault.message).join('\n')).toMatch(wording)
  })

  test('has all its faults collected, and no cell twice in a source', async () => {
    const faults = await faultsOf('2025-03-03,a,b,c,2,1,0,0.1,\n2025-03-03,a,b,c,3,1,0,0.1,\n2025-03-03,a,b\n2025-03-10,a,b,c,x,1,7,0.1,\n')
    expect(faults.map((fault) => `${fault.code} ${fault.place}`).sort()).toEqual([
      'cell-row c.csv:4', 'cell-twice c.csv:3', 'cell-value c.csv:5 mean', 'cell-value c.csv:5 mentions',
    ])
    expect(faults.find((fault) => fault.code === 'cell-twice')!.mend).toContain('c.csv:2')
  })

  test('may leave out factors, variance and design effect', async () => {
    const { factors, cells } = await intake({ 'account.yaml': yaml('  - cells: c.csv\n'), 'c.csv': 'venue,step,mean,authors,mentions\na,2025-03-03,0.5,2,4\nb,2025-03-03,-0.5,1,1\n' })
    expect(factors.map((factor) => factor.levels.map((level) => level.name))).toEqual([['a', 'b'], ['none'], ['unknown']])
    expect([[...cells.freedom], [...cells.squares], [...cells.deff], [...cells.clustering]]).toEqual([[0, 0], [0, 0], [1, 1], [1, 1]])
  })

  test('maps venues; cells of two sources stay two rows, each with its own design effect', async () => {
    const tables = await intake({
      'account.yaml': yaml('  - cells: c.csv\n  - cells: d.csv\n', 'venues: { boards: { values: [a, b] } }\n'),
      'c.csv': `${header}2025-03-03,a,t,regular,2,2,0.5,0.5,1.5\n`, 'd.csv': `${header}2025-03-03,b,t,regular,2,1,-0.5,0.5,2.5\n`,
    })
    const { cells, accounting } = tables
    expect([cells.count, [...cells.step], [...cells.levels[0]!], [...cells.mentions], [...cells.mean], [...cells.squares]]).toEqual([2, [0, 0], [0, 0], [2, 2], [0.5, -0.5], [0.5, 0.5]])
    expect([...cells.deff]).toEqual([1.5, 2.5])
    expect(accounting).toMatchObject({ received: 2, modelled: 2, readyMade: true })
    expect([...accounting.withAuthor]).toEqual([4])
  })

  test('stands beside mentions', async () => {
    const source = '  - cells: c.csv\n  - files: m.csv\n    columns: { posted_at: t, venue: v, score: s, author: who }\n    score: { range: [-1, 1] }\n'
    const { cells, accounting, authors, variation } = await intake({
      'account.yaml': yaml(source), 'c.csv': `${header}2025-03-03,a,none,occasional,2,2,0.5,0.5,1\n`, 'm.csv': 't,v,s,who\n2025-03-12,a,1,ann\n2025-03-03,b,-1,bob\n',
    })
    expect([cells.count, accounting.received, accounting.modelled, authors.exact]).toEqual([3, 3, 3, false])
    expect([[...authors.byStep], [...authors.byPeriod]]).toEqual([[3, 1], [4]])
    expect(variation.map((row) => row?.mentions)).toEqual([1, 1])
  })

  test('keeps its design effect beside mentions of the same cell, whose own is still to be computed', async () => {
    const source = '  - cells: c.csv\n  - files: m.csv\n    columns: { posted_at: t, venue: v, score: s, author: who }\n    score: { range: [-1, 1] }\n'
    const { cells } = await intake({ 'account.yaml': yaml(source), 'c.csv': `${header}2025-03-03,a,none,occasional,4,2,0.5,0.5,3\n`, 'm.csv': 't,v,s,who\n2025-03-04,a,1,ann\n' })
    expect([[...cells.step], [...cells.mentions], [...cells.deff]]).toEqual([[0, 0], [4, 1], [3, Number.NaN]])
  })

  test('the base begins with the first step where cells come first, with the first mention where that does', async () => {
    const source = '  - cells: c.csv\n  - files: m.csv\n    columns: { posted_at: t, venue: v, score: s }\n    score: { range: [-1, 1] }\n'
    const baseOf = async (step: string): Promise<string> => (await intake({
      'account.yaml': yaml(source), 'c.csv': `${header}${step},a,none,occasional,4,2,0.5,0.5,3\n`, 'm.csv': 't,v,s\n2025-03-05,a,1\n2025-03-12,a,0\n',
    })).timeline.base.from
    expect([await baseOf('2025-03-03'), await baseOf('2025-03-10')]).toEqual(['2025-03-03', '2025-03-05'])
  })

  test('with more venues than a review can tell apart is refused', async () => {
    const rows = (count: number): string => Array.from({ length: count }, (_, index) => `2025-03-03,v${index},b,c,2,1,0,0.1,\n`).join('')
    expect((await faultsOf(rows(61)))[0]).toMatchObject({ code: 'too-many-levels', place: 'mentions venue' })
    expect((await intake({ 'account.yaml': yaml('  - cells: c.csv\n'), 'c.csv': header + rows(60) })).factors[0]!.levels.length).toBe(60)
  })
})
