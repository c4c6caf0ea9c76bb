import { describe, expect, test } from 'vitest'
import type { IntakeTables, SegmentTable } from '../../../model/intake/intake-tables.ts'
import { readAccount } from '../../../generator/account/read-account.ts'
import { InputFault } from '../../../generator/faults/fault.ts'
import type { MarginWish } from '../../../generator/intake/margins.ts'
import { readIntake } from '../../../generator/intake/read-intake.ts'
import { withAccount } from './temporary-account.ts'

const yaml = (sources: string): string => `account: demo\nbrand: B\nfactors: [venue, topic, poster]\nbenchmark: { files: benchmark.csv }\nmentions:\n${sources}`
const mapped = '  - files: m.csv\n    columns: { posted_at: t, venue: v, score: s, author: who, segment: kind, text: said }\n    score: { range: [-1, 1] }\n'
const cells = '  - cells: c.csv\n'
const cellFile = 'step,venue,topic,poster,mentions,authors,mean\n2025-03-03,forum,none,occasional,4,2,0.5\n'
const header = 't,v,s,who,kind,said\n'
const intake = (rows: string, margins: readonly MarginWish[], sources = mapped): Promise<IntakeTables> =>
  withAccount({ 'account.yaml': yaml(sources), 'benchmark.csv': 'margin,level,share\n', 'm.csv': header + rows, 'c.csv': cellFile }, async (folder) => readIntake(await readAccount(folder), { period: '2025-03', margins }))
const segment = { margin: 'segment', levels: ['Islander', 'none', 'visitor'] }
const named = ({ levels, rows }: SegmentTable) => rows.map((row) => [...row.levels.map((level, m) => (level < 0 ? null : levels[m]![level])), row.authors, row.sum, row.squares])

describe('authors by the margins of a benchmark', () => {
  test('take the level that most of their posts name; posts that name none have no say; nobody known is one author a post', async () => {
    const rows = '2025-03-03,forum,1,ann,islander,\n2025-03-04,forum,0,ann,,\n2025-03-05,forum,0.5,ann,,\n2025-03-03,forum,-1,bob,visitor,\n2025-03-04,forum,-1,bob,Islander ,\n'
      + '2025-03-03,forum,1,,VISITOR,\n2025-03-04,forum,1,,visitor,\n2025-03-04,forum,0,cat,none,\n2025-03-04,forum,0,dan,freight,\n2025-03-04,forum,0.5,eve,,\n2025-02-10,forum,1,fay,early,\n'
    const { segments } = await intake(rows, [segment])
    expect(segments!.levels).toEqual([['Islander', 'freight', 'none', 'visitor']])
    expect(new Set(named(segments!))).toEqual(new Set([[null, 1, 0.5, 0.25], ['Islander', 2, -0.5, 1.25], ['freight', 1, 0, 0], ['none', 1, 0, 0], ['visitor', 2, 2, 2]]))
  })

  test('may be factors of the account, the empty topic and the unknown author being no level', async () => {
    const { segments } = await intake('2025-03-03,Forum,1,ann,,\n2025-03-03,blog,0,,,\n', [{ margin: 'venue', levels: ['forum'] }, { margin: 'topic', levels: [] }, { margin: 'poster', levels: [] }])
    expect(named(segments!)).toEqual([['blog', null, null, 1, 0, 0], ['forum', null, 'occasional', 1, 1, 1]])
  })

  test('change nothing else in the tables', async () => {
    const rows = '2025-03-03,forum,1,ann,islander,\n2025-03-04,blog,0,ann,,\n2025-03-05,forum,0.5,bob,crew,\n'
    expect({ ...await intake(rows, [segment]), segments: null }).toEqual(await intake(rows, []))
  })

  test('a margin that no column says is a fault at the benchmark, all of them together', async () => {
    const error: unknown = await intake('2025-03-03,forum,1,ann,,\n', [{ margin: 'segmnt', levels: [] }, segment, { margin: 'said', levels: [] }]).catch((reason: unknown) => reason)
    if (!(error instanceof InputFault)) throw new Error('no fault')
    expect(error.faults.map(({ code, place }) => [code, place])).toEqual([['benchmark-margin-unmapped', 'account.yaml:4:14 benchmark.files'], ['benchmark-margin-unmapped', 'account.yaml:4:14 benchmark.files']])
    expect(error.faults[0]!.mend).toContain('`segment`')
  })

  test.each(['author', 'text', 'posted_at'])('nobody is told apart by %s', async (margin) => {
    await expect(intake('2025-03-03,forum,1,ann,,\n', [{ margin, levels: [] }])).rejects.toThrow(/margin/)
  })

  test('are empty where cells come ready-made, as is all that counts authors', async () => {
    for (const sources of [cells, cells + mapped]) {
      const tables = await intake('2025-03-03,forum,1,ann,islander,\n', [segment], sources)
      expect(tables).toMatchObject({ staying: [], extremes: [], pull: [], segments: { margins: ['segment'], rows: [], levels: [[]] } })
    }
  })
})
