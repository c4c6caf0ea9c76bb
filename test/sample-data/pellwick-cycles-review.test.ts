import { cp, mkdtemp, readFile, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { basename, join } from 'node:path'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { parse } from 'yaml'
import { readAccount } from '../../generator/account/read-account.ts'
import { thisProgram } from '../../generator/program/program.ts'
import { buildReview } from '../../generator/review/build-review.ts'
import { silent } from '../../generator/review/stages.ts'
import type { Findings } from '../../model/findings/schema.ts'
import { englishFragments, trigrams } from '../support/english-fragments.ts'
import { templatesFolder } from '../support/house-words.ts'

const folder = join(import.meta.dirname, '../../sample-data/pellwick-cycles')
let scratch: string
let findings: Findings
let html: string
let offsets: string

/** The review of thin data, made in a copy: the account's own cache has no say. */
beforeAll(async () => {
  scratch = await mkdtemp(join(tmpdir(), 'pellwick-'))
  const account = join(scratch, 'account')
  await cp(folder, account, { recursive: true, filter: (path) => !['cache', 'drafts'].includes(basename(path)) })
  const draft = await buildReview(thisProgram(), await readAccount(account), { seed: 1, threads: 1, browser: null, progress: silent })
  findings = draft.findings
  html = await readFile(join(draft.folder, 'review.html'), 'utf8')
  offsets = await readFile(join(draft.folder, 'tables/offsets.csv'), 'utf8')
})
afterAll(async () => { await rm(scratch, { recursive: true, force: true }) })

const text = () => html.replace(/<(style|svg)[\s\S]*?<\/\1>/g, ' ').replace(/<[^>]+>/g, ' ').replace(/\s+/g, ' ')
const sections = () => [...html.matchAll(/<section id="([^"]+)" class="section/g)].map(([, name]) => name)

test('of the whole months the last is reviewed, and nothing is announced', () => {
  expect([findings.period.name, findings.opinion.movement]).toEqual(['2026-10', 'not-established'])
  expect(findings.diagnostics.passed).toBe(true)
})

test('too few is said of waves, mentions, segments and groups', () => {
  expect(findings.caveats.map(({ code }) => code)).toEqual(expect.arrayContaining(['survey-too-few', 'thin-data', 'survey-bases-small', 'venue-thin']))
  expect(findings.survey).toMatchObject({ verdict: 'too-few-waves', forecast: null, next_wave: null })
  // of owners the last wave alone has enough to be shown, and is marked
  const owners = findings.survey!.metrics.filter(({ segment }) => segment === 'Besitzer')
  expect(owners.map(({ waves }) => waves.map(({ shown }) => shown))).toEqual(Array.from({ length: 3 }, () => ['hidden', 'hidden', 'hidden', 'flagged']))
  // eight prolific posters, under the ten that are shown
  expect(findings.posters.find(({ poster }) => poster === 'prolific')!.authors).toBe(8)
  expect(offsets).toMatch(/^poster,regular,/m)
  expect(offsets).not.toMatch(/^poster,prolific,/m)
})

test('what is true lies in the intervals: opinion rose by 1.5 points since September and stands 2.2 under the base', () => {
  const { change, since_base } = findings.opinion
  expect(change!.low < 1.5 && 1.5 < change!.high).toBe(true)
  expect(since_base.low < -2.2 && -2.2 < since_base.high).toBe(true)
  // thin data: neither could be told from nothing
  expect(change!.low < 0 && 0 < change!.high && since_base.low < 0 && 0 < since_base.high).toBe(true)
})

test('that the raw average rose by seven points is no reason to be alarmed: chance alone does as much among so few', () => {
  const { raw_change, chance_sd, raw_movement, largest } = findings.decomposition!
  expect(raw_change).toBeGreaterThan(7)
  expect(chance_sd).toBeGreaterThan(7)
  expect([raw_movement, largest]).toEqual(['not-established', null])
  expect(findings.caveats.filter(({ severity }) => severity === 'serious')).toEqual([])
  expect(text()).toContain('Bei dieser Zahl von Erwähnungen kann schon der Zufall ihn so weit bewegen.')
})

test('cells that came ready-made are spoken of as such', () => {
  expect(findings.accounting).toMatchObject({ authors: 'summed', ready_made: 'all' })
  expect(text()).toContain('92 Erwähnungen in diesem Zeitraum von höchstens 91 Autoren')
  expect(text()).toContain('Die Zeilen sind fertige Zellen')
  expect(text()).not.toMatch(/Die Autoren dieses Zeitraums sind nicht bekannt|kopierter Beitrag/)
})

/** What the review says in so many English words: in its text and in what stands for its pictures. */
async function englishIn(said: string): Promise<readonly string[]> {
  const english = englishFragments(parse(await readFile(join(templatesFolder, 'words/en.yaml'), 'utf8')) as Record<string, string>)
  return [...new Set(trigrams(said).filter((three) => english.has(three)))]
}

const drawn = () => [...html.matchAll(/aria-label="([^"]*)"|<text[^>]*>([^<]*)<\/text>/g)].map(([, label, word]) => label ?? word).join(' | ')

test('it is German throughout, its pictures too, with figures as Germans write them', async () => {
  expect(html).toContain('<html lang="de-DE">')
  expect(await englishIn(text())).toEqual([])
  expect(await englishIn(drawn())).toEqual([])
  expect(text()).toMatch(/1\.021 von 1\.021/)
  expect(text()).toMatch(/liegt zwischen −2,7 und \+2,5 Punkten \(90\u00a0?\s?%-Intervall\)/)
  // no figure with a point for decimals, none with % set close
  expect(text().match(/(?<![\d.])\d+\.\d{1,2} ?(Punkte|%)|\d%/g) ?? []).toEqual([])
  // months and the words of pictures are single words: none of those that only English has; a British law keeps its name
  const said = `${text()} ${drawn()}`.replace('Digital Markets, Competition and Consumers Act', '')
  expect(said.match(/\b(May|Oct|Dec|Mar|March|October|The|and|of|with|interval|mentions?|authors?|yes)\b/g) ?? []).toEqual([])
})

test('it can fail: an English sentence is found', async () => {
  expect((await englishIn('Since the base, no change in opinion of Pellwick can be established.')).length).toBeGreaterThan(3)
})

test('the review has the order of its own template, and none of what that leaves out', () => {
  expect(sections()).toEqual(['first-page', 'contents', 'auf-einen-blick', 'survey', 'opinion', 'venues', 'topics', 'speaking', 'moved', 'advice', 'caveats', 'made', 'glossary', 'tables'])
})

test('own words, figures in them, the file that is put in, the own chart and the notes stand in it', () => {
  expect(text()).toContain('Dieser Bericht ruht auf 92 Erwähnungen.')
  expect(text()).toContain('Data Warehouse von Pellwick Fahrräder')
  expect(html).toMatch(/<figure[^>]*>(?:(?!<\/figure>)[\s\S])*So viele Erwähnungen gab es in jedem Monat(?:(?!<\/figure>)[\s\S])*<svg/)
  expect(text()).toContain('Die fünfte Welle ist für November bestellt.')
  expect(html.match(/class="analyst-note"/g)).toHaveLength(3)
})

test('nothing that could not be computed shows as a machine writes it', () => {
  // `null` is a German word
  expect(html).not.toMatch(/>\s*null\s*</)
  expect(text()).not.toMatch(/\b(NaN|undefined|Infinity|not-established|too-few-waves)\b|\[object/)
})
