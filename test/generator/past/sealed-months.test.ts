import { appendFile, cp, readFile, rm, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import type { Browser } from 'puppeteer'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { readAccount } from '../../../generator/account/read-account.ts'
import { openBrowser } from '../../../generator/print/open-browser.ts'
import { thisProgram } from '../../../generator/program/program.ts'
import { buildReview, type Draft } from '../../../generator/review/build-review.ts'
import { silent } from '../../../generator/review/stages.ts'
import { unchangedDraft } from '../../../generator/review/unchanged-draft.ts'
import type { Findings } from '../../../model/findings/schema.ts'
import { runCommand } from '../../support/run-command.ts'
import { wholeAccount } from '../archive/whole-account.ts'

let folder: string
let remove: () => Promise<void>
let browser: Browser
let july: Findings
let august: Findings
let held: number
let afterSeal: Draft | null

const build = async (period: string) => (await buildReview(thisProgram(), await readAccount(folder), { period, seed: 7, browser: () => Promise.resolve(browser), progress: silent })).findings
const seal = async (period: string, ...more: readonly string[]) => JSON.parse((await runCommand('seal', folder, '--period', period, '--json', ...more)).out) as { readonly ok: boolean; readonly faults: readonly { readonly code: string }[] }

/** July is sealed while some of its posts are still to come; then they come, the base is stated, and August is built. */
beforeAll(async () => {
  ({ folder, remove } = await wholeAccount())
  browser = await openBrowser()
  await writeFile(join(folder, 'notes/2025-07.md'), 'July was quiet as well.\n')
  await writeFile(join(folder, 'words.yaml'), 'term-venue: Place\n')
  const posts = join(folder, 'posts/posts.csv')
  const whole = await readFile(posts, 'utf8')
  const [head, ...rows] = whole.trimEnd().split('\n')
  const early = rows.filter((row, i) => !(row.includes('2025-07-1') && row.includes('Skerrow Ferries') && i % 4 === 0))
  held = rows.length - early.length
  await writeFile(posts, [head, ...early, ''].join('\n'))
  july = await build('2025-07')
  expect((await seal('2025-07')).ok).toBe(true)
  afterSeal = await unchangedDraft(thisProgram(), await readAccount(folder), { period: '2025-07', seed: 7, browser: await browser.version() })
  await writeFile(posts, whole)
  await appendFile(join(folder, 'account.yaml'), 'base: { from: 2025-03-03, to: 2025-05-31 }\n')
  august = await build('2025-08')
}, 240_000)
afterAll(async () => {
  await browser.close()
  await remove()
})

describe('the review after a sealed one', () => {
  test('the first looked back at nothing', () => {
    expect([july.revisions, july.follow_up, july.opinion.previous_sealed]).toEqual([null, null, null])
  })
  test('tells the figure as it was sealed, what has come late, and that the base is another', () => {
    expect(held).toBeGreaterThan(5)
    expect(august.opinion.previous_sealed).toEqual(july.opinion.period)
    const [revised] = august.revisions!.periods
    expect(august.revisions!.periods).toHaveLength(1)
    expect(revised).toMatchObject({ period: '2025-07', level: july.opinion.period, change: july.opinion.change, late: held, gone: 0, redefined: ['base'], bridged: true, program_changed: false })
    const { late_posts, account, program, later_posts } = revised.parts!
    expect(late_posts! + account + program + later_posts).toBeCloseTo(august.opinion.periods.find(({ period }) => period === '2025-07')!.adjusted.mean - july.opinion.period.mean, 9)
    expect(august.revisions!.breaks).toEqual([{ after: '2025-07', before: '2025-08', parts: ['base'], bridged: true }])
    expect(august.caveats.map(({ code }) => code)).toEqual(expect.arrayContaining(['late-posts', 'definition-break']))
  })
  test('follows up the advice in the words of then', () => {
    expect(august.follow_up).toMatchObject({ period: '2025-07', review: '2025-07' })
    expect(august.follow_up!.advice.map(({ action }) => action)).toEqual(july.advice.filter(({ helps }) => helps !== 'hardly').map(({ action }) => action))
  })
  test('a change of template computes nothing anew: the same figures out of what was remembered', async () => {
    const began = performance.now()
    expect(await build('2025-08')).toEqual(august)
    expect(performance.now() - began).toBeLessThan(30_000)
  }, 60_000)
})

test('a draft that was sealed is the one that stands: a run over all accounts does not build it again', () => {
  expect(afterSeal?.findings).toEqual(july)
})

describe('sealed in its turn', () => {
  test('a draft from before the last seal is refused, until it is built again', async () => {
    await build('2025-07')
    expect((await seal('2025-07', '--revise', 'posts came late')).ok).toBe(true)
    expect((await seal('2025-08')).faults.map(({ code }) => code)).toEqual(['archive-moved-on'])
    const again = await build('2025-08')
    expect(again.revisions!.periods[0].revised).toMatchObject({ review: '2025-07.r2', reason: 'posts came late', revision: 2 })
    expect((await seal('2025-08')).ok).toBe(true)
  }, 120_000)
  test('every review is made again from the archive alone, the same to the byte, each with the archive as it was then', async () => {
    const copy = join(folder, 'copy')
    await cp(join(folder, 'archive'), join(copy, 'archive'), { recursive: true })
    const { code, out } = await runCommand('verify', copy, '--rebuild', '--json')
    expect([code, JSON.parse(out)]).toMatchObject([0, { ok: true, faults: [], rebuilt: ['2025-07', '2025-07.r2', '2025-08'].map((name) => ({ name, identical: true, printed: true, differences: [] })) }])
    await rm(copy, { recursive: true })
  }, 240_000)
  test('no figure is taken from an archive that is not as it was sealed', async () => {
    await appendFile(join(folder, 'archive/2025-07/findings.json'), ' ')
    const { code, err } = await runCommand('build', folder, '--period', '2025-08', '--no-pdf')
    expect([code, err]).toEqual([1, expect.stringMatching(/archive-unsound[^]*archive\/2025-07\/findings\.json[^]*sealed-file-changed/) as string])
  }, 60_000)
})
