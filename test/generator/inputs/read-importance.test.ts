import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { statedImportance } from '../../../generator/inputs/stated-importance.ts'
import { faultsOf, labelledAccount, readInputs, type Files } from './survey-account.ts'

const keys = 'importance: { files: "i*.csv" }\n'
const read = async (files: Files, account = labelledAccount) => (await readInputs(keys, files, account)).importance!
const lines = (count: number, row: (at: number) => string) => Array.from({ length: count }, (_, at) => `${row(at)}\n`).join('')

describe('stated importance', () => {
  test('is weights that sum to 1, of topics by the names of the account', async () => {
    expect(await read({ 'i.csv': 'Topic;Weight;why\nPUNCTUALITY;25;x\nfood and seats;50;\n', 'i2.csv': 'weight,topic\n25,Crew and staff\n' })).toEqual({
      input: { kind: 'stated', topics: [{ topic: 'punctuality', weight: 0.25 }, { topic: 'onboard', weight: 0.5 }, { topic: 'staff', weight: 0.25 }] }, incomplete: 0,
    })
  })

  test('is of topics as written where the account names none', async () => {
    const account = labelledAccount.slice(0, labelledAccount.indexOf('topics:'))
    expect((await read({ 'i.csv': 'topic,weight\nFerry food,1\nx,0\n' }, account)).input).toEqual({ kind: 'stated', topics: [{ topic: 'Ferry food', weight: 1 }, { topic: 'x', weight: 0 }] })
  })

  test('weights of any scale sum to 1 and keep their order', () => {
    fc.assert(fc.property(fc.array(fc.double({ min: 0, max: 1.7e308, noNaN: true }), { minLength: 1, maxLength: 9 }).filter((weights) => weights.some((weight) => weight > 0)), (weights) => {
      const input = statedImportance(weights.map((weight, at) => ({ place: '', topic: `t${at}`, weight })))
      if (input.kind !== 'stated') throw new Error('not stated')
      expect(input.topics.reduce((sum, { weight }) => sum + weight, 0)).toBeCloseTo(1, 12)
      for (const [at, { weight }] of input.topics.entries()) if (at > 0 && weights[at]! >= weights[at - 1]!) expect(weight).toBeGreaterThanOrEqual(input.topics[at - 1]!.weight)
    }))
  })
})

describe('importance by respondents', () => {
  test('is their answers by topic, those with an answer missing left out and counted', async () => {
    const { input, incomplete } = await read({ 'i.csv': `id,Overall,Crew and Staff,on_board,age\n${lines(40, (at) => `${at},${at % 7},${at % 3 === 0 && at > 20 ? '' : at},${at / 2},`)}` })
    if (input.kind !== 'respondents') throw new Error('not of respondents')
    expect([input.topics, incomplete]).toEqual([['staff', 'onboard'], 7])
    const kept = Array.from({ length: 40 }, (_, at) => at).filter((at) => !(at % 3 === 0 && at > 20) || at === 0)
    // 21, 24, ... 39 have none: seven, of which the first is above 20
    expect(kept).toHaveLength(33)
    expect([...input.overall]).toEqual(kept.map((at) => at % 7))
    expect(input.ratings.map((ratings) => [...ratings])).toEqual([kept, kept.map((at) => at / 2)])
  })

  test('may come in several files, each in an order of its own', async () => {
    const { input } = await read({ 'i1.csv': `overall,staff,onboard\n${lines(15, () => '1,2,3')}`, 'i2.csv': `onboard,overall,staff\n${lines(15, () => '30,10,20')}` })
    if (input.kind !== 'respondents') throw new Error('not of respondents')
    expect([input.topics, [...input.overall].slice(14, 16), ...input.ratings.map((ratings) => [...ratings].slice(14, 16))]).toEqual([['staff', 'onboard'], [1, 10], [2, 20], [3, 30]])
  })

  test('30 complete rows are enough', async () => {
    expect((await read({ 'i.csv': `overall,staff,onboard\n${lines(30, () => '1,2,3')}1,,3\n` })).incomplete).toBe(1)
  })
})

const stated = 'topic,weight\nstaff,1\n'
const answers = lines(30, (at) => `${at},1,2`)
const wrongs: readonly (readonly [string, Files, string, string, RegExp])[] = [
  ['a topic that the account has not', { 'i.csv': `${stated}punctualty,1\n` }, 'input-name-unknown', 'i.csv:3 topic', /topic `punctualty`.*Did you mean `punctuality`\?.*`topics` of the account/s],
  ['a topic without name', { 'i.csv': `${stated},1\n` }, 'input-value', 'i.csv:3 topic', /empty value/],
  ['a weight below 0', { 'i.csv': `${stated}onboard,-1\n` }, 'input-value', 'i.csv:3 weight', /at least 0/],
  ['a topic without weight', { 'i.csv': `${stated}onboard,\n` }, 'input-value', 'i.csv:3 weight', /empty value/],
  ['a topic twice, under two names', { 'i.csv': `${stated}Crew and staff,1\n` }, 'importance-twice', 'i.csv:3', /topic `staff`.*i\.csv:2/s],
  ['weights that are all 0', { 'i.csv': 'topic,weight\nstaff,0\nonboard,0\n' }, 'importance-nothing', 'i.csv', /all 0/],
  ['no weight at all', { 'i.csv': 'topic,weight\n' }, 'input-empty', 'i.csv', /rows below/],
  ['neither form', { 'i.csv': 'topic,share\nstaff,1\n' }, 'importance-columns', 'i.csv:1', /`topic`, `share`.*either `topic` and `weight`, or `overall`.*`onboard`, `punctuality`, `staff`/s],
  ['two forms at once', { 'i1.csv': stated, 'i2.csv': `overall,staff,onboard\n${answers}` }, 'importance-forms', 'i2.csv:1', /same form as at i1\.csv:1/],
  ['one topic only', { 'i.csv': `overall,staff\n${answers}` }, 'importance-topics', 'i.csv:1', /at least two topics/],
  ['the same topic in two columns', { 'i.csv': `overall,staff,crew and staff\n${answers}` }, 'header-twice', 'i.csv:1', /second column `staff`/],
  ['a column that is nearly a topic', { 'i.csv': `overall,staff,Punctualty,onboard\n${lines(30, (at) => `${at},1,2,3`)}` }, 'importance-misspelled', 'i.csv:1 Punctualty', /Did you mean `punctuality`\?/],
  ['files of different topics', { 'i1.csv': `overall,staff,onboard\n${answers}`, 'i2.csv': `overall,staff,punctuality\n${answers}` }, 'importance-differ', 'i2.csv:1', /`staff`, `punctuality`.*i1\.csv:1: `staff`, `onboard`/s],
  ['an answer that is no number', { 'i.csv': `overall,staff,onboard\n${answers}5,often,2\n` }, 'input-value', 'i.csv:32 staff', /`often`.*nothing where there is no answer/],
  ['an answer that is no number in a row with one missing', { 'i.csv': `overall,staff,onboard\n${answers},often,2\n` }, 'input-value', 'i.csv:32 staff', /`often`/],
  ['29 respondents', { 'i.csv': `overall,staff,onboard\n${lines(29, () => '1,2,3')}1,,3\n` }, 'importance-short', 'i.csv', /complete rows, 29 \(and 1 with an answer missing\).*at least 30/],
]

describe('importance that is wrong', () => {
  test.each(wrongs)('%s is the only fault, at its place', async (_, files, code, place, wording) => {
    const faults = await faultsOf(keys, files, labelledAccount)
    expect(faults.map((fault) => [fault.code, fault.place])).toEqual([[code, place]])
    expect(`${faults[0]!.message} ${faults[0]!.mend}`).toMatch(wording)
  })

  test('columns that are far from any topic, or near one that has its column, are passed over', async () => {
    await expect(read({ 'i.csv': `overall,staff,onboard,punctuality,punctuality2,fares\n${lines(30, () => '1,2,3,4,x,y')}` })).resolves.toBeDefined()
  })

  test('respondents of an account without topics: the mend says to list them', async () => {
    expect((await faultsOf(keys, { 'i.csv': `overall,staff,onboard\n${answers}` }))[0]).toMatchObject({ code: 'importance-topics', mend: 'List the topics under `topics` of the account.' })
  })
})
