import { createHash } from 'node:crypto'
import { describe, expect, test } from 'vitest'
import { faultsOf, firstRow, readInputs, surveyHeader, type Files } from './survey-account.ts'

const keys = 'survey: { files: s.csv }\n'
const survey = (...rows: readonly string[]): Files => ({ 's.csv': surveyHeader + rows.join('') })

describe('inputs that are right', () => {
  test('are read as values: names in the order of the files, waves in order of time', async () => {
    const files = survey(
      'w2,2026-02-02,2026-02-13,favourability,,380,,0.45,share,\n', 'w2,2026-02-02,2026-02-13,overall_satisfaction,visitor,60,51.5,6.8,Mean,2.1\n',
      firstRow, '\n', ' , ,,,,,,,,\n', 'w1,2026-01-05,2026-01-16,favourability,islander,170,150,0.5,share,0.5\n')
    const events = 'date,label,kind,owner\n2026-03-01,"Fares, again\nthey rise",price,me\n2026-01-01,<b>New year</b>,,\n'
    const outcome = 'date;value;market\n2026-02-01;1100.5;\n2026-01-01;1000;5e3\n'
    const { files: read, ...raw } = await readInputs(`survey: { files: s.csv, headline: Favourability, labels: { favourability: Warmth } }\nevents: { files: e.csv }\noutcome: { files: o.csv }\n`,
      { ...files, 'e.csv': events, 'o.csv': outcome })
    expect(raw).toEqual({
      survey: {
        headline: 0,
        metrics: [{ name: 'favourability', label: 'Warmth', kind: 'share' }, { name: 'overall_satisfaction', label: 'Overall satisfaction', kind: 'mean' }],
        segments: ['visitor', 'islander'],
        waves: [
          { name: 'w1', start: '2026-01-05', end: '2026-01-16', readings: [
            { metric: 0, segment: -1, base: 400, effectiveBase: 340, value: 0.43, sd: null }, { metric: 0, segment: 1, base: 170, effectiveBase: 150, value: 0.5, sd: null },
          ] },
          { name: 'w2', start: '2026-02-02', end: '2026-02-13', readings: [
            { metric: 0, segment: -1, base: 380, effectiveBase: 380, value: 0.45, sd: null }, { metric: 1, segment: 0, base: 60, effectiveBase: 51.5, value: 6.8, sd: 2.1 },
          ] },
        ],
      },
      events: [{ date: '2026-01-01', label: '<b>New year</b>', kind: '' }, { date: '2026-03-01', label: 'Fares, again they rise', kind: 'price' }],
      outcome: [{ date: '2026-01-01', value: 1000, market: 5000 }, { date: '2026-02-01', value: 1100.5, market: null }],
      benchmark: null, audit: null, importance: null,
    })
    expect(read).toEqual([['s.csv', files['s.csv']!, 4], ['e.csv', events, 2], ['o.csv', outcome, 2]]
      .map(([path, text, rows]) => ({ path, sha256: createHash('sha256').update(text as string).digest('hex'), rows })))
  })

  test('an account without any has none', async () => {
    expect(await readInputs('', {})).toEqual({ survey: null, events: null, outcome: null, benchmark: null, audit: null, importance: null, files: [] })
  })

  test('a wave may lack a metric, fieldwork may overlap, and case does not tell names apart', async () => {
    const { survey: read } = await readInputs('survey: { files: s.csv, headline: favourability }\n', survey(
      firstRow, 'W2,2026-01-12,2026-01-23,FAVOURABILITY,,400,,0.44,share,\n', 'w2,2026-01-12,2026-01-23,trust,,400,,0.6,share,\n'))
    expect(read!.waves.map(({ name, readings }) => [name, readings.map(({ metric }) => metric)])).toEqual([['w1', [0]], ['W2', [0, 1]]])
  })

  test('an event file may hold no event yet', async () => {
    expect((await readInputs('events: { files: e.csv }\n', { 'e.csv': 'date,label\n' })).events).toEqual([])
  })
})

const second = 'w2,2026-02-02,2026-02-13,favourability,,380,300,0.45,share,\n'
const mean = 'w1,2026-01-05,2026-01-16,satisfaction,,400,340,6.8,mean,2\n'
const inRow = (row: string): Files => survey(firstRow, row)
const outcomeKeys = 'outcome: { files: o.csv }\n'
const eventKeys = 'events: { files: e.csv }\n'

/** What is wrong, keys, files, the code of its fault, its place, what its message and mend must speak of. */
const wrongs: readonly (readonly [string, string, Files, string, string, RegExp])[] = [
  ['a needed column that is missing', keys, { 's.csv': `${surveyHeader.replace('metric', 'metrik')}${firstRow}` }, 'input-columns', 's.csv:1', /columns `metric` too.*nearest: `metrik`/s],
  ['a column twice', keys, { 's.csv': `${surveyHeader.replace('sd', 'Value')}${firstRow}` }, 'header-twice', 's.csv:1', /second column `value`/],
  ['a file without a byte', keys, { 's.csv': '' }, 'input-empty', 's.csv', /absence of rows.*`field_start`/],
  ['a file of blanks', keys, { 's.csv': '\n  \n,,,\n' }, 'input-empty', 's.csv', /absence of rows/],
  ['a survey without a row', keys, survey(), 'input-empty', 's.csv', /rows below it/],
  ['a gz that is none', 'survey: { files: s.csv.gz }\n', { 's.csv.gz': surveyHeader }, 'file-unreadable', 's.csv.gz', /Export the file again/],
  ['a row with a field too many', keys, inRow(second.replace('0.45', '0,45')), 'input-row', 's.csv:3', /row of 11 fields .* expected 10/],
  ['a row with a field too few', keys, inRow('w2,2026-02-02\n'), 'input-row', 's.csv:3', /row of 2 fields/],
  ['a quote that is never closed', keys, survey(firstRow, second.replace('w2', '"w2')), 'input-quote', 's.csv:3', /Close the quote/],
  ['a date that does not exist', keys, inRow(second.replace('2026-02-13', '2026-02-30')), 'input-value', 's.csv:3 field_end', /`2026-02-30`.*a date that exists/],
  ['a date of another form', keys, inRow(second.replace('2026-02-02', '02.02.2026')), 'input-value', 's.csv:3 field_start', /`02\.02\.2026`.*written 2026-10-31/],
  ['an end before the start', keys, inRow(second.replace('2026-02-13', '2026-02-01')), 'input-value', 's.csv:3 field_end', /on or after field_start, 2026-02-02/],
  ['a fieldwork of years', keys, inRow(second.replace('2026-02-13', '2062-02-13')), 'input-value', 's.csv:3 field_end', /within a year of field_start/],
  ['a share in percent', keys, inRow(second.replace('0.45', '45')), 'input-value', 's.csv:3 value', /`45`.*shares are written 0\.43, not 43/],
  ['a share below 0', keys, inRow(second.replace('0.45', '-0.01')), 'input-value', 's.csv:3 value', /share from 0 to 1/],
  ['a share with a percent sign', keys, inRow(second.replace('0.45', '45 %')), 'input-value', 's.csv:3 value', /`45 %`/],
  ['a decimal comma', keys, inRow(second.replace('0.45', '"0,45"')), 'input-value', 's.csv:3 value', /`0,45`.*decimal point and no comma/],
  ['a kind that is neither', keys, inRow(second.replace('share', 'index')), 'input-value', 's.csv:3 kind', /`index`.*`share` or `mean`/],
  ['a mean without its deviation', keys, inRow(mean.replace(',2\n', ',\n')), 'input-value', 's.csv:3 sd', /empty value.*standard deviation of the answers/],
  ['a mean with a negative deviation', keys, inRow(mean.replace(',2\n', ',-2\n')), 'input-value', 's.csv:3 sd', /`-2`/],
  ['a mean that is no number', keys, inRow(mean.replace('6.8', 'high')), 'input-value', 's.csv:3 value', /`high`.*a number/],
  ['a mean beyond every number', keys, inRow(mean.replace('6.8', '1e999')), 'input-value', 's.csv:3 value', /`1e999`/],
  ['a base of none', keys, inRow(second.replace('380', '0')), 'input-value', 's.csv:3 base', /whole number of at least 1/],
  ['half an interview', keys, inRow(second.replace('380', '380.5')), 'input-value', 's.csv:3 base', /whole number of at least 1/],
  ['an effective base of 0', keys, inRow(second.replace('300', '0')), 'input-value', 's.csv:3 effective_base', /at least 1/],
  ['an effective base above the base', keys, inRow(second.replace('300', '381')), 'input-value', 's.csv:3 effective_base', /no larger than the base, 380/],
  ['a row without a wave', keys, inRow(second.replace('w2', '')), 'input-value', 's.csv:3 wave', /empty value.*a name/],
  ['the same figure twice', keys, survey(firstRow, second, firstRow.replace('0.43', '0.44')), 'survey-twice', 's.csv:4', /wave `w1`, metric `favourability`, everyone.*s\.csv:2/s],
  ['one wave with two fieldworks', 'survey: { files: s.csv, headline: favourability }\n', survey(firstRow, firstRow.replace('2026-01-16', '2026-01-17').replace(',,', ',islander,')), 'survey-fieldwork', 's.csv:3', /2026-01-05 to 2026-01-17.*2026-01-05 to 2026-01-16, as at s\.csv:2/],
  ['one metric with two kinds', keys, inRow(second.replace('share,', 'mean,0.5')), 'survey-kind', 's.csv:3 kind', /`mean` of metric `favourability`.*`share`, as at s\.csv:2/],
  ['a headline that is no metric', 'survey: { files: s.csv, headline: favorability }\n', inRow(second), 'survey-headline-unknown', 'account.yaml:7:25 survey.headline', /Did you mean `favourability`/],
  ['no headline among several metrics', keys, inRow(mean), 'survey-headline-open', 'account.yaml:7:1 survey', /of `favourability`, `satisfaction`.*Add `headline:`/s],
  ['a headline for segments only', keys, survey(firstRow.replace(',,', ',islander,')), 'survey-headline-everyone', 'account.yaml:7:1 survey', /segments `islander` only/],
  ['a label for no metric', 'survey: { files: s.csv, labels: { favurability: Warmth } }\n', inRow(second), 'survey-label-unknown', 'account.yaml:7:35 survey.labels.favurability', /Did you mean `favourability`/],
  ['a next fieldwork that is past', 'survey: { files: s.csv, next_fieldwork: { from: 2026-02-13, to: 2026-02-20 } }\n', inRow(second), 'survey-next-fieldwork', 'account.yaml:7:25 survey.next_fieldwork', /after those of the last wave, `w2`, 2026-02-02 to 2026-02-13/],
  ['a next fieldwork of years', 'survey: { files: s.csv, next_fieldwork: { from: 2026-03-01, to: 2027-03-02 } }\n', inRow(second), 'survey-next-fieldwork-long', 'account.yaml:7:25 survey.next_fieldwork', /2026-03-01 to 2027-03-02.*at most 366 days/],
  ['a next fieldwork beyond all dates', 'survey: { files: s.csv, next_fieldwork: { from: 9999-01-01, to: 9999-01-02 } }\n', inRow(second), 'survey-next-fieldwork-long', 'account.yaml:7:25 survey.next_fieldwork', /ends by 2199-12-31/],
  ['a date before all data', keys, inRow(second.replace('2026-02-02', '1899-12-31').replace('2026-02-13', '1900-01-01')), 'input-value', 's.csv:3 field_start', /`1899-12-31`.*from 1900-01-01 to 2199-12-31/],
  ['a base beyond all counting', keys, inRow(second.replace('380', '9007199254740991')), 'input-value', 's.csv:3 base', /`9007199254740991`.*1,000,000,000,000/],
  ['an effective base below one interview', keys, inRow(second.replace('300', '0.99')), 'input-value', 's.csv:3 effective_base', /`0\.99`.*at least 1/],
  ['a mean beyond all scales', keys, inRow(mean.replace('6.8', '-1e300')), 'input-value', 's.csv:3 value', /`-1e300`.*from -1,000,000,000,000 to 1,000,000,000,000/],
  ['a thousands separator', keys, inRow(second.replace('380', '"1,200"')), 'input-value', 's.csv:3 base', /`1,200`.*without a thousands separator/],
  ['a thousands separator that is a space', keys, inRow(second.replace('380', '1 200')), 'input-value', 's.csv:3 base', /`1 200`.*without a thousands separator/],
  ['a percent sign', keys, inRow(second.replace('0.45', '45%')), 'input-value', 's.csv:3 value', /`45%`.*without the percent sign/],
  ['a name longer than a line', keys, inRow(second.replace('w2', 'W'.repeat(81))), 'input-value', 's.csv:3 wave', /`W{57}\.\.\.`.*at most 80 characters/],
  ['a segment longer than a line', keys, inRow(second.replace(',,', `,${'s'.repeat(81)},`)), 'input-value', 's.csv:3 segment', /at most 80 characters/],
  ['a label of a metric longer than a line', `survey: { files: s.csv, labels: { favourability: ${'L'.repeat(81)} } }\n`, inRow(second), 'account-value', 'account.yaml:7:35 survey.labels.favourability', /at most 80 characters/],
  ['an event longer than a line', eventKeys, { 'e.csv': `date,label\n2026-01-01,${'e'.repeat(81)}\n` }, 'input-value', 'e.csv:2 label', /at most 80 characters/],
  ['an event of a kind longer than a line', eventKeys, { 'e.csv': `date,label,kind\n2026-01-01,x,${'k'.repeat(81)}\n` }, 'input-value', 'e.csv:2 kind', /at most 80 characters/],
  ['an event after all dates', eventKeys, { 'e.csv': 'date,label\n2200-01-01,x\n' }, 'input-value', 'e.csv:2 date', /from 1900-01-01 to 2199-12-31/],
  ['an outcome too small to have a logarithm worth the name', outcomeKeys, { 'o.csv': 'date,value\n2026-01-01,1e-320\n2026-02-01,1\n' }, 'input-value', 'o.csv:2 value', /`1e-320`.*from 1e-12/],
  ['an outcome too large', outcomeKeys, { 'o.csv': 'date,value\n2026-01-01,1e308\n2026-02-01,1\n' }, 'input-value', 'o.csv:2 value', /`1e308`.*1,000,000,000,000/],
  ['an outcome that is a text', outcomeKeys, { 'o.csv': 'date,value\n2026-01-01,n/a\n2026-02-01,1\n' }, 'input-value', 'o.csv:2 value', /`n\/a`.*expected a number above 0\. /],
  ['a file in UTF-16 without its mark', keys, { 's.csv': Buffer.from(surveyHeader + firstRow, 'utf16le') }, 'input-encoding', 's.csv', /Save the file as UTF-8/],
  ['a header of whole texts', keys, { 's.csv': `${Array.from({ length: 40 }, (_, i) => `${i}${'h'.repeat(200)}`).join(',')}\n${firstRow}` }, 'input-columns', 's.csv:1', /^.{0,1200}and 28 more.{0,700}$/s],
  ['an event without a label', eventKeys, { 'e.csv': 'date,label\n2026-01-01,\n' }, 'input-value', 'e.csv:2 label', /empty value/],
  ['an event on no day', eventKeys, { 'e.csv': 'date,label\n2025-02-29,x\n' }, 'input-value', 'e.csv:2 date', /a date that exists/],
  ['events without a date column', eventKeys, { 'e.csv': 'day,label\n' }, 'input-columns', 'e.csv:1', /`date`.*nearest: `day`/s],
  ['an outcome of 0', outcomeKeys, { 'o.csv': 'date,value\n2026-01-01,0\n2026-02-01,1\n' }, 'input-value', 'o.csv:2 value', /above 0, from 1e-12 on: growth is of logarithms/],
  ['a market below 0', outcomeKeys, { 'o.csv': 'date,value,market\n2026-01-01,1,2\n2026-02-01,1,-2\n' }, 'input-value', 'o.csv:3 market', /`-2`/],
  ['an outcome with thousands told off', outcomeKeys, { 'o.csv': 'date;value\n2026-01-01;12,345\n2026-02-01;1\n' }, 'input-value', 'o.csv:2 value', /no comma/],
  ['an outcome twice a day', outcomeKeys, { 'o.csv': 'date,value\n2026-02-01,1\n2026-01-01,1\n2026-02-01,2\n' }, 'outcome-twice', 'o.csv:4 date', /second value of 2026-02-01.*o\.csv:2/s],
  ['an outcome of one day', outcomeKeys, { 'o.csv': 'date,value\n2026-02-01,1\n' }, 'outcome-short', 'o.csv', /number of values, 1/],
]

describe('inputs that are wrong', () => {
  test.each(wrongs)('%s is the only fault, at its place', async (_, account, files, code, place, wording) => {
    const faults = await faultsOf(account, files)
    expect(faults.map((fault) => [fault.code, fault.place])).toEqual([[code, place]])
    expect(`${faults[0]!.message} ${faults[0]!.mend}`).toMatch(wording)
    expect(faults[0]!.message).toMatch(/^Unexpected .+ at .+, expected .+\.$/s)
  })

  test('have all their faults told, of every file', async () => {
    const faults = await faultsOf(`survey: { files: "s*.csv" }\n${eventKeys}${outcomeKeys}benchmark: { files: b.csv }\ncoding_audit: { files: a.csv }\nimportance: { files: i.csv }\n`, {
      's1.csv': surveyHeader + firstRow.replace('0.43', '43').replace('400', '-4') + second.replace('2026-02-02', '2026-13-01'), 's2.csv': 'wave\n',
      'e.csv': 'date,label\nsoon,x\n', 'o.csv': 'date,value\n2026-01-01,none\n',
      'b.csv': 'margin,level,share\nsegment,islander,19\n', 'a.csv': 'venue,true_label,coded_label,count\n', 'i.csv': 'topic,weight\nstaff,-1\n',
    })
    expect(faults.map(({ code, place }) => `${code} ${place}`)).toEqual([
      'input-value s1.csv:2 base', 'input-value s1.csv:2 value', 'input-value s1.csv:3 field_start', 'input-columns s2.csv:1', 'input-value e.csv:2 date', 'input-value o.csv:2 value',
      'input-value b.csv:2 share', 'input-empty a.csv', 'input-value i.csv:2 weight',
    ])
  })

  test('have no more faults told than anyone reads', async () => {
    expect(await faultsOf(keys, survey(...Array.from({ length: 300 }, () => second.replace('0.45', '45'))))).toHaveLength(100)
  })

  test('a figure twice in two files is found; a run of rows with the same other fieldwork is told once', async () => {
    const split = { 's1.csv': surveyHeader + firstRow, 's2.csv': surveyHeader + firstRow }
    expect((await faultsOf('survey: { files: "s*.csv" }\n', split)).map(({ code, place }) => `${code} ${place}`)).toEqual(['survey-twice s2.csv:2'])
    const moved = firstRow.replace('2026-01-16', '2026-01-17')
    const run = survey(firstRow, ...['a', 'b', 'c'].map((segment) => moved.replace(',,', `,${segment},`)))
    expect((await faultsOf(keys, run)).map(({ place }) => place)).toEqual(['s.csv:3'])
  })

  test('fieldwork to come may overlap the last where the waves of the survey do', async () => {
    const next = (from: string, to: string): string => `survey: { files: s.csv, next_fieldwork: { from: ${from}, to: ${to} } }\n`
    const rolling = survey(firstRow, 'w2,2026-01-12,2026-01-23,favourability,,400,,0.44,share,\n')
    await expect(readInputs(next('2026-01-19', '2026-01-30'), rolling)).resolves.toBeDefined()
    expect((await faultsOf(next('2026-01-12', '2026-01-30'), rolling))[0]!.code).toBe('survey-next-fieldwork')
    expect((await faultsOf(next('2026-02-12', '2026-02-24'), inRow(second)))[0]!.code).toBe('survey-next-fieldwork')
  })
})

describe('values at their bounds', () => {
  test('are read', async () => {
    const files = survey('w1,1900-01-01,1900-01-02,trust,,1000000000000,1,1,share,\n', 'w2,2199-12-30,2199-12-31,trust,,1,1,0,share,\n')
    const { survey: read, outcome } = await readInputs(`${keys}${outcomeKeys}`, { ...files, 'o.csv': 'date,value,market\n2026-01-01,1e-12,1e12\n2026-02-01,1e12,1e-12\n' })
    expect(read!.waves.map(({ start, readings }) => [start, readings[0]!.base, readings[0]!.effectiveBase])).toEqual([['1900-01-01', 1e12, 1], ['2199-12-30', 1, 1]])
    expect(outcome!.map(({ value, market }) => [value, market])).toEqual([[1e-12, 1e12], [1e12, 1e-12]])
    expect((await readInputs(eventKeys, { 'e.csv': `date,label\n2026-01-01,${'😀'.repeat(80)}\n` })).events).toHaveLength(1)
  })
})

test('ten thousand waves take no longer than reading their rows', async () => {
  const day = (wave: number) => new Date(Date.UTC(1990, 0, 1 + wave)).toISOString().slice(0, 10)
  const rows = Array.from({ length: 10_000 }, (_, wave) => `wave ${wave},${day(wave)},${day(wave + 3)},trust,,400,,0.5,share,\n`)
  const began = performance.now()
  const { survey: read } = await readInputs(keys, survey(...rows))
  expect(read!.waves).toHaveLength(10_000)
  // it took more than 20 s when every wave looked through all rows
  expect(performance.now() - began).toBeLessThan(4000)
})
