import { createHash } from 'node:crypto'
import { readdir, readFile, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import { describe, expect, test } from 'vitest'
import { runCommand as run } from '../../support/run-command.ts'
import type { Fault } from '../../../generator/faults/fault.ts'
import { withAccount } from '../intake/temporary-account.ts'

/** Account and inputs that are right, with the draft of an earlier build beside them. */
const source = `mentions:
  - files: posts.csv
    columns: { posted_at: published, venue: source, score: tone, brand: about }
    score: { labels: { negative: -1, positive: 1 } }
`
const account = `account: demo\nbrand: Skerrow Ferries\n${source}`
const header = 'published,source,tone,about\n'
const row = '2025-03-03,forum,positive,Skerrow Ferries\n'
const draft = { 'drafts/2025-03/findings.json': '{}\n', 'drafts/2025-03/review.html': '<p>earlier</p>', 'drafts/2025-03/review.pdf': Uint8Array.of(37, 80), 'drafts/2025-03/tables/opinion.csv': 'step\n' }
type Files = Readonly<Record<string, string | Uint8Array>>
const sound: Files = { ...draft, 'account.yaml': account, 'posts.csv': header + row + row.replace('03-03', '04-03') }

interface Wrong {
  readonly what: string
  readonly files: Files
  readonly code: string
  readonly place: string
  /** Of the message and the mend: what was found, what was expected, what is nearest. */
  readonly says: RegExp
  /** Only a build reads so far. */
  readonly onlyBuild?: true
}

const inAccount = (what: string, yaml: string, code: string, place: string, says: RegExp): Wrong => ({ what, files: { 'account.yaml': yaml }, code, place, says })
const inPosts = (what: string, text: string | Uint8Array, code: string, place: string, says: RegExp): Wrong => ({ what, files: { 'posts.csv': text }, code, place, says })
const inFile = (what: string, file: string, content: string | Uint8Array, code: string, place: string, says: RegExp): Wrong =>
  ({ what, files: { 'account.yaml': account.replace('posts.csv', `"${file}"`), [file]: content }, code, place, says })
const cells = (what: string, rows: string, code: string, place: string, says: RegExp): Wrong => ({
  what, files: { 'account.yaml': 'account: demo\nbrand: B\nmentions:\n  - cells: c.csv\n', 'c.csv': `step,venue,mentions,authors,mean\n2025-03-03,a,2,2,0\n${rows}` }, code, place, says,
})

const wrongAccounts: readonly Wrong[] = [
  inAccount('an unknown key', `${account}brnad: x\n`, 'account-key-unknown', 'account.yaml:7:1 brnad', /key `brnad`.*Did you mean `brand`/s),
  inAccount('an unknown key deep inside', account.replace('columns:', 'colums:'), 'account-key-unknown', 'account.yaml:5:5 mentions.0.colums', /Did you mean `columns`/),
  inAccount('an unknown column', account.replace('venue:', 'vanue:'), 'account-key-unknown', 'account.yaml:5:38 mentions.0.columns.vanue', /Did you mean `venue`/),
  inAccount('a time format without a sign of one', account.replace('    score:', '    time_format: dd.MM.yyyy\n    score:'), 'account-value', 'account.yaml:6:5 mentions.0.time_format', /expected a strptime form such as '%d\.%m\.%Y/),
  inAccount('a wrong type', `${account}interval: wide\n`, 'account-value', 'account.yaml:7:1 interval', /`"wide"`.*expected a number/s),
  inAccount('a wrong choice', `${account}grid: fortnight\n`, 'account-value', 'account.yaml:7:1 grid', /expected day, week or month/),
  inAccount('an unknown time zone', `${account}time_zone: Europe/Skerrow\n`, 'account-value', 'account.yaml:7:1 time_zone', /expected a time zone/),
  inAccount('a key left out', account.replace('brand: Skerrow Ferries\n', ''), 'account-key-absent', 'account.yaml brand', /Add `brand:`/),
  inAccount('an impossible combination', `${account}grid: month\nreporting: week\n`, 'account-combination', 'account.yaml:8:1 reporting', /no shorter than a step/),
  inAccount('mentions and cells in one source', account.replace('- files', '- cells: posts.csv\n    files'), 'account-combination', 'account.yaml:5:5 mentions.0.files', /beside `cells`/),
  inAccount('a factor without a column', `${account}factors: [venue, language]\n`, 'account-combination', 'account.yaml:7:18 factors.1', /a column mapped to it/),
  inAccount('a key twice', `${account}brand: other\n`, 'account-key-twice', 'account.yaml:7:1', /every key once/),
  inAccount('a key that the program keeps', `${account}venues:\n  __proto__: {}\n`, 'account-key-reserved', 'account.yaml:8:3', /Rename the key/),
  inAccount('an alias', `${account}prepared_by: &a Ana\nreviewed_by: *a\n`, 'account-alias', 'account.yaml:8:14', /alias \*a/),
  inAccount('broken YAML', `${account}venues: { a: [1\n`, 'account-unreadable', 'account.yaml:8:1', /YAML in UTF-8/),
  inAccount('a pattern that matches nothing', account.replace('posts.csv', 'post/*.csv'), 'account-file-absent', 'account.yaml:4:5 mentions.0.files', /`post\/\*\.csv`/),
  inAccount('a path that leads out', account.replace('posts.csv', '../*.csv'), 'account-path-outside', 'account.yaml:4:5 mentions.0.files', /leaves the account folder/),
  inAccount('a template that is not there', `${account}template: mine.md\n`, 'account-file-absent', 'account.yaml:7:1 template', /`mine\.md`/),
  inAccount('a target for a level without mentions', `${account}target_mix: { venue: { panel: 1 } }\n`, 'target-mix-level', 'account.yaml:7:24 target_mix.venue.panel', /a level that mentions are in: forum/),
  { ...inAccount('a base without mentions', `${account}base: { from: 2020-01-01, to: 2020-12-31 }\n`, 'base-empty', 'account.yaml:7:1 base', /Mend `base`/), onlyBuild: true },
]

const wrongInputs: readonly Wrong[] = [
  inPosts('a CSV without a mapped column', `publshed,source,tone,about\n${row}`, 'columns-absent', 'posts.csv:1', /columns `published`.*nearest: `publshed`/s),
  inPosts('a CSV whose delimiter is not known', (header + row).replaceAll(',', '~'), 'columns-absent', 'posts.csv:1', /state `delimiter`/),
  inPosts('a column twice', `published,source,tone,about,tone\n`, 'header-twice', 'posts.csv:1', /second column `tone`/),
  inPosts('an empty file', '', 'columns-absent', 'posts.csv:1', /expected the columns/),
  inFile('a CSV.gz that is none', 'a.csv.gz', header + row, 'file-unreadable', 'a.csv.gz', /Export the file again/),
  inFile('a Parquet that is none', 'a.parquet', header + row, 'file-unreadable', 'a.parquet', /no Parquet/),
  inFile('NDJSON without a mapped key', 'a.ndjson', '{"publshed":"2025-03-03","source":"forum","tone":"positive","about":"Skerrow Ferries"}\n', 'columns-absent', 'a.ndjson:1', /nearest: `publshed`/),
  inFile('NDJSON without a line of it', 'a.ndjson', header + row, 'no-mentions', 'mentions', /row-malformed 2/),
  inPosts('no readable time', `${header}${row.replace('2025-03-03', 'yesterday')}${row.replace('2025-03-03', '0')}`, 'no-mentions', 'mentions', /rows 2, time-unreadable 2/),
  inPosts('no readable score', header + row.replace('positive', 'fine'), 'no-mentions', 'mentions', /score-unreadable 1/),
  { ...inPosts('no score inside the range', header + row.replace('positive', '9'), 'no-mentions', 'mentions', /score-outside-range 1/),
    files: { 'account.yaml': account.replace('labels: { negative: -1, positive: 1 }', 'range: [1, 5]'), 'posts.csv': header + row.replace('positive', '9') } },
  inPosts('no venue', header + row.replace('forum', '\0'), 'no-mentions', 'mentions', /venue-missing 1/),
  inPosts('no mention of the brand', header + row.replace('Skerrow', 'Tarrin'), 'no-mentions', 'mentions', /other-brand 1/),
  inPosts('no mention before the period ends', header + row.replace('2025-03', '2025-04'), 'no-mentions', 'mentions', /after-period 1/),
  inPosts('free text in the place of a venue', header + Array.from({ length: 61 }, (_, index) => row.replace('forum', `words ${index}`)).join(''), 'too-many-levels', 'mentions venue', /more than 60 values of `venue`/),
  cells('a cell with half a mention', '2025-03-10,a,1.5,1,0\n', 'cell-value', 'c.csv:3 mentions', /`1\.5`.*a whole number of at least 1/s),
  cells('a cell on a step that is none', '2025-03-11,a,2,1,0\n', 'cell-value', 'c.csv:3 step', /Monday, such as 2025-03-10/),
  cells('a cell twice', '2025-03-03,a,2,2,0\n', 'cell-twice', 'c.csv:3', /c\.csv:2/),
  cells('a row of a cell table that cannot be cut', '2025-03-03,a\n', 'cell-row', 'c.csv:3', /as many fields as the header/),
]

const surveyKeys = `${account}survey: { files: s.csv }\n`
const surveyRows = 'wave,field_start,field_end,metric,base,value,kind,sd\nw1,2025-01-06,2025-01-17,favourability,400,0.43,share,\n'
const inSurvey = (what: string, rows: string, code: string, place: string, says: RegExp, yaml = surveyKeys): Wrong =>
  ({ what, files: { 'account.yaml': yaml, 's.csv': rows }, code, place, says })

const wrongSurveys: readonly Wrong[] = [
  inSurvey('a survey without a column', surveyRows.replace('metric', 'metrik'), 'input-columns', 's.csv:1', /columns `metric`.*nearest: `metrik`/s),
  inSurvey('a share in percent', `${surveyRows}w2,2025-02-03,2025-02-14,favourability,400,43,share,\n`, 'input-value', 's.csv:3 value', /`43`.*written 0\.43, not 43/s),
  inSurvey('a fieldwork that ends before it begins', surveyRows.replace('2025-01-17', '2025-01-05'), 'input-value', 's.csv:2 field_end', /on or after field_start/),
  inSurvey('a figure twice', surveyRows + surveyRows.split('\n')[1]!, 'survey-twice', 's.csv:3', /s\.csv:2/),
  inSurvey('a headline that is no metric', surveyRows, 'survey-headline-unknown', 'account.yaml:7:25 survey.headline', /Did you mean `favourability`/, surveyKeys.replace('s.csv }', 's.csv, headline: favour }')),
  inSurvey('a survey of a kind that is not read', surveyRows, 'account-file-kind', 'account.yaml:7:11 survey.files', /\.csv/, surveyKeys.replace(' s.csv', ' account.yaml')),
  { what: 'an outcome twice a day', files: { 'account.yaml': `${account}outcome: { files: o.csv }\n`, 'o.csv': 'date,value\n2025-01-01,5\n2025-01-01,6\n' }, code: 'outcome-twice', place: 'o.csv:3 date', says: /o\.csv:2/ },
  { what: 'an event on no day', files: { 'account.yaml': `${account}events: { files: e.csv }\n`, 'e.csv': 'date,label\n2025-02-30,storm\n' }, code: 'input-value', place: 'e.csv:2 date', says: /a date that exists/ },
]

/** One hash of every name and byte below a folder. */
async function hashOfFolder(folder: string): Promise<string> {
  const entries = await readdir(folder, { recursive: true, withFileTypes: true })
  const paths = entries.map((entry) => ({ path: join(entry.parentPath, entry.name), isFile: entry.isFile() })).sort((a, b) => (a.path < b.path ? -1 : 1))
  const hash = createHash('sha256')
  for (const { path, isFile } of paths) hash.update(`${path}\0`).update(isFile ? await readFile(path) : 'folder').update('\0')
  return hash.digest('hex')
}

const commands = {
  check: (folder: string) => run('check', folder, '--json'),
  build: (folder: string) => run('build', folder, '--period', '2025-03', '--no-pdf', '--json'),
}

/** The one fault that is looked for: told as data, told in words, and nothing in the folder is another than before. */
async function expectFault({ files, code, place, says }: Wrong, command: keyof typeof commands): Promise<void> {
  await withAccount({ ...sound, ...files }, async (folder) => {
    const before = await hashOfFolder(folder)
    const { code: exitCode, out, err } = await commands[command](folder)
    const told = JSON.parse(out) as { readonly ok: boolean; readonly faults: readonly Fault[] }
    expect(told.faults.map((fault) => [fault.code, fault.place])).toContainEqual([code, place])
    expect([exitCode, told.ok]).toEqual([1, false])
    const fault = told.faults.find((candidate) => candidate.code === code && candidate.place === place)!
    expect(fault.message).toMatch(/^Unexpected .+ at .+, expected .+\.$/s)
    expect(`${fault.message} ${fault.mend}`).toMatch(says)
    expect(err).toContain(`${fault.mend} [${code}]`)
    expect(await hashOfFolder(folder)).toBe(before)
  })
}

const cases = (wrongs: readonly Wrong[]) => wrongs.map((wrong) => [wrong.what, wrong] as const)

describe('bad input: exit code 1, the fault with its place, earlier output untouched', () => {
  test.each(cases(wrongAccounts))('account file: %s', async (_, wrong) => {
    await expectFault(wrong, 'build')
    if (wrong.onlyBuild !== true) await expectFault(wrong, 'check')
  })

  test.each(cases(wrongInputs))('intake: %s', async (_, wrong) => { await expectFault(wrong, 'build') })

  test.each(cases(wrongSurveys))('survey, events, outcome: %s', async (_, wrong) => { await expectFault(wrong, 'check') })

  test('faults of the survey and of the mentions are told together', async () => {
    await withAccount({ ...sound, 'account.yaml': surveyKeys, 's.csv': surveyRows.replace('0.43', '43'), 'posts.csv': `publshed,source,tone,about\n${row}` }, async (folder) => {
      const { code, out } = await commands.check(folder)
      expect([code, (JSON.parse(out) as { faults: Fault[] }).faults.map((fault) => fault.code)]).toEqual([1, ['input-value', 'columns-absent']])
    })
  })

  test('a folder without account.yaml', async () => {
    await withAccount(draft, async (folder) => {
      const before = await hashOfFolder(folder)
      const { code, out } = await commands.build(folder)
      expect([code, (JSON.parse(out) as { faults: Fault[] }).faults.map((fault) => fault.code)]).toEqual([1, ['account-missing']])
      expect(await hashOfFolder(folder)).toBe(before)
    })
  })

  test('a period that is none, and mentions that cover no whole one', async () => {
    await withAccount({ ...sound, 'posts.csv': header + row }, async (folder) => {
      const before = await hashOfFolder(folder)
      const named = await run('build', folder, '--period', '2025-Q1', '--no-pdf', '--json')
      const covered = await run('build', folder, '--no-pdf', '--json')
      expect([named, covered].map(({ code, out }) => [code, (JSON.parse(out) as { faults: Fault[] }).faults.map((fault) => `${fault.code} ${fault.place}`)]))
        .toEqual([[1, ['period-unknown --period']], [1, ['no-whole-period mentions']]])
      expect(await hashOfFolder(folder)).toBe(before)
    })
  })
})

describe('these checks can fail', () => {
  test('input that is right has no fault, and no fault is found in it', async () => {
    await withAccount(sound, async (folder) => {
      const { code, out } = await commands.check(folder)
      expect([code, JSON.parse(out)]).toMatchObject([0, { ok: true, faults: [], accounting: { received: 2 } }])
    })
    await withAccount({ ...sound, 'account.yaml': surveyKeys, 's.csv': surveyRows }, async (folder) => {
      expect(JSON.parse((await commands.check(folder)).out)).toMatchObject({ ok: true, faults: [], survey: { waves: 1, metrics: 1 } })
    })
    await expect(expectFault({ what: '', files: {}, code: 'no-mentions', place: 'mentions', says: /./ }, 'check')).rejects.toThrow()
  })

  test('a byte, a file or a folder more is noticed', async () => {
    await withAccount(sound, async (folder) => {
      const hashes = [await hashOfFolder(folder)]
      await writeFile(join(folder, 'drafts/2025-03/review.html'), '<p>Earlier</p>')
      hashes.push(await hashOfFolder(folder))
      await writeFile(join(folder, 'drafts/.left'), '')
      hashes.push(await hashOfFolder(folder))
      expect(new Set(hashes).size).toBe(3)
    })
  })
})
