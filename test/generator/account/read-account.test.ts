import { mkdtemp, symlink, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { describe, expect, test } from 'vitest'
import { readAccount } from '../../../generator/account/read-account.ts'
import type { Account } from '../../../generator/account/account.ts'
import { InputFault, type Fault } from '../../../generator/faults/fault.ts'
import { withAccount } from '../intake/temporary-account.ts'

const source = `mentions:
  - files: posts/*.csv
    columns: { posted_at: published, venue: source, score: tone }
    score: { labels: { negative: -1, positive: 1 } }
`
const sound = `account: demo\nbrand: Skerrow Ferries\n${source}`
const files = { 'posts/a.csv': 'published,source,tone\n', 'survey/w.csv': 'wave\n', 'notes/2026-10.md': 'Words.\n', 'template.md': '# Review\n', 'theme.yaml': 'ink: black\n', 'posts/notes.txt': '' }

async function read(yaml: string, more: Readonly<Record<string, string>> = {}): Promise<Account> {
  return withAccount({ ...files, ...more, 'account.yaml': yaml }, readAccount)
}

async function faultsOf(yaml: string, more: Readonly<Record<string, string>> = {}): Promise<readonly Fault[]> {
  const error: unknown = await read(yaml, more).then(() => undefined, (reason: unknown) => reason)
  if (!(error instanceof InputFault)) throw new Error(`no fault in:\n${yaml}`)
  return error.faults
}

describe('an account file that is right', () => {
  test('is one value with every default filled in', async () => {
    const account = await read(sound)
    expect(account).toMatchObject({
      account: 'demo', brand: 'Skerrow Ferries', competitors: [], locale: 'en-GB', timeZone: 'UTC', grid: 'week', reporting: 'month', base: null, interval: 0.9,
      factors: ['venue', 'topic', 'poster'], posters: { occasional: 1, regular: 5 }, smallestGroup: 10, customers: null, template: null,
      mentions: [{ kind: 'mentions', files: ['posts/a.csv'], columns: { posted_at: 'published', venue: 'source', score: 'tone' }, timeFormat: null,
        score: { kind: 'labels', labels: [{ label: 'negative', score: -1 }, { label: 'positive', score: 1 }] } }],
    })
    expect(account.places['mentions.0.score.labels']).toBe('account.yaml:6:14 mentions.0.score.labels')
  })

  test('may use every key; all of them are read', async () => {
    const account = await read(`${sound}competitors: [Tarrin Line]
locale: pt-PT
time_zone: Europe/Lisbon
grid: day
reporting: quarter
base: { from: 2024-01-01, to: 2024-12-31 }
interval: 0.95
factors: [venue, topic, poster]
venues:
  boards: { label: Discussion boards, values: [forum, 7], cost_per_author: 3 }
  panel: { drift: none }
topics: { punctuality: }
posters: { occasional: 2, regular: 9 }
target_mix: { venue: { boards: 0.25, panel: 0.75 } }
survey: { files: survey/*.csv, headline: favourability, lags: [-8, 16], labels: { favourability: Warmth }, next_fieldwork: { from: 2026-11-16, to: 2026-11-27 } }
benchmark: { files: survey/w.csv }
customers: 310000
coding_audit: { files: survey/w.csv }
importance: { files: survey/w.csv }
events: { files: survey/w.csv }
outcome: { files: survey/w.csv }
template: template.md
theme: theme.yaml
notes: notes/
prepared_by: Ana
reviewed_by: Rui
smallest_group: 12
`)
    expect(account.venues).toEqual([
      { name: 'boards', label: 'Discussion boards', values: ['forum', '7'], anchor: false, costPerAuthor: 3 },
      { name: 'panel', label: 'panel', values: [], anchor: true, costPerAuthor: null },
    ])
    expect(account.topics[0]).toMatchObject({ name: 'punctuality', label: 'punctuality' })
    expect(account.survey).toEqual({
      pattern: 'survey/*.csv', files: ['survey/w.csv'], headline: 'favourability', lags: [-8, 16],
      labels: { favourability: 'Warmth' }, nextFieldwork: { from: '2026-11-16', to: '2026-11-27' },
    })
    expect(account.targetMix).toEqual([{ factor: 'venue', shares: [{ level: 'boards', share: 0.25 }, { level: 'panel', share: 0.75 }] }])
    const table = { pattern: 'survey/w.csv', files: ['survey/w.csv'] }
    expect(account).toMatchObject({ benchmark: table, codingAudit: table, importance: table, customers: 310_000 })
    expect(account.competitors).toEqual(['Tarrin Line'])
  })

  test.each([['day', [-56, 112]], ['week', [-8, 16]], ['month', [-2, 4]]])('looks at lags from two months behind to four ahead on a grid by the %s', async (grid, lags) => {
    expect((await read(`${sound}grid: ${grid}\nsurvey: { files: survey/w.csv }\n`)).survey).toMatchObject({ headline: null, lags, labels: {}, nextFieldwork: null })
  })

  test('finds files by pattern, in order', async () => {
    const deep = sound.replace('posts/*.csv', 'posts/**/?.csv')
    expect((await read(deep, { 'posts/2026/c.csv': '', 'posts/2025/b.csv': '', 'posts/.hidden.csv': '' })).mentions[0]!.files).toEqual(['posts/2025/b.csv', 'posts/2026/c.csv', 'posts/a.csv'])
  })
})

/** What is wrong, the code of its fault, its place, and what its message must speak of. */
const wrongs: readonly (readonly [string, string, string, string, RegExp])[] = [
  ['an unknown key', `${sound}brnad: x\n`, 'account-key-unknown', 'account.yaml:7:1 brnad', /Did you mean `brand`/],
  ['an unknown key of a source', sound.replace('columns:', 'colums:'), 'account-key-unknown', 'account.yaml:5:5 mentions.0.colums', /`columns`/],
  ['an unknown key of a venue', `${sound}venues:\n  boards: { lable: x }\n`, 'account-key-unknown', 'account.yaml:8:13 venues.boards.lable', /`label`/],
  ['an unknown column', sound.replace('venue:', 'vanue:'), 'account-key-unknown', 'account.yaml:5:38 mentions.0.columns.vanue', /`venue`/],
  ['a needed column left out', sound.replace('venue: source, ', ''), 'account-combination', 'account.yaml:5:5 mentions.0.columns', /without `venue`/],
  ['a wrong type', `${sound}interval: wide\n`, 'account-value', 'account.yaml:7:1 interval', /a number/],
  ['a missing key', source, 'account-key-absent', 'account.yaml account', /`account`/],
  ['nothing where text belongs', `${sound}prepared_by:\n`, 'account-value', 'account.yaml:7:1 prepared_by', /Unexpected nothing .* expected text/],
  ['a competitor that is the brand itself', `${sound}competitors: [Tarrin Line, ' skerrow FERRIES']\n`, 'account-combination', 'account.yaml:7:28 competitors.1', /the brand itself.*competitors other than the brand/],
  ['a competitor twice', `${sound}competitors: [Tarrin Line, tarrin line]\n`, 'account-combination', 'account.yaml:7:28 competitors.1', /listed already.*every competitor once/],
  ['too many competitors', `${sound}competitors: [${Array.from({ length: 13 }, (_, i) => `Line ${i}`).join(', ')}]\n`, 'account-value', 'account.yaml:7:1 competitors', /at most 12 competitors/],
  ['a competitor’s name that is a text', `${sound}competitors: [${'so '.repeat(40)}]\n`, 'account-value', 'account.yaml:7:15 competitors.0', /at most 80 characters/],
  ['a wrong choice', `${sound}grid: fortnight\n`, 'account-value', 'account.yaml:7:1 grid', /day, week or month/],
  ['an interval outside', `${sound}interval: 1.5\n`, 'account-value', 'account.yaml:7:1 interval', /from 0.5 to 0.99/],
  ['an unknown time zone', `${sound}time_zone: Europe/Skerrow\n`, 'account-value', 'account.yaml:7:1 time_zone', /time zone/],
  ['an unknown locale', `${sound}locale: xx-YY\n`, 'account-value', 'account.yaml:7:1 locale', /locale/],
  ['a base the wrong way round', `${sound}base: { from: 2024-12-31, to: 2024-01-01 }\n`, 'account-value', 'account.yaml:7:1 base', /on or after/],
  ['a date that does not exist', `${sound}base: { from: 2024-02-30, to: 2024-12-31 }\n`, 'account-value', 'account.yaml:7:9 base.from', /date that exists/],
  ['posters that do not rise', `${sound}posters: { occasional: 5, regular: 5 }\n`, 'account-value', 'account.yaml:7:1 posters', /`regular` above/],
  ['lags the wrong way round', `${sound}survey: { files: survey/w.csv, lags: [16, -8] }\n`, 'account-value', 'account.yaml:7:32 survey.lags', /smaller first/],
  ['more lags than may be looked at', `${sound}survey: { files: survey/w.csv, lags: [-100, 100] }\n`, 'account-value', 'account.yaml:7:32 survey.lags', /at most 200 lags/],
  ['an unknown key of the survey', `${sound}survey: { files: survey/w.csv, headlines: x }\n`, 'account-key-unknown', 'account.yaml:7:32 survey.headlines', /Did you mean `headline`/],
  ['a next fieldwork that ends before it begins', `${sound}survey: { files: survey/w.csv, next_fieldwork: { from: 2026-02-02, to: 2026-02-01 } }\n`, 'account-value', 'account.yaml:7:32 survey.next_fieldwork', /`to` on or after `from`/],
  ['an unknown key of the next fieldwork', `${sound}survey: { files: survey/w.csv, next_fieldwork: { from: 2026-02-02, till: 2026-02-09 } }\n`, 'account-key-unknown', 'account.yaml:7:68 survey.next_fieldwork.till', /one of from, to/],
  ['a label of nothing', `${sound}survey: { files: survey/w.csv, labels: { favourability: } }\n`, 'account-value', 'account.yaml:7:42 survey.labels.favourability', /expected text/],
  ['a survey that is no CSV', `${sound}survey: { files: theme.yaml }\n`, 'account-file-kind', 'account.yaml:7:11 survey.files', /\.csv, \.csv\.gz/],
  ['a benchmark that is no CSV', `${sound}benchmark: { files: theme.yaml }\n`, 'account-file-kind', 'account.yaml:7:14 benchmark.files', /\.csv, \.csv\.gz/],
  ['an unknown key of the audit', `${sound}coding_audit: { file: survey/w.csv }\n`, 'account-key-unknown', 'account.yaml:7:17 coding_audit.file', /Did you mean `files`/],
  ['customers by halves', `${sound}customers: 10.5\n`, 'account-value', 'account.yaml:7:1 customers', /a whole number/],
  ['no customers at all', `${sound}customers: 0\n`, 'account-value', 'account.yaml:7:1 customers', /at least 1/],
  ['customers in words', `${sound}customers: many\n`, 'account-value', 'account.yaml:7:1 customers', /a number/],
  ['a drift that is not none', `${sound}venues:\n  boards: { drift: slow }\n`, 'account-value', 'account.yaml:8:13 venues.boards.drift', /none/],
  ['a smallest group too small', `${sound}smallest_group: 3\n`, 'account-value', 'account.yaml:7:1 smallest_group', /at least 10/],
  ['cells and files in one source', sound.replace('- files: posts/*.csv', '- files: posts/*.csv\n    cells: posts/*.csv'), 'account-combination', 'account.yaml:4:5 mentions.0.files', /beside `cells`/],
  ['labels and range in one score', sound.replace('score: { labels', 'score: { range: [1, 5], labels'), 'account-combination', 'account.yaml:6:5 mentions.0.score', /both/],
  ['a source without score', sound.replace(/ {4}score:.*\n/, ''), 'account-combination', 'account.yaml:4:5 mentions.0', /without score/],
  ['a range without width', sound.replace('labels: { negative: -1, positive: 1 }', 'range: [3, 3]'), 'account-value', 'account.yaml:6:14 mentions.0.score.range', /two different numbers/],
  ['a label score outside', sound.replace('positive: 1', 'positive: 2'), 'account-value', 'account.yaml:6:38 mentions.0.score.labels.positive', /from -1 to 1/],
  ['a label twice but for case', sound.replace('positive: 1', 'Negative: 1'), 'account-combination', 'account.yaml:6:14 mentions.0.score.labels', /each label once/],
  ['a value mapped to two venues', `${sound}venues: { a: { values: [x] }, b: { values: [" X"] } }\n`, 'account-combination', 'account.yaml:7:31 venues.b', /which `a` has already/],
  ['a target mix that does not sum to 1', `${sound}target_mix: { venue: { a: 0.5, b: 0.4 } }\n`, 'account-combination', 'account.yaml:7:15 target_mix.venue', /sum to 1/],
  ['a negative target', `${sound}target_mix: { venue: { a: -0.5, b: 1.5 } }\n`, 'account-value', 'account.yaml:7:24 target_mix.venue.a', /from 0 to 1/],
  ['a target for no factor', `${sound}target_mix: { language: { a: 1 } }\n`, 'account-combination', 'account.yaml:7:15 target_mix.language', /factor of the account/],
  ['a target for no poster class', `${sound}target_mix: { poster: { frequent: 1 } }\n`, 'account-combination', 'account.yaml:7:25 target_mix.poster.frequent', /occasional/],
  ['a factor without column', `${sound}factors: [venue, language]\n`, 'account-combination', 'account.yaml:7:18 factors.1', /column mapped/],
  ['factors without venue', `${sound}factors: [topic, poster]\n`, 'account-combination', 'account.yaml:7:1 factors', /`venue` first/],
  ['weeks on a grid of months', `${sound}grid: month\nreporting: week\n`, 'account-combination', 'account.yaml:8:1 reporting', /no shorter/],
  ['a key twice', `${sound}brand: other\n`, 'account-key-twice', 'account.yaml:7:1', /every key once/],
  ['a pattern that matches nothing', sound.replace('posts/*.csv', 'post/*.csv'), 'account-file-absent', 'account.yaml:4:5 mentions.0.files', /post\/\*\.csv/],
  ['a kind of file that is not read', sound.replace('posts/*.csv', 'posts/*'), 'account-file-kind', 'account.yaml:4:5 mentions.0.files', /posts\/notes\.txt/],
  ['a template that is not there', `${sound}template: mine.md\n`, 'account-file-absent', 'account.yaml:7:1 template', /mine\.md/],
  ['notes that are no folder', `${sound}notes: theme.yaml\n`, 'account-file-absent', 'account.yaml:7:1 notes', /folder/],
  ['a path that climbs out', sound.replace('posts/*.csv', '../*.csv'), 'account-path-outside', 'account.yaml:4:5 mentions.0.files', /leaves the account folder/],
  ['a path from the root', sound.replace('posts/*.csv', '/etc/hosts.csv'), 'account-path-outside', 'account.yaml:4:5 mentions.0.files', /leaves the account folder/],
  ['an anchor', `${sound}prepared_by: &x Ana\n`, 'account-alias', 'account.yaml:7:17', /anchor/],
  ['an alias', `${sound}prepared_by: &x Ana\nreviewed_by: *x\n`, 'account-alias', 'account.yaml:8:14', /alias/],
  ['a tag', `${sound}prepared_by: !secret Ana\n`, 'account-alias', 'account.yaml:7:14', /tag/],
  ['broken YAML', `${sound}venues: { a: [1\n`, 'account-unreadable', 'account.yaml:8:1', /YAML/],
  ['a NUL in a column name', sound.replace('venue: source', 'venue: "sou\\0rce"'), 'account-value', 'account.yaml:5:38 mentions.0.columns.venue', /expected text/],
  ['no map at all', '- a\n', 'account-value', 'account.yaml', /map of keys/],
]

describe('an account file that is wrong', () => {
  test.each(wrongs)('%s is a fault with its place', async (_, yaml, code, place, wording) => {
    const faults = await faultsOf(yaml)
    const fault = faults.find((candidate) => candidate.code === code && candidate.place === place)
    expect(fault, JSON.stringify(faults, null, 1)).toBeDefined()
    expect(`${fault!.message} ${fault!.mend}`).toMatch(wording)
    expect(fault!.message).toMatch(/^Unexpected .* at account\.yaml.*, expected /)
  })

  test('has all its faults collected', async () => {
    const faults = await faultsOf(`${sound}interval: 2\ngrid: fortnight\nbrnad: x\ntheme: none.yaml\nfactors: [venue, language]\n`)
    expect(faults.map((fault) => fault.code).sort()).toEqual(['account-combination', 'account-file-absent', 'account-key-unknown', 'account-value', 'account-value'])
  })

  test('an alias bomb is refused before it goes off', async () => {
    const levels = Array.from({ length: 30 }, (_, index) => `k${index}: &a${index} [${index === 0 ? 'x' : `*a${index - 1}, *a${index - 1}`}]`).join('\n')
    expect((await faultsOf(levels)).every((fault) => fault.code === 'account-alias')).toBe(true)
  })

  test('a key that would reach into every object is refused', async () => {
    const [fault] = await faultsOf(`${sound}venues:\n  __proto__: { label: x }\n`)
    expect(fault).toMatchObject({ code: 'account-key-reserved', place: 'account.yaml:8:3', mend: 'Rename the key.' })
    expect(`${fault!.message}`).toMatch(/key `__proto__`.*any other name/)
    expect(fault!.message).not.toMatch(/anchor|alias/)
  })

  test('a link that leads out of the folder is outside', async () => {
    const away = await mkdtemp(path.join(tmpdir(), 'tareline-away-'))
    await writeFile(path.join(away, 'x.csv'), 'secret')
    const error: unknown = await withAccount({ 'account.yaml': sound, 'posts/b.csv': '' }, async (folder) => {
      await symlink(path.join(away, 'x.csv'), path.join(folder, 'posts/x.csv'))
      return readAccount(folder)
    }).catch((reason: unknown) => reason)
    expect((error as InputFault).faults.map((fault) => [fault.code, fault.message.includes('posts/x.csv')])).toEqual([['account-path-outside', true]])
  })

  test('bytes that are not UTF-8 and a missing file are faults', async () => {
    const codes = async (content: Readonly<Record<string, Uint8Array>>): Promise<string> =>
      withAccount(content, readAccount).then(() => 'none', (error: unknown) => (error as InputFault).faults[0]!.code)
    expect(await codes({ 'account.yaml': Uint8Array.of(0x61, 0xff, 0xfe) })).toBe('account-unreadable')
    expect(await codes({ 'other.yaml': Uint8Array.of(0x61) })).toBe('account-missing')
  })
})
