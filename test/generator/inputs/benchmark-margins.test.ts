import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { marginsOf } from '../../../generator/inputs/benchmark-margins.ts'
import { faultsOf, readInputs } from './survey-account.ts'

const keys = 'benchmark: { files: "b*.csv" }\n'
const header = 'margin,level,share\n'
const half = 'segment,islander,0.5\n'

describe('a benchmark that is right', () => {
  test('is margins of levels, in the order and spelling of the files', async () => {
    const { benchmark, files } = await readInputs(keys, {
      'b1.csv': `Margin;Level;Share;source\nregion;North Isles;0.25;census\nsegment;islander;0.4;x\nREGION;South;0.75;census\n`, 'b2.csv': `${header}Segment ,visitor,.6\nsegment,nobody,0\n`,
    })
    expect(benchmark).toEqual([
      { margin: 'region', levels: [{ level: 'North Isles', share: 0.25 }, { level: 'South', share: 0.75 }] },
      { margin: 'segment', levels: [{ level: 'islander', share: 0.4 }, { level: 'visitor', share: 0.6 }, { level: 'nobody', share: 0 }] },
    ])
    expect(files.map(({ path, rows }) => [path, rows])).toEqual([['b1.csv', 3], ['b2.csv', 2]])
  })

  test.each([['0.505', 0.505 / 1.005], ['0.495', 0.495 / 0.995]])('may be off by rounding: 0.5 and %s are brought to 1', async (share, expected) => {
    const { benchmark } = await readInputs(keys, { 'b.csv': `${header}${half}segment,visitor,${share}\n` })
    expect(benchmark![0]!.levels[1]!.share).toBeCloseTo(expected, 12)
  })

  test('shares of any margin sum to 1 and keep their proportions', () => {
    fc.assert(fc.property(fc.array(fc.double({ min: 0.01, max: 1, noNaN: true }), { minLength: 1, maxLength: 9 }), (shares) => {
      const [margin] = marginsOf(shares.map((share, at) => ({ place: '', margin: 'm', level: `l${at}`, share })))
      expect(margin!.levels.reduce((sum, { share }) => sum + share, 0)).toBeCloseTo(1, 12)
      for (const [at, { share }] of margin!.levels.entries()) expect(share / margin!.levels[0]!.share).toBeCloseTo(shares[at]! / shares[0]!, 9)
    }))
  })
})

const wrongs: readonly (readonly [string, string, string, string, RegExp])[] = [
  ['shares in percent', 'segment,islander,50\n', 'input-value', 'b.csv:2 share', /written 0\.43, not 43/],
  ['a share below 0', `${half}segment,visitor,-0.5\n`, 'input-value', 'b.csv:3 share', /`-0\.5`/],
  ['no share', `${half}segment,visitor,\n`, 'input-value', 'b.csv:3 share', /empty value/],
  ['no level', `${half}segment,,0.5\n`, 'input-value', 'b.csv:3 level', /empty value.*a name/],
  ['no margin', `${half},visitor,0.5\n`, 'input-value', 'b.csv:3 margin', /empty value/],
  ['a sum above 1 by more than rounding', `region,north,1\n${half}segment,visitor,0.506\n`, 'benchmark-sum', 'b.csv:3 share', /margin `segment`, 1\.006 .*give or take 0\.005/],
  ['a sum below 1 by more than rounding', `${half}segment,visitor,0.494\n`, 'benchmark-sum', 'b.csv:2 share', /margin `segment`, 0\.994 /],
  ['a level twice', `${half}segment,visitor,0.5\nSegment, ISLANDER ,0.5\n`, 'benchmark-twice', 'b.csv:4', /level `ISLANDER`.*b\.csv:2/s],
  ['no row', '', 'input-empty', 'b.csv', /rows below/],
]

describe('a benchmark that is wrong', () => {
  test.each(wrongs)('%s is the only fault, at its place', async (_, rows, code, place, wording) => {
    const faults = await faultsOf(keys, { 'b.csv': header + rows })
    expect(faults.map((fault) => [fault.code, fault.place])).toEqual([[code, place]])
    expect(`${faults[0]!.message} ${faults[0]!.mend}`).toMatch(wording)
  })

  test('a level twice is found across files, and the same level in two margins is right', async () => {
    expect((await faultsOf(keys, { 'b1.csv': `${header}${half}segment,visitor,0.5\n`, 'b2.csv': header + half })).map(({ code, place }) => `${code} ${place}`)).toEqual(['benchmark-twice b2.csv:2'])
    await expect(readInputs(keys, { 'b.csv': `${header}a,x,1\nb,x,1\n` })).resolves.toBeDefined()
  })

  test('a file without its columns', async () => {
    expect((await faultsOf(keys, { 'b.csv': 'margin,level,shares\n' }))[0]).toMatchObject({ code: 'input-columns', place: 'b.csv:1', mend: expect.stringContaining('`shares`') as string })
  })
})
