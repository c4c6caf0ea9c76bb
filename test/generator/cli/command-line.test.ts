import { appendFile, chmod, cp, mkdir, mkdtemp, readFile, readdir, rm, utimes, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { runCommand as run } from '../../support/run-command.ts'

const account = join(import.meta.dirname, '../intake/fixtures/open-cells')
let scratch: string
beforeAll(async () => { scratch = await mkdtemp(join(tmpdir(), 'command-')) })
afterAll(async () => { for (const made of [scratch, join(account, 'cache')]) await rm(made, { recursive: true, force: true }) })

describe('check', () => {
  test('prints the accounting, exit code 0', async () => {
    const { code, out } = await run('check', account)
    expect(code).toBe(0)
    expect(out).toMatch(/received\s+424\n/)
    expect(out).toMatch(/modelled\s+424\n/)
  })

  test('--json: one object on stdout, as the contract has it', async () => {
    const { code, out } = await run('check', account, '--json')
    expect(code).toBe(0)
    expect(JSON.parse(out)).toMatchObject({ ok: true, faults: [], accounting: { received: 424, rejected: 0, duplicates: 0, out_of_scope: 0, modelled: 424 } })
  })

  test('says what it read of the account to make the review with, and what is the house\'s', async () => {
    const own = join(import.meta.dirname, '../../../sample-data/pellwick-cycles')
    const { out } = await run('check', own)
    expect(out).toMatch(/\ntemplate: template\.md, texte\/herkunft\.md\nsections: .*sections\/first-page\.md.*\ncharts: charts\/erwaehnungen\.json\ntheme: .*theme\.yaml.*\nnotes: notes\/2026-10\.md\nof the house: words\n/)
    expect((JSON.parse((await run('check', own, '--json')).out) as { readonly read: unknown }).read).toContainEqual({ part: 'charts', files: ['charts/erwaehnungen.json'] })
    expect((await run('check', account)).out).toContain('of the house: template, sections, charts, words, theme\n')
  })

  test('tells what the survey, the events and the outcome hold', async () => {
    const demo = join(import.meta.dirname, '../../../sample-data/skerrow-ferries')
    const { code, out } = await run('check', demo)
    expect(code).toBe(0)
    expect(out).toContain('survey: 30 waves, 4 metrics, 2024-05-16 to 2026-10-29\nevents: 9, 2024-06-10 to 2026-10-13\noutcome: 30 values, 2024-05-01 to 2026-10-01\n'
      + 'benchmark: 1 margin, 5 levels\ncoding audit: 1440 codings in 4 venues\nimportance: 6 topics, 387 respondents, 13 rows left out for want of an answer\n')
    expect(JSON.parse((await run('check', demo, '--json')).out)).toMatchObject({
      ok: true, survey: { waves: 30, metrics: 4 }, benchmark: { margins: 1, levels: 5 }, coding_audit: { venues: 4, codings: 1440 },
      importance: { kind: 'respondents', topics: 6, respondents: 387, incomplete: 13 },
    })
    expect(JSON.parse((await run('check', account, '--json')).out)).toMatchObject({ ok: true, survey: null, benchmark: null, coding_audit: null, importance: null })
  })

  test('--audit-sample: ids and nothing else on stdout, the same for a seed', async () => {
    const demo = join(import.meta.dirname, '../../../sample-data/skerrow-ferries')
    const { code, out, err } = await run('check', demo, '--audit-sample', '300', '--seed', '5')
    const lines = out.trimEnd().split('\n')
    expect([code, lines.length, lines[0]]).toEqual([0, 301, 'venue,id'])
    expect(err).toMatch(/modelled +\d+\n/)
    const told = JSON.parse((await run('check', demo, '--audit-sample', '300', '--seed', '5', '--json', '--quiet')).out) as { audit_sample: readonly object[] }
    expect(told.audit_sample).toEqual(lines.slice(1).map((line) => { const [venue, id] = line.split(','); return { venue, id } }))
    expect(await run('check', demo, '--audit-sample', '50', '--quiet')).toMatchObject({ code: 1, out: '', err: expect.stringContaining('audit-sample-small') as string })
    expect((await run('check', account, '--audit-sample', '300')).err).toContain('audit-sample-ids')
  })

  test('tells which events are left out, which lie outside the mentions, and that there are none yet', async () => {
    const folder = join(scratch, 'eventful')
    await cp(account, folder, { recursive: true })
    await appendFile(join(folder, 'account.yaml'), 'events: { files: events.csv }\n')
    const events = async (...dates: readonly string[]) => {
      await writeFile(join(folder, 'events.csv'), `date,label\n${dates.map((date) => `${date},x\n`).join('')}`)
      return { plain: (await run('check', folder)).out, json: JSON.parse((await run('check', folder, '--json')).out) as { events: object } }
    }
    const some = await events('2025-09-01', '1900-01-01', '2025-05-01', '2199-12-31')
    expect(some.plain).toContain('events: 4, 1900-01-01 to 2199-12-31\n  after 2025-08, so left out of its review: 2\n  before the first mentions or after the last, and kept: 1\n')
    expect(some.json.events).toEqual({ events: 4, after_period: 2, outside_mentions: 1 })
    expect((await events('2025-05-01')).plain).toContain('events: 1, 2025-05-01 to 2025-05-01\nmentions from')
    const none = await events()
    expect(none.plain).toContain('events: none\n')
    expect(none.json.events).toEqual({ events: 0, after_period: 0, outside_mentions: 0 })
  })

  test('a folder without an account file: exit code 1, the fault as data and in words', async () => {
    const { code, out, err } = await run('check', scratch, '--json')
    expect(code).toBe(1)
    expect(JSON.parse(out)).toMatchObject({ ok: false, faults: [{ code: 'account-missing', place: expect.stringContaining('account.yaml') as string }] })
    expect(err).toContain('account.yaml')
  })
})

describe('build', () => {
  test('--no-pdf --quiet: says nothing, writes everything but the PDF', async () => {
    const out = join(scratch, 'draft')
    expect(await run('build', account, '--out', out, '--no-pdf', '--quiet')).toEqual({ code: 0, out: '', err: '' })
    expect((await readdir(out)).sort()).toEqual(expect.arrayContaining(['findings.json', 'review.html', 'tables']))
    expect(await readdir(out)).not.toContain('review.pdf')
  })

  test('--period: an earlier one; --json says which', async () => {
    const { code, out } = await run('build', account, '--out', join(scratch, 'july'), '--no-pdf', '--json', '--period', '2025-07')
    expect(code).toBe(0)
    expect(JSON.parse(out)).toMatchObject({ ok: true, faults: [], drafts: [{ account: 'skerrow-ferries', period: '2025-07' }] })
    const findings = JSON.parse(await readFile(join(scratch, 'july/findings.json'), 'utf8')) as { opinion: { series: { step: string }[] } }
    // a review reads nothing dated after its period
    expect(findings.opinion.series.at(-1)!.step < '2025-08-01').toBe(true)
  })

  test('one faulty account does not stop the others', async () => {
    const { code, out } = await run('build', scratch, account, '--no-pdf', '--json', '--quiet', '--period', '2025-06')
    expect(code).toBe(1)
    expect(JSON.parse(out)).toMatchObject({ ok: false, drafts: [{ period: '2025-06' }], faults: [{ code: 'account-missing' }] })
    await rm(join(account, 'drafts'), { recursive: true })
  })
})

describe('usage', () => {
  test.each([[['bild']], [['build']], [['check', account, '--no-such']], [['build', account, '--seed', 'x']], [['build', account, account, '--out', 'x']], [['build', account, account, '--watch']], [['build', account, '--watch', '--json']], [['seal', account]], [['seal', account, '--period', '2025-08', '--revise', ' ']], [['verify']]])('%j: exit code 2', async (args) => {
    expect((await run(...args)).code).toBe(2)
  })

  test('--help and --version: exit code 0', async () => {
    expect((await run('--help')).code).toBe(0)
    expect((await run('build', '--help')).out).toContain('--no-pdf')
    expect((await run('--version')).out).toMatch(/^\d+\.\d+\.\d+\n$/)
  })
})

test('a machine without the browser that was asked for: exit code 3, and what to do', async () => {
  const { code, err } = await run('build', account, '--out', join(scratch, 'none'), '--browser', join(scratch, 'no-browser'))
  expect(code).toBe(3)
  expect(err).toContain('no-browser')
  expect(await readdir(scratch)).not.toContain('none')
})

describe('a folder that takes no draft', () => {
  test('no name that it could have: exit code 3, the folder and --out named', async () => {
    const folder = join(scratch, 'x'.repeat(300))
    const { code, out, err } = await run('build', account, '--out', folder, '--no-pdf', '--json')
    expect(code).toBe(3)
    expect(JSON.parse(out)).toMatchObject({ ok: false, drafts: [], faults: [{ code: 'draft-unwritable', place: folder, mend: expect.stringContaining('--out') as string }] })
    expect(err).toContain('[draft-unwritable]')
  })

  test('no right to write: the same, in the account’s own drafts', async () => {
    const folder = join(scratch, 'read-only')
    await cp(account, folder, { recursive: true })
    for (const each of [scratch, folder]) await chmod(each, 0o555)
    // root may write everywhere: then as nobody
    const root = process.geteuid?.() === 0
    if (root) process.seteuid!(65534)
    try {
      const { code, out } = await run('build', folder, '--no-pdf', '--json')
      expect([code, JSON.parse(out)]).toMatchObject([3, { faults: [{ code: 'draft-unwritable', place: join(folder, 'drafts'), message: expect.stringContaining('EACCES') as string }] }])
    } finally {
      if (root) process.seteuid!(0)
      for (const each of [scratch, folder]) await chmod(each, 0o755)
    }
  })
})

test('unfinished drafts of killed builds go after a day; others stay', async () => {
  const folder = join(scratch, 'sweep')
  const day = 86_400
  const ages = { '.unfinished-aaaaaa': 2 * day, '.unfinished-bbbbbb': day / 2, '.unfinished-cccccc-before': 2 * day, 'mine': 2 * day }
  for (const [name, age] of Object.entries(ages)) {
    await mkdir(join(folder, name), { recursive: true })
    await writeFile(join(folder, name, 'findings.json'), '{}')
    await utimes(join(folder, name), Date.now() / 1000 - age, Date.now() / 1000 - age)
  }
  expect((await run('build', account, '--out', join(folder, 'draft'), '--no-pdf', '--quiet')).code).toBe(0)
  expect((await readdir(folder)).sort()).toEqual(['.unfinished-bbbbbb', '.unfinished-cccccc-before', 'draft', 'mine'])
})
